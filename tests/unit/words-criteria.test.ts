import { describe, expect, test } from "vitest";
import type { Criterion, Verdict } from "@/control/design/criteria";
import { criterionLimit, criterionSubject, criterionValue, verdictSentence } from "@/control/words/describe-criterion";

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
      "Met: settling of y to 2 % is 0.0834 s, at most 0.1 s is asked.",
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

test("a figure near its limit is shown in the digits that tell its side, one at its limit as it is", () => {
  const shown = (limit: number, value: number) => criterionValue(verdict(of("settling", "y", limit), value));
  expect(shown(0.5, 0.50002)).toBe("0.50002 s");
  expect(shown(0.50002, 0.50003)).toBe("0.50003 s");
  expect(shown(0.5, 0.49996)).toBe("0.49996 s");
  expect(shown(5, 5 + 2 ** -50)).toBe("5.000000000000001 s");
  expect(shown(5, 5)).toBe("5 s");
  expect(shown(300, 288.4)).toBe("288 s");
  expect(criterionValue(verdict(of("overshoot", "y", 0.001), 0.002))).toBe("0.002 %");
  expect(criterionValue(verdict(of("overshoot", "y", 0), 1e-12))).toBe("< 0.01 %");
});

test("a limit is shown as it was written", () => {
  expect(criterionLimit(of("settling", null, 0.1))).toBe("0.1 s");
  expect(criterionLimit(of("settling", null, 1000))).toBe("1000 s");
  expect(criterionLimit(of("effort", null, 83.123456789))).toBe("83.123456789 %");
});
