import { describe, expect, test } from "vitest";
import type { Criterion, Verdict } from "@/control/design/criteria";
import { criterionFigures, criterionSubject, verdictSentence } from "@/control/words/describe-criterion";

const of = (kind: Criterion["kind"], signal: string | null, limit: number): Criterion => ({ kind, signal, limit });
const verdict = (criterion: Criterion, value: number | null, reason: Verdict["reason"] = null): Verdict => ({
  criterion,
  value,
  met: value !== null && value <= criterion.limit,
  reason,
});

test("a criterion says what it limits, by signal or for the worst", () => {
  expect(criterionSubject(of("settling", "y", 1))).toBe("settling of y to 2 %");
  expect(criterionSubject(of("settling", null, 1))).toBe("worst settling to 2 %");
  expect(criterionSubject(of("overshoot", "y", 1))).toBe("overshoot of y");
  expect(criterionSubject(of("cross-peak", "y", 1))).toBe("cross-axis peak while y is commanded");
  expect(criterionSubject(of("effort", null, 1))).toBe("worst peak effort");
});

describe("a verdict in a sentence", () => {
  test("begins with met or not met and has both figures with their units", () => {
    expect(verdictSentence(verdict(of("settling", "y", 0.1), 0.0834))).toBe(
      "Met: settling of y to 2 % is 83.4 ms, at most 0.1 s is asked.",
    );
    expect(verdictSentence(verdict(of("overshoot", "y", 5), 6.25))).toBe(
      "Not met: overshoot of y is 6.25 %, at most 5 % is asked.",
    );
    expect(verdictSentence(verdict(of("cross-peak", null, 0), 0))).toBe(
      "Met: worst cross-axis peak is 0 %, at most 0 % is asked.",
    );
    expect(verdictSentence(verdict(of("overshoot", "y", 5), 1e-9))).toContain("is < 0.01 %, at most 5 %");
  });

  test("says why there is no figure", () => {
    const without = (criterion: Criterion, reason: Verdict["reason"]) => verdictSentence(verdict(criterion, null, reason));
    expect(without(of("effort", "F9", 80), "no-signal")).toBe(
      "Not met: peak effort of F9 cannot be judged, since the plant has no input F9 with a limit; at most 80 % is asked.",
    );
    expect(without(of("overshoot", null, 5), "no-signal")).toContain("since the plant has no commanded quantity;");
    expect(without(of("settling", "y", 1), "never")).toContain("since its step does not come to rest;");
    expect(without(of("settling", null, 1), "never")).toContain("since a step does not come to rest;");
    expect(without(of("cross-peak", null, 1), "no-response")).toContain("since no response shows it;");
  });
});

test("a figure barely beyond its limit is shown in the digits that tell them apart, one at its limit is not", () => {
  expect(criterionFigures(verdict(of("settling", "y", 0.5), 0.50002))).toEqual({ value: "0.50002 s", limit: "0.5 s" });
  expect(criterionFigures(verdict(of("overshoot", "y", 5), 5 + 2 ** -50))).toMatchObject({ limit: "5 %" });
  expect(criterionFigures(verdict(of("overshoot", "y", 5), 5 + 2 ** -50)).value).not.toBe("5 %");
  expect(criterionFigures(verdict(of("overshoot", "y", 5), 5))).toEqual({ value: "5 %", limit: "5 %" });
  expect(criterionFigures(verdict(of("overshoot", "y", 0.001), 0.002))).toEqual({ value: "0.002 %", limit: "0.001 %" });
});
