import { describe, expect, test } from "vitest";
import type { GainMatrix } from "@/components/designs/gains/gain-matrices";
import { arrangeDesigns } from "@/components/side-by-side/arrange-designs";
import { compareDesigns } from "@/components/side-by-side/compare-designs";
import { absentWords, differsFrom, gainDifference, noDifference } from "@/components/side-by-side/compared-gains";
import { alignFacts, type Fact, mergeOrder, verdicts, withoutEqual } from "@/components/side-by-side/compared-rows";
import { commandText, loopOf, type OverlaidDesign, overlayPictures } from "@/components/side-by-side/overlay-pictures";
import { askedDesigns } from "@/components/side-by-side/side-by-side-ids";
import type { ResponseCurves } from "@/lib/schemas/evidence";
import { comparedRevision as revision } from "../helpers/compared-revision";

const id = (digit: number) => `${String(digit).repeat(8)}-0000-4000-8000-000000000000`;

describe("the address of a side-by-side", () => {
  test("gives each design once, in its order, however the parameter is written", () => {
    const expected = { ids: [id(2), id(1)], nonsense: false, tooMany: false };
    expect(askedDesigns(`${id(2)},${id(1)}`)).toEqual(expected);
    expect(askedDesigns([id(2), ` ${id(1)},${id(2)},`])).toEqual(expected);
    expect(askedDesigns(`${id(2)},${id(1)}`.toUpperCase())).toEqual(expected);
  });
  test("asks for nothing when it is absent or empty", () => {
    expect(askedDesigns(undefined).ids).toEqual([]);
    expect(askedDesigns(",,")).toEqual({ ids: [], nonsense: false, tooMany: false });
  });
  test("says when something in it is no identifier, wherever it stands", () => {
    expect(askedDesigns(`${id(1)},../../etc`).nonsense).toBe(true);
    expect(askedDesigns([1, 2, 3, 4, 5, 6].map(id).concat("x").join()).nonsense).toBe(true);
  });
  test("keeps the first six and says that there were more", () => {
    const seven = askedDesigns([1, 2, 3, 4, 5, 6, 7].map(id).join());
    expect(seven).toEqual({ ids: [1, 2, 3, 4, 5, 6].map(id), nonsense: false, tooMany: true });
  });
});

const fact = (key: string, text: string, more: Partial<Fact> = {}): Fact => ({
  section: "Figures",
  key,
  label: key,
  text,
  exact: text,
  ...more,
});

describe("aligned rows", () => {
  test("stand in one order that keeps the order of every design", () => {
    expect(mergeOrder([["a", "c"], ["a", "b", "c", "d"], []])).toEqual(["a", "b", "c", "d"]);
    expect(mergeOrder([["b"], ["a", "b"]])).toEqual(["a", "b"]);
  });
  test("mark what differs from the first design, and an empty place beside a filled one", () => {
    const [{ rows }] = alignFacts([
      [fact("y", "1 mm"), fact("z", "2 mm")],
      [fact("y", "1 mm"), fact("z", "3 mm")],
      [fact("y", "2 mm")],
    ]);
    expect(rows.map(({ key, differs, equal }) => ({ key, differs, equal }))).toEqual([
      { key: "y", differs: [false, false, true], equal: false },
      { key: "z", differs: [false, true, true], equal: false },
    ]);
    expect(rows[1].cells[2]).toBeNull();
  });
  test("say so where a difference lies beyond the figures shown", () => {
    const [{ rows }] = alignFacts([[fact("y", "1 mm", { exact: "1" })], [fact("y", "1 mm", { exact: "1.00000001" })]]);
    expect(rows[0].cells[1]?.differs).toBe(true);
    expect(rows[0].cells[1]?.note).toMatch(/beyond the figures shown/);
    expect(rows[0].cells[0]?.note).toBeUndefined();
  });
  test("are hidden where all designs agree, with their count, and so is a section left empty", () => {
    const sections = alignFacts([
      [fact("y", "1"), fact("z", "2"), fact("m", "poles", { section: "Method" })],
      [fact("y", "1"), fact("z", "3"), fact("m", "poles", { section: "Method" })],
    ]);
    const { sections: shown, hidden } = withoutEqual(sections);
    expect(hidden).toBe(2);
    expect(shown.map(({ title, rows }) => [title, rows.map(({ key }) => key)])).toEqual([["Figures", ["z"]]]);
  });
});

describe("best and worst", () => {
  test("are the least and the largest; those between and those without a figure are neither", () => {
    expect(verdicts([3, 1, undefined, 2])).toEqual(["worst", "best", null, null]);
  });
  test("are said to be shared by figures that read alike in four digits", () => {
    expect(verdicts([1.00001, 1.00002, 2])).toEqual(["best, shared", "best, shared", "worst"]);
    expect(verdicts([5, 1, 5, 3])).toEqual(["worst, shared", "best", "worst, shared", null]);
  });
  test("are not said where nothing can be told apart", () => {
    expect(verdicts([1, 1.000001])).toEqual([null, null]);
    expect(verdicts([1, undefined])).toEqual([null, null]);
    expect(verdicts([])).toEqual([]);
  });
  test("never part figures that read alike, however many digits they were computed in", () => {
    const [{ rows }] = alignFacts([
      [fact("settling", "3.6 s", { size: 3.601 })],
      [fact("settling", "3.6 s", { size: 3.604 })],
      [fact("settling", "4.8 s", { size: 4.8 })],
    ]);
    expect(rows[0].cells.map((cell) => cell?.verdict)).toEqual(["best, shared", "best, shared", "worst"]);
    const [{ rows: alike }] = alignFacts([[fact("a", "1 s", { size: 1.001 })], [fact("a", "1 s", { size: 1.004 })]]);
    expect(alike[0].cells.map((cell) => cell?.verdict)).toEqual([null, null]);
  });
});

