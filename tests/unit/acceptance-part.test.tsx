// @vitest-environment happy-dom
import { act } from "react";
import { createRoot, type Root } from "react-dom/client";
import { afterEach, beforeEach, expect, test, vi } from "vitest";
import type { Solved } from "@/components/designs/bench/bench-types";
import { AcceptancePart } from "@/components/designs/evidence/acceptance-part";
import { computeDesign } from "@/control/design/compute-design";
import type { Criterion } from "@/control/design/criteria";
import { defaultRecipe } from "@/control/design/default-recipe";
import { evidenceInWords } from "@/control/words/evidence-in-words";
import { coupledModel } from "../helpers/coupled-model";

// React's own switch for tests that drive it with act().
Object.assign(globalThis, { IS_REACT_ACT_ENVIRONMENT: true });

const model = coupledModel();
const recipe = defaultRecipe(model);
const evidence = evidenceInWords(computeDesign(model, recipe), model) as unknown as Solved["evidence"];
const solved: Solved = {
  ...{ recipe, evidence, ground: { plantRevision: { id: "r", number: 1 }, model } },
  source: { kind: "stored", revisionId: "d", number: 1 },
};
const [first] = model.commanded;

let host: HTMLElement;
let root: Root;
beforeEach(() => {
  vi.useFakeTimers();
  host = document.body.appendChild(document.createElement("div"));
  root = createRoot(host);
});
afterEach(() => {
  act(() => root.unmount());
  host.remove();
  vi.useRealTimers();
});

const show = (criteria: readonly Criterion[]) =>
  act(() => root.render(<AcceptancePart plant={{ id: "p", criteria }} solved={solved} />));
const lines = () => [...host.querySelectorAll("li")].map((line) => line.textContent);
const announced = () => host.querySelector("[role=status]")?.textContent;

const loose: Criterion = { kind: "settling", signal: first.name, limit: 1000 };
const tight: Criterion = { kind: "effort", signal: null, limit: 1e-9 };
const gone: Criterion = { kind: "overshoot", signal: "gone", limit: 5 };

test("each criterion says met or not met in a word, with its figure and its limit", () => {
  show([loose, tight, gone]);
  expect(lines()[0]).toMatch(new RegExp(`^Met, settling of ${first.name} to 2 %[\\d.]+ s, at most 1000 s$`));
  expect(lines()[1]).toMatch(/^Not met, worst peak effort[\d.]+ %, at most 1e−9 %$/);
  expect(lines()[2]).toBe("Not met, overshoot of gonethe plant has no commanded quantity gone; at most 5 %");
  expect(host.textContent).toContain("1 of 3 met");
  expect(announced()).toBe("Acceptance criteria: 1 of 3 met");
});

test("how many are met is announced at most once a second, and the newest in the end", () => {
  show([loose]);
  act(() => vi.advanceTimersByTime(0));
  show([tight]);
  act(() => vi.advanceTimersByTime(0));
  expect(announced()).toBe("Acceptance criteria: 0 of 1 met");
  show([loose, tight]);
  act(() => vi.advanceTimersByTime(600));
  show([loose]);
  expect(host.textContent).toContain("1 of 1 met");
  expect(announced()).toBe("Acceptance criteria: 0 of 1 met");
  act(() => vi.advanceTimersByTime(300));
  expect(announced()).toBe("Acceptance criteria: 0 of 1 met");
  act(() => vi.advanceTimersByTime(100));
  expect(announced()).toBe("Acceptance criteria: 1 of 1 met");
});

test("without criteria it says where they are set", () => {
  show([]);
  expect(host.textContent).toContain("The plant has no acceptance criteria yet.");
  expect(host.querySelector("a")?.getAttribute("href")).toBe("/plants/p?tab=criteria");
});
