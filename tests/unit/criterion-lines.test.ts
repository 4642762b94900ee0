import { expect, test } from "vitest";
import {
  type CriterionLine,
  linesOf,
  nextLine,
  saysTheSame,
  sentOf,
  signalsOf,
  withKind,
} from "@/components/plants/criteria/criterion-lines";
import { Criteria } from "@/lib/schemas/criteria";
import { twoCarriages } from "../helpers/plant-content";

const content = twoCarriages();

test("efforts are of inputs that have a limit, everything else of what is commanded, by names that can be chosen", () => {
  expect(signalsOf("settling", content)).toEqual(["enc1", "enc2"]);
  expect(signalsOf("effort", content)).toEqual(["F1", "F2"]);
  const free = content.inputs.map((input, k) => (k === 0 ? { ...input, lower: null, upper: null } : input));
  expect(signalsOf("effort", twoCarriages({ inputs: free }))).toEqual(["F2"]);
  const doubled = content.outputs.map((output) => ({ ...output, name: "" }));
  expect(signalsOf("overshoot", twoCarriages({ outputs: doubled }))).toEqual([]);
});

test("lines added one after the other are about different things until nothing is left", () => {
  const lines: CriterionLine[] = [];
  for (let k = 0; k < 12; k++) lines.push({ ...nextLine(lines, content, `line ${k}`), limit: 1 });
  expect(lines.slice(0, 4).map(({ kind, signal }) => [kind, signal])).toEqual([
    ["settling", null],
    ["overshoot", null],
    ["cross-peak", null],
    ["effort", null],
  ]);
  expect(Criteria.safeParse(sentOf(lines)).success).toBe(true);
  expect(nextLine(lines, content, "one more")).toMatchObject({ kind: "settling", signal: null, limit: null });
});

test("another kind keeps a signal that it can be about, and lets go of one that it cannot", () => {
  const line: CriterionLine = { key: "a", kind: "settling", signal: "enc1", limit: 2 };
  expect(withKind(line, "overshoot", content)).toEqual({ ...line, kind: "overshoot" });
  expect(withKind(line, "effort", content)).toEqual({ ...line, kind: "effort", signal: null });
});

test("lines say the same as what they were made from, whatever their keys, and nothing else does", () => {
  const criteria: Criteria = [
    { kind: "settling", signal: null, limit: 5 },
    { kind: "effort", signal: "F1", limit: 80 },
  ];
  const lines = linesOf(criteria, 3);
  expect(sentOf(lines)).toEqual(criteria);
  expect(saysTheSame(lines, criteria)).toBe(true);
  expect(saysTheSame(linesOf(criteria, 4), lines)).toBe(true);
  expect(saysTheSame(lines.toReversed(), criteria)).toBe(false);
  expect(saysTheSame(lines.slice(1), criteria)).toBe(false);
  expect(saysTheSame([{ ...lines[0], limit: null }, lines[1]], criteria)).toBe(false);
});