const head = (label: string, unit = "m") => ({ label, unit, axis: null });
const gain = (rows: string[], columns: string[], values: number[][]): GainMatrix => ({
  symbol: "K",
  meaning: "state feedback",
  rows: rows.map((name) => head(name, "N")),
  columns: columns.map((name) => head(name)),
  values,
});

describe("gains of two designs", () => {
  const first = gain(
    ["F", "G"],
    ["y", "v"],
    [
      [1, 2],
      [3, 4],
    ],
  );
  test("are subtracted signal by signal, whatever the order of the signals", () => {
    const { matrix, left } = gainDifference(
      gain(
        ["G", "F"],
        ["v", "y"],
        [
          [44, 33],
          [22, 11],
        ],
      ),
      first,
    );
    expect(matrix.values).toEqual([
      [40, 30],
      [20, 10],
    ]);
    expect(left).toEqual([]);
  });
  test("leave out and name what only one of the two has", () => {
    const { matrix, left } = gainDifference(gain(["F"], ["w", "y"], [[9, 5]]), first);
    expect(matrix.values).toEqual([[4]]);
    expect(matrix.columns.map(({ label }) => label)).toEqual(["y"]);
    expect(left).toEqual(["G", "w", "v"]);
  });
  test("are not subtracted across units", () => {
    const other = { ...first, columns: [head("y", "mm"), head("v")] };
    expect(gainDifference(other, first).matrix.columns.map(({ label }) => label)).toEqual(["v"]);
  });
  test("are marked where they read differently, and where the first has no such signal", () => {
    const marked = differsFrom(gain(["F"], ["v", "w", "y"], [[2.000001, 0, 7]]), first);
    expect([marked(0, 0), marked(0, 1), marked(0, 2)]).toEqual([false, true, true]);
  });
});

describe("a difference that cannot be drawn is said", () => {
  const own = (symbol: string, order: number): GainMatrix => {
    const w = Array.from({ length: order }, (_, k) => ({ label: `w${k + 1}`, axis: null }));
    return { ...gain([], [], []), symbol, rows: w, columns: w };
  };
  const reduced = (label: string, order: number, plantRevision = 1) => ({
    ...{ label, plantRevision },
    observer: { words: `an observer of reduced order ${order}`, order },
  });
  const bare = { label: "Bare", plantRevision: 1, observer: { words: "no observer", order: null } };
  test("where the first has no such matrix", () => {
    expect(noDifference(own("Fw", 2), undefined, reduced("Low", 2), bare)).toBe(
      "Bare has no Fw: it has no observer. That of Low has nothing to be held against.",
    );
    expect(absentWords("F", bare)).toBe("Bare has no F.");
  });
  test("where observers of different order have coordinates of their own", () => {
    expect(noDifference(own("Fw", 2), own("Fw", 3), reduced("Low", 2), reduced("High", 3))).toBe(
      "No difference of Fw of Low and of High: Low has an observer of reduced order 2, High an observer of reduced order 3, each in coordinates of its own.",
    );
    expect(noDifference(own("Fw", 2), own("Fw", 2), reduced("Low", 2), reduced("Old", 2, 4))).toMatch(/different revisions/);
  });
  test("and is drawn where the coordinates are the same or are the plant's", () => {
    expect(noDifference(own("Fw", 2), own("Fw", 2), reduced("Low", 2), reduced("Other", 2))).toBeNull();
    const K = gain(["F"], ["y"], [[1]]);
    expect(noDifference(K, K, reduced("Low", 2), bare)).toBeNull();
  });
});

const signals = (names: readonly string[]) =>
  names.map((name) => ({ role: "commanded" as const, index: names.indexOf(name), name, unit: "mm", axis: names.indexOf(name) }));
