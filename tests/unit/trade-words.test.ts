import { describe, expect, test } from "vitest";
import type { TradeFigures, TradeSide } from "@/components/side-by-side/trade-side";
import { tradeWords } from "@/components/side-by-side/trade-words";

const effort = (peak: number, overLimit: number | null = null, name = "F", unit = "N") => ({ name, unit, peak, overLimit });
const start: TradeFigures = {
  ...{ settling: 4.8, slowest: "x", rise: 1.8, overshoot: 5.6, cross: 0.2 },
  effort: [effort(6300, 0.7)],
};
const figures = (changes: Partial<TradeFigures> = {}): TradeFigures => ({ ...start, ...changes });

function side(label: string, full: TradeFigures | null, more: Partial<TradeSide> & { observed?: TradeFigures } = {}): TradeSide {
  const { observed = null, ...rest } = more;
  return { label, plantRevision: 1, observer: null, silent: null, figures: { "full-state": full, observer: observed }, ...rest };
}
const said = (from: Partial<TradeFigures>, to: Partial<TradeFigures>) =>
  tradeWords(side("Quiet melt", figures(from)), side("Working weights", figures(to)));
const START = "Against Quiet melt, Working weights ";
const NO_WORSE = ", and no figure that both have gets worse.";

describe("what a trade bought", () => {
  test("is said with what it cost, the gains first", () => {
    expect(said({}, { settling: 3.6, cross: 0.4, effort: [effort(6500, 0.72)] })).toBe(
      `${START}settles x in 3.6 s instead of 4.8 s (25 % sooner) for twice the cross-axis peak (40 % of a step instead of 20 %) and 2 % more of F's limit (72 %).`,
    );
  });
  test("is said alone where it cost nothing", () => {
    expect(said({}, { settling: 3.6, rise: 1.2 })).toBe(
      `${START}settles x in 3.6 s instead of 4.8 s (25 % sooner) and rises in 1.2 s instead of 1.8 s (33 % faster)${NO_WORSE}`,
    );
  });
  test("is nothing where everything got worse", () => {
    expect(said({}, { settling: 6, rise: 2.7, overshoot: 7 })).toBe(
      `${START}gains nothing in these figures and costs settling x in 6 s instead of 4.8 s (25 % later), a rise of 2.7 s instead of 1.8 s (50 % slower) and an overshoot of 7 % instead of 5.6 %.`,
    );
  });
  test("is nothing where every figure reads alike, beyond the digits shown too", () => {
    const alike = "Working weights and Quiet melt agree in every figure that both have.";
    expect(said({}, {})).toBe(alike);
    expect(said({}, { settling: 4.8001, overshoot: 5.60001, effort: [effort(6300, 0.70001)] })).toBe(alike);
  });
});

describe("each figure of a trade", () => {
  test.each<[string, Partial<TradeFigures>, Partial<TradeFigures>, string]>([
    ["less overshoot", {}, { overshoot: 0 }, "overshoots 0 % instead of 5.6 %"],
    ["half the cross-axis peak", {}, { cross: 0.1 }, "has half the cross-axis peak (10 % of a step instead of 20 %)"],
    ["a little less of it", {}, { cross: 0.19 }, "has 5 % less cross-axis peak (19 % of a step instead of 20 %)"],
    ["none of it left", {}, { cross: 0 }, "has no cross-axis peak (20 % of a step before)"],
    ["less of a limit", {}, { effort: [effort(5000, 0.5)] }, "takes 20 % less of F's limit (50 %)"],
    [
      "effort back within its limit",
      { effort: [effort(9, 1.2)] },
      { effort: [effort(7, 0.9)] },
      "takes 30 % less of F's limit (90 %, within it)",
    ],
    [
      "effort still beyond it",
      { effort: [effort(9, 1.5)] },
      { effort: [effort(8, 1.2)] },
      "takes 30 % less of F's limit (120 %, still beyond it)",
    ],
    [
      "less effort without limits",
      { effort: [effort(40)] },
      { effort: [effort(30)] },
      "asks 30 N of F instead of 40 N (25 % less)",
    ],
  ])("%s", (_, from, to, words) => {
    expect(said(from, to)).toBe(`${START}${words}${NO_WORSE}`);
  });

  test.each<[string, Partial<TradeFigures>, Partial<TradeFigures>, string]>([
    ["three times the cross-axis peak", {}, { cross: 0.6 }, "three times the cross-axis peak (60 % of a step instead of 20 %)"],
    ["a factor without a word", {}, { cross: 0.5 }, "2.5 times the cross-axis peak (50 % of a step instead of 20 %)"],
    ["a little more of it", {}, { cross: 0.25 }, "25 % more cross-axis peak (25 % of a step instead of 20 %)"],
    ["a first of it", { cross: 0 }, { cross: 0.02 }, "a cross-axis peak of 2 % of a step where there was none"],
    ["an overshoot where there was none", { overshoot: 0 }, {}, "an overshoot of 5.6 % instead of 0 %"],
    ["effort beyond its limit", {}, { effort: [effort(9000, 1.05)] }, "35 % more of F's limit (105 %, beyond it)"],
    [
      "more effort without limits",
      { effort: [effort(30)] },
      { effort: [effort(40)] },
      "a peak of 40 N of F instead of 30 N (33 % more)",
    ],
    ["effort from nothing", { effort: [effort(0)] }, { effort: [effort(40)] }, "a peak of 40 N of F instead of 0 N"],
    [
      "a limit on one plant only",
      { effort: [effort(30)] },
      { effort: [effort(40, 0.5)] },
      "a peak of 40 N of F instead of 30 N (33 % more)",
    ],
  ])("%s", (_, from, to, words) => {
    expect(said(from, to)).toBe(`${START}gains nothing in these figures and costs ${words}.`);
  });

  test("settling is of everything commanded where another quantity settles last", () => {
    expect(said({}, { settling: 3.6, slowest: "psi" })).toContain("settles everything commanded in 3.6 s instead of 4.8 s");
    expect(said({ slowest: null }, { settling: 3.6, slowest: null })).toContain("settles everything commanded in");
  });
  test("every input is said of, matched by name and unit whatever the order", () => {
    const [before, after] = [
      [effort(10, 0.5), effort(8, 0.4, "tq", "Nm")],
      [effort(6, 0.3, "tq", "Nm"), effort(12, 0.6)],
    ];
    expect(said({ effort: before }, { effort: after })).toBe(
      `${START}takes 10 % less of tq's limit (30 %) for 10 % more of F's limit (60 %).`,
    );
  });
});

