// @vitest-environment happy-dom
import { act, useState } from "react";
import { createRoot, type Root } from "react-dom/client";
import { afterEach, beforeEach, expect, test } from "vitest";
import { arrangeDesigns } from "@/components/side-by-side/arrange-designs";
import { compareDesigns } from "@/components/side-by-side/compare-designs";
import { ComparedFacts, sortingOf } from "@/components/side-by-side/compared-facts";
import { ComparedTrades } from "@/components/side-by-side/compared-trades";
import type { SideBySideView } from "@/components/side-by-side/use-side-by-side-view";
import { steppedRevision } from "../helpers/compared-revision";

// React's own switch for tests that drive it with act().
Object.assign(globalThis, { IS_REACT_ACT_ENVIRONMENT: true });

const comparing = compareDesigns([
  steppedRevision("Calm", { settling: [4.8, 2], effort: 40, limit: 100 }),
  steppedRevision("Quick", { settling: [1, 3.6], effort: 120, limit: 100 }),
]);
let host: HTMLElement;
let root: Root;
let address: Partial<SideBySideView[0]>;

/** The page's facts with the address in a state of its own. */
function Facts() {
  const [view, setView] = useState<SideBySideView[0]>({
    ...{ hide: null, commanded: null, loop: "observer", sort: null, order: "least", gains: "entries" },
  });
  const change = (next: unknown) => {
    address = next as typeof address;
    setView((now) => ({ ...now, ...address, order: address.order ?? "least" }));
    return Promise.resolve(new URLSearchParams());
  };
  const arranged = arrangeDesigns(comparing, sortingOf(view));
  return (
    <>
      <ComparedFacts plantId="plant" arranged={arranged} view={[view, change as SideBySideView[1]]} />
      <ComparedTrades designs={arranged.designs} />
    </>
  );
}

beforeEach(() => {
  host = document.body.appendChild(document.createElement("div"));
  root = createRoot(host);
  act(() => root.render(<Facts />));
});
afterEach(() => {
  act(() => root.unmount());
  host.remove();
});

const names = () => [...host.querySelectorAll("thead th a")].map(({ textContent }) => textContent);
const settling = () => [...host.querySelectorAll("tbody th[aria-sort]")][0];
const press = (name: string) => {
  const button = [...host.querySelectorAll("button")].find(({ textContent }) => textContent === name);
  if (!button) throw new Error(`no button ${name}`);
  act(() => button.click());
};
const said = () => [...host.querySelectorAll("[role=status]")].map(({ textContent }) => textContent).at(-1);

test("a figure's name orders the columns least first, then most first, then as chosen, each time said in words", () => {
  expect([names(), settling().getAttribute("aria-sort")]).toEqual([["Calm", "Quick"], "none"]);
  expect(said()).toBe("In the order chosen; Calm is what the others are held against.");
  press("settling, 2 %");
  expect(address).toEqual({ sort: "full-state settling", order: "least" });
  expect([names(), settling().getAttribute("aria-sort")]).toEqual([["Quick", "Calm"], "ascending"]);
  expect(said()).toBe("Sorted by settling, 2 %, with the full state, least first: Quick, Calm.");
  press("settling, 2 %");
  expect([names(), settling().getAttribute("aria-sort")]).toEqual([["Calm", "Quick"], "descending"]);
  press("settling, 2 %");
  expect(address).toEqual({ sort: null, order: null });
  press("overshoot");
  press("Back to the order chosen");
  expect([names(), settling().getAttribute("aria-sort")]).toEqual([["Calm", "Quick"], "none"]);
});

test("only figures can be pressed; on paper their names are plain words", () => {
  const labels = [...host.querySelectorAll("tbody button")].map(({ textContent }) => textContent);
  expect(labels).toEqual(["settling, 2 %", "overshoot", "cross-axis peak", "peak effort, F"]);
  for (const header of host.querySelectorAll("tbody th[aria-sort]")) {
    expect(header.querySelector("button")?.className).toContain("no-print");
    expect(header.querySelector(".print\\:inline")?.textContent).toBe(header.querySelector("button")?.textContent);
  }
});

test("best and worst are words beside the figures, none where all read alike, and the trade is told against the first", () => {
  const cells = [...(settling().closest("tr")?.querySelectorAll("td") ?? [])].map(({ textContent }) => textContent);
  expect(cells).toEqual(["4.8 s worst", "differs from the first: 3.6 s best"]);
  const alike = [...host.querySelectorAll("tbody tr")].find((one) => one.textContent?.startsWith("overshoot"));
  expect(alike?.textContent).not.toMatch(/best|worst/);
  expect(host.querySelector("section li")?.textContent).toMatch(/^Against Calm, Quick settles everything commanded in 3\.6 s/);
  press("settling, 2 %");
  expect(host.querySelector("section li")?.textContent).toMatch(/^Against Quick, Calm takes 80 % less of F's limit/);
});
