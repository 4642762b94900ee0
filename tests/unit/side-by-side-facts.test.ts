import { describe, expect, test } from "vitest";
import { arrangeDesigns } from "@/components/side-by-side/arrange-designs";
import { compareDesigns } from "@/components/side-by-side/compare-designs";
import { comparisonSource } from "@/components/side-by-side/comparison-file";
import { tradeSide } from "@/components/side-by-side/trade-side";
import { comparedRevision, steppedRevision as stepped } from "../helpers/compared-revision";

const y = { name: "y", axis: 0, accepted: 0.1 };
const t = { name: "t", axis: 1, accepted: 0.2 };
const calm = stepped("Calm", { settling: [4.8, 2], effort: 40, limit: 100 });
const quick = stepped("Quick", { settling: [1, 3.6], effort: 120, limit: 100 });
const wild = comparedRevision("Wild", 1, [y, t], [[-1, 0, 0]]);

describe("the side of a trade", () => {
  test("knows what settles last, the share of every limit and the cross-axis peak", () => {
    expect(tradeSide(quick, "Quick").figures["full-state"]).toEqual({
      ...{ settling: 3.6, slowest: "t", rise: null, overshoot: 4, cross: 0.3 },
      effort: [{ name: "F", unit: "N", peak: 120, overLimit: 1.2 }],
    });
    const even = stepped("Even", { settling: [2, 2], effort: 1 });
    expect(tradeSide(even, "Even").figures["full-state"]?.slowest).toBeNull();
  });
  test("says why it has no figures", () => {
    expect(tradeSide(wild, "Wild")).toMatchObject({ silent: "refused", figures: { "full-state": null, observer: null } });
    const { responses } = calm.evidence;
    if (responses.state !== "computed") throw new Error("no responses");
    const loose = {
      ...calm,
      evidence: { ...calm.evidence, responses: { ...responses, value: { ...responses.value, figures: [] } } },
    };
    expect(tradeSide(loose, "Loose")).toMatchObject({ silent: "no-reference", figures: { "full-state": null } });
  });
});

const row = (shown: ReturnType<typeof arrangeDesigns>, label: string) =>
  shown.sections.flatMap(({ rows }) => rows).filter((one) => one.label === label);
const names = ({ designs }: ReturnType<typeof arrangeDesigns>) => designs.map(({ label }) => label);

describe("designs put in order", () => {
  const comparing = compareDesigns([wild, calm, quick]);
  const chosen = arrangeDesigns(comparing, null);
  const sorted = arrangeDesigns(comparing, { key: "full-state settling", order: "least" });
  test("move with every cell of theirs, are held against the one that is first now, and keep their dashes", () => {
    expect(names(chosen)).toEqual(["Wild", "Calm", "Quick"]);
    expect(names(sorted)).toEqual(["Quick", "Calm", "Wild"]);
    expect(sorted.designs.map(({ place }) => place)).toEqual([2, 1, 0]);
    const [settling] = row(sorted, "settling, 2 %");
    expect(settling.cells.map((cell) => cell?.text)).toEqual(["3.6 s", "4.8 s", undefined]);
    expect(settling.cells.map((cell) => cell?.verdict)).toEqual(["best", "worst", undefined]);
    expect(settling.differs).toEqual([false, true, true]);
    expect(sorted.sorted).toMatch(/^Sorted by settling, 2 %, with the full state, least first: Quick, Calm; Wild has no such/);
  });
  test("leave every row where it was", () => {
    const places = (shown: typeof chosen) => shown.sections.map(({ title, rows }) => [title, ...rows.map(({ key }) => key)]);
    expect(places(sorted)).toEqual(places(chosen));
  });
  test("are as chosen where the address names no figure of theirs", () => {
    expect(arrangeDesigns(comparing, { key: "observer settling", order: "most" })).toEqual(chosen);
  });
  test("are not judged by an effort in another unit, which has a row of its own", () => {
    const kilo = stepped("Kilo", { settling: [1, 1], effort: 0.04, unit: "kN" });
    const efforts = row(arrangeDesigns(compareDesigns([calm, kilo]), null), "peak effort, F");
    const shown = efforts.map(({ cells }) => cells.map((cell) => cell?.verdict ?? cell?.text));
    expect(shown).toHaveLength(2);
    expect(shown).toContainEqual(["40 N", undefined]);
    expect(shown).toContainEqual([undefined, "0.04 kN"]);
  });
});

test("only figures can be sorted by, each under a name of its own", () => {
  const facts = compareDesigns([calm]).facts[0];
  const sortable = facts.filter(({ sort }) => sort !== undefined);
  expect(sortable.map(({ sort }) => sort?.key)).toEqual([
    ...["full-state settling", "full-state overshoot", "full-state cross", "full-state effort F N"],
  ]);
  expect(sortable.every(({ size }) => size !== undefined)).toBe(true);
});

describe("the lines of a comparison's file", () => {
  const { labels, lines } = comparisonSource([calm, quick, wild]);
  const line = (item: string, figure = "") => lines.filter((one) => one.item === item && one.figure === figure);
  test("hold numbers in their units, and nothing where a design has none", () => {
    expect(labels).toEqual(["Calm", "Quick", "Wild"]);
    expect(line("settling, 2 %")[0]).toMatchObject({ unit: "s", cells: [4.8, 3.6, null], best: "Quick", worst: "Calm" });
    expect(line("peak effort, F", "over its limit")[0]).toMatchObject({ unit: "1", cells: [0.4, 1.2, null] });
    expect(line("peak effort, F", "in words")[0].cells[1]).toBe("Beyond its limit: 120 N, 120 % of its limit");
  });
  test("say what was refused, and what each trade bought", () => {
    expect(line("not computed").find(({ section }) => section === "Responses")?.cells).toEqual([
      ...[null, null, "Not solved. No reason."],
    ]);
    expect(line("against the first")[0].cells.slice(1)).toEqual([
      "Against Calm, Quick settles everything commanded in 3.6 s instead of 4.8 s (25 % sooner) for 80 % more of F's limit (120 %, beyond it).",
      "Wild cannot be held against Calm: the responses of Wild were refused.",
    ]);
  });
  test("name nobody best or worst where all read alike, and everybody who shares it", () => {
    expect(line("overshoot")[0]).toMatchObject({ best: "", worst: "" });
    const twin = stepped("Twin", { settling: [3.601, 1], effort: 1 });
    const shared = comparisonSource([calm, quick, twin]).lines.find(({ item }) => item === "settling, 2 %");
    expect(shared).toMatchObject({ best: "Quick; Twin", worst: "Calm" });
  });
});