const curve = (loop: ResponseCurves["loop"], names: readonly string[], source: number): ResponseCurves => ({
  ...{ kind: "step", loop, source, sourceName: names[source], amplitude: 10, unit: "mm", step: 0.1, samples: 2 },
  signals: [
    ...signals(names),
    { role: "output", index: 0, name: "y", unit: "mm", axis: 0 },
    { role: "input", index: 0, name: "F", unit: "N", axis: 0 },
  ],
  values: [...names.map((_, k) => [0, k]), [0, 9], [5, 0]],
});
const rest = { final: 0, undershoot: null, rise: null };
const overlaid = (label: string, names: readonly string[], hasObserver: boolean, amplitude = 10): OverlaidDesign => ({
  ...{ id: label, label, place: label === "Firm" ? 1 : 0, hasObserver, sampled: true },
  commanded: names.map((name) => ({ name, unit: "mm", amplitude })),
  figures: [
    {
      loop: hasObserver ? "observer" : "full-state",
      source: names.indexOf("y"),
      commanded: names.map((name) => ({ ...rest, peak: 11, peakAt: 0.2, settling: name === "y" ? 0.5 : null, overshoot: 10 })),
      outputs: [{ ...rest, peak: 11, peakAt: 0.2, settling: 0.5, overshoot: 10 }],
      effort: [{ peak: 5, at: 0, overLimit: 1.25 }],
    },
  ],
});

describe("overlaid responses", () => {
  const designs = [overlaid("Soft", ["y", "turn"], true), overlaid("Firm", ["turn", "y"], false)];
  const pictures = overlayPictures(designs, [curve("observer", ["y", "turn"], 0), curve("full-state", ["turn", "y"], 1)]);
  test("put the same quantity of every design into one picture, though its place differs", () => {
    expect(pictures.map(({ name, effort }) => [name, effort])).toEqual([
      ["y", false],
      ["turn", false],
      ["F", true],
    ]);
    expect(pictures[0].traces.map(({ name, values, design }) => [name, values[1], design])).toEqual([
      ["Soft", 0, 0],
      ["Firm", 1, 1],
    ]);
  });
  test("have one hue per quantity, one dash per design, and inputs held between samples", () => {
    expect(pictures[0].traces.map(({ axis }) => axis)).toEqual([0, 0]);
    expect(pictures.map(({ traces }) => traces[0].held)).toEqual([false, false, true]);
  });
  test("say in words what the curves show", () => {
    expect(pictures[0].summary[0]).toBe("Soft: largest deviation 11 mm at 0.2 s, settled after 0.5 s, overshoot 10 %.");
    expect(pictures[2].summary[1]).toBe("Firm: F peaks at 5 N at 0 ms, 125 % of its limit.");
  });
  test("keep a design's dash where an earlier one has no such response", () => {
    const [only] = overlayPictures(designs, [null, curve("full-state", ["turn", "y"], 1)]);
    expect(only.traces.map(({ name, design }) => [name, design])).toEqual([["Firm", 1]]);
  });
  test("keep the dash of every design when they stand in another order", () => {
    const [soft, firm] = designs;
    const [picture] = overlayPictures([firm, soft], [curve("full-state", ["turn", "y"], 1), curve("observer", ["y", "turn"], 0)]);
    expect(picture.traces.map(({ name, design }) => [name, design])).toEqual([
      ["Firm", 1],
      ["Soft", 0],
    ]);
  });
  test("name every size where the tests differ", () => {
    expect(commandText(designs, "y")).toBe("y commanded 10 mm");
    expect(commandText([...designs, overlaid("Long", ["y"], false, 20)], "y")).toBe("y commanded 10 mm or 20 mm");
  });
  test("show the full state of a design without an observer, whatever loop is wanted", () => {
    expect(designs.map((design) => loopOf(design, "observer"))).toEqual(["observer", "full-state"]);
  });
});

describe("designs of different plant revisions", () => {
  const y = { name: "y", axis: 0, accepted: 0.1 };
  const t = { name: "t", axis: 1, accepted: 0.2 };
  const soft = revision(
    "Soft",
    1,
    [y, t],
    [
      [-5, 0, 1],
      [-2, 3, 0],
    ],
  );
  const firm = revision(
    "Firm",
    2,
    [t, { ...y, accepted: 0.3 }],
    [
      [-8, 0, 0],
      [-4, 0, 1],
    ],
  );
  const { sections, designs } = arrangeDesigns(compareDesigns([soft, firm]), null);
  const texts = (title: string) =>
    sections
      .find((section) => section.title === title)
      ?.rows.map(({ label, cells }) => [label, ...cells.map((cell) => cell?.text)]);

  test("have their weights matched by the names of the signals, not by place", () => {
    expect(texts("Largest deviation accepted")).toEqual([
      ["y", "0.1 m", "0.3 m"],
      ["t", "0.2 m", "0.2 m"],
    ]);
  });
  test("have their poles matched by the axis that they mostly move", () => {
    expect(texts("Closed-loop poles")).toEqual([
      ["travel, slowest", "−2 ± 3 i 1/s", "−4 1/s"],
      ["turn, slowest", "−5 1/s", "−8 1/s"],
    ]);
  });
  test("show written reasons across, and say what was refused", () => {
    expect(texts("Reasons")).toEqual([["state weights", "as Soft needs", "as Firm needs"]]);
    expect(texts("Responses")?.[0][1]).toBe("Not solved. No reason.");
  });
  test("are told apart by revision where two are of one design", () => {
    expect(designs.map(({ label }) => label)).toEqual(["Soft", "Firm"]);
    expect(compareDesigns([soft, { ...soft, number: 4 }]).designs.map(({ label }) => label)).toEqual([
      "Soft revision 1",
      "Soft revision 4",
    ]);
  });
});
