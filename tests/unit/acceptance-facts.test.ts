import { expect, test } from "vitest";
import { arrangeDesigns } from "@/components/side-by-side/arrange-designs";
import { compareDesigns } from "@/components/side-by-side/compare-designs";
import { comparisonSource } from "@/components/side-by-side/comparison-file";
import type { Criterion } from "@/control/design/criteria";
import type { DesignRevision } from "@/lib/schemas/design";
import { toAcceptance } from "@/lib/services/designs/to-acceptance";
import { steppedRevision } from "../helpers/compared-revision";

const criteria: Criterion[] = [
  { kind: "settling", signal: "y", limit: 2 },
  { kind: "settling", signal: null, limit: 4 },
  { kind: "overshoot", signal: "gone", limit: 5 },
];
const judged = (revision: DesignRevision): DesignRevision => ({
  ...revision,
  acceptance: toAcceptance(criteria, "plant", { evidence: revision.evidence, model: revision.model }),
});
const calm = judged(steppedRevision("Calm", { settling: [4.8, 2], effort: 40 }));
const quick = judged(steppedRevision("Quick", { settling: [1, 3.6], effort: 120 }));
const TITLE = "Acceptance criteria of the plant, as they stand now";

test("every criterion is a row that says met or not met of each design, with its figure", () => {
  const { sections } = arrangeDesigns(compareDesigns([calm, quick]), null);
  const rows = sections.find(({ title }) => title === TITLE)?.rows ?? [];
  expect(rows.map(({ label, cells }) => [label, ...cells.map((cell) => cell?.text)])).toEqual([
    ["criteria met", "0 of 3", "2 of 3"],
    ["settling of y to 2 %, at most 2 s", "not met, 4.8 s", "met, 1 s"],
    ["worst settling to 2 %, at most 4 s", "not met, 4.8 s", "met, 3.6 s"],
    ["overshoot of gone, at most 5 %", ...Array(2).fill("not met, the plant has no commanded quantity gone")],
  ]);
  expect(rows[1].cells.map((cell) => cell?.mark?.kind)).toEqual(["unmet", "met"]);
  expect(rows[0].cells.map((cell) => cell?.verdict)).toEqual(["worst", "best"]);
});

test("designs stand in order by how many they meet", () => {
  const { designs, sorted } = arrangeDesigns(compareDesigns([calm, quick]), { key: "criteria", order: "least" });
  expect(designs.map(({ name }) => name)).toEqual(["Quick", "Calm"]);
  expect(sorted).toContain("criteria that are not met, least first");
});

test("a file has the figures as numbers and the verdicts in words", () => {
  const lines = comparisonSource([calm, quick]).lines.filter(({ section }) => section === TITLE);
  const settling = lines.filter(({ item }) => item.startsWith("settling of y"));
  expect(settling.map(({ figure, unit, cells }) => [figure, unit, ...cells])).toEqual([
    ["", "s", 4.8, 1],
    ["in words", "", "not met, 4.8 s", "met, 1 s"],
  ]);
});

test("without criteria nothing is said of them", () => {
  const plain = steppedRevision("Calm", { settling: [4.8, 2], effort: 40 });
  const { sections } = arrangeDesigns(compareDesigns([plain, plain]), null);
  expect(sections.map(({ title }) => title)).not.toContain(TITLE);
});
