// @vitest-environment happy-dom
import { act } from "react";
import { createRoot, type Root } from "react-dom/client";
import { afterEach, beforeEach, describe, expect, test } from "vitest";
import { CriteriaTab } from "@/components/plants/criteria/criteria-tab";
import { SessionProvider } from "@/components/providers/session-provider";
import { ToastProvider } from "@/components/providers/toast-provider";
import type { Criteria } from "@/lib/schemas/criteria";
import { MOST_CRITERIA } from "@/lib/schemas/criteria-count";
import type { Plant } from "@/lib/schemas/plant";
import { twoCarriages } from "../helpers/plant-content";

// React's own switch for tests that drive it with act().
Object.assign(globalThis, { IS_REACT_ACT_ENVIRONMENT: true });

const content = twoCarriages();
const plantWith = (criteria: Criteria, version = 1): Plant => ({
  ...{ id: "plant", name: "Plant", version, currentRevision: { id: "revision", number: 1 }, criteria },
  ...{ axes: content.axes, order: 4, inputCount: 2, outputCount: 2, timeBase: content.timeBase, designCount: 0 },
  ...{ archivedAt: null, createdAt: "2026-01-01T00:00:00Z", updatedAt: "2026-01-01T00:00:00Z" },
});
const settling: Criteria[number] = { kind: "settling", signal: "enc1", limit: 2.5 };
const gone: Criteria[number] = { kind: "effort", signal: "F9", limit: 80 };
const facts = { userId: "u", email: "u@saltmarsh.example", teamId: "t", role: "lead" } as const;

let host: HTMLElement;
let root: Root;
beforeEach(() => {
  host = document.body.appendChild(document.createElement("div"));
  root = createRoot(host);
});
afterEach(() => {
  act(() => root.unmount());
  host.remove();
});

const show = (plant: Plant, readOnly = false) =>
  act(() =>
    root.render(
      <ToastProvider>
        <SessionProvider facts={facts}>
          <CriteriaTab {...{ plant, content, readOnly }} onSaved={() => undefined} />
        </SessionProvider>
      </ToastProvider>,
    ),
  );
const button = (name: string) =>
  [...host.querySelectorAll("button")].find((one) => (one.getAttribute("aria-label") ?? one.textContent) === name);
const press = (name: string) => act(() => button(name)?.click());
const limit = (place: number) => host.querySelector<HTMLInputElement>(`#criterion-${place}-limit`) as HTMLInputElement;
const signal = (place: number) => host.querySelector<HTMLSelectElement>(`#criterion-${place}-signal`) as HTMLSelectElement;
const limits = () => [...host.querySelectorAll("input")].map(({ value }) => value);
/** As a person types: React listens to the value set past it. */
function type(field: HTMLInputElement, text: string) {
  const { set } = Object.getOwnPropertyDescriptor(HTMLInputElement.prototype, "value") ?? {};
  act(() => {
    set?.call(field, text);
    field.dispatchEvent(new Event("input", { bubbles: true }));
  });
}

describe("criteria of a plant as they are written", () => {
  test("begin with what belongs there and one thing to do, and can be saved once there is a change", () => {
    show(plantWith([]));
    expect(host.textContent).toContain("No acceptance criteria yet");
    expect(button("Save criteria")).toBeUndefined();
    press("Add criterion");
    expect(signal(1).value).toBe("");
    expect(button("Save criteria")?.disabled).toBe(false);
    press("Remove criterion 1");
    expect(host.textContent).toContain("No acceptance criteria yet");
  });

  test("show what is stored, a signal that the plant has no more included", () => {
    show(plantWith([settling, gone]));
    expect(limits()).toEqual(["2.5", "80"]);
    expect([...signal(1).options].map(({ text }) => text)).toEqual(["worst of all", "enc1", "enc2"]);
    expect([...signal(2).options].map(({ text }) => text)).toEqual(["worst of all", "F1", "F2", "F9, not in this plant"]);
    expect(button("Save criteria")?.disabled).toBe(true);
  });

  test("say at its field what is no number, are not sent with it, and are as stored once the changes are dropped", () => {
    show(plantWith([settling, gone]));
    type(limit(1), "soon");
    press("Save criteria");
    expect(document.activeElement).toBe(limit(1));
    expect(host.querySelector("#criterion-1-limit-problem")?.textContent).toContain("This is not a number");
    press("Remove criterion 2");
    press("Drop the changes");
    expect(limits()).toEqual(["2.5", "80"]);
    expect(button("Save criteria")?.disabled).toBe(true);
  });

  test("follow what came with another save as long as nobody writes, and ask before they overwrite it", () => {
    show(plantWith([settling]));
    show(plantWith([{ ...settling, limit: 3 }], 2));
    expect(limits()).toEqual(["3"]);
    type(limit(1), "4");
    show(plantWith([{ ...settling, limit: 5 }], 3));
    expect(limits()).toEqual(["4"]);
    press("Save criteria");
    expect(host.textContent).toContain("Somebody changed the criteria after you opened this plant.");
    expect(host.querySelector("[role=alert] li")?.textContent).toBe("settling of enc1 to 2 %at most 5 s");
    press("Take theirs, drop mine");
    expect(limits()).toEqual(["5"]);
    expect(host.textContent).not.toContain("Somebody changed");
  });

  test("are so many at most", () => {
    show(plantWith(Array.from({ length: MOST_CRITERIA }, (_, k) => ({ ...settling, signal: `s${k}` }))));
    expect(button("Add criterion")?.disabled).toBe(true);
  });
});

test("whoever may not write reads them as a list, with nothing to press", () => {
  show(plantWith([settling, gone]), true);
  expect([...host.querySelectorAll("li")].map((line) => line.textContent)).toEqual([
    "settling of enc1 to 2 %at most 2.5 s",
    "peak effort of F9at most 80 %",
  ]);
  expect(host.querySelectorAll("button, input, select")).toHaveLength(0);
});