describe("what cannot be held against each other", () => {
  test("is said where one of the two has no such figure", () => {
    expect(said({ rise: null, overshoot: null }, { settling: 3.6 })).toBe(
      `${START}settles x in 3.6 s instead of 4.8 s (25 % sooner)${NO_WORSE.slice(0, -1)}; rise and overshoot cannot be compared, since Quiet melt has no such figure.`,
    );
    expect(said({}, { cross: null })).toBe(
      "Working weights and Quiet melt agree in every figure that both have; cross-axis peak cannot be compared, since Working weights has no such figure.",
    );
  });
  test("is said of an input that only one has, also where the units differ", () => {
    expect(said({}, { effort: [effort(6.3, 0.7, "F", "kN")] })).toMatch(
      /; the effort of F cannot be compared, since Quiet melt has no such figure; the effort of F cannot be compared, since Working weights has no such figure\.$/,
    );
  });
  test("is passed over where neither has it", () => {
    expect(said({ cross: null }, { cross: null, settling: 3.6 })).not.toContain("cross");
    const nothing = { settling: null, rise: null, overshoot: null, cross: null, effort: [] };
    expect(said(nothing, nothing)).toBe("Working weights and Quiet melt have no figure in common.");
  });
  test("is everything where responses were refused or nothing is stepped", () => {
    const refused = side("Wild", null, { silent: "refused" });
    const loose = side("Loose", null, { silent: "no-reference" });
    const whole = side("Calm", figures());
    expect(tradeWords(whole, refused)).toBe("Wild cannot be held against Calm: the responses of Wild were refused.");
    expect(tradeWords(loose, whole)).toBe(
      "Calm cannot be held against Loose: Loose follows no reference, so nothing is stepped.",
    );
    expect(tradeWords(refused, loose)).toBe(
      "Loose cannot be held against Wild: the responses of Wild were refused; Loose follows no reference, so nothing is stepped.",
    );
  });
});

describe("the ground of a trade", () => {
  const better = figures({ settling: 3.6 });
  const by = (observer: string) => ({ observer, observed: figures({ settling: observer === "by poles" ? 4.8 : 2.4 }) });
  test("is the loop with the observer where both have one, each with its own", () => {
    expect(tradeWords(side("A", figures(), by("by poles")), side("B", better, by("from noise")))).toBe(
      "Against A, B settles x in 2.4 s instead of 4.8 s (50 % sooner), and no figure that both have gets worse; each with its own observer, A by poles and B from noise.",
    );
    expect(tradeWords(side("A", figures(), by("by poles")), side("B", better, by("by poles")))).toBe(
      "B and A agree in every figure that both have.",
    );
  });
  test("is the full state of both where only one has an observer", () => {
    const words = "both with the full state, since A has no observer in its loop.";
    expect(tradeWords(side("A", figures()), side("B", better, by("from noise")))).toBe(
      `Against A, B settles x in 3.6 s instead of 4.8 s (25 % sooner), and no figure that both have gets worse; ${words}`,
    );
  });
  test("says so where the plant is not the same", () => {
    expect(tradeWords(side("A", figures()), side("B", better, { plantRevision: 3 }))).toMatch(
      /; on plant revisions 1 and 3, which may differ too\.$/,
    );
  });
});
