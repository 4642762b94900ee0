import { expect, test } from "vitest";
import { chooseDraft, sameDraft } from "@/components/designs/drafts/choose-draft";
import type { LocalDraft } from "@/components/designs/drafts/draft-store";
import { benchAct } from "@/components/designs/keys/bench-key";
import { formOf } from "@/components/designs/recipe/recipe-form";
import { defaultRecipe } from "@/control/design/default-recipe";
import type { Draft } from "@/lib/schemas/draft";
import { coupledModel } from "../helpers/coupled-model";

const model = coupledModel();
const form = formOf(defaultRecipe(model), model);
const base = { version: 3, revisionId: "r1" };
const local = (more: Partial<LocalDraft> = {}): LocalDraft => ({
  ...{ form, base, plantRevisionId: "p1", where: "browser", synced: false, marks: [] },
  at: "2031-04-05T06:07:08.000Z",
  ...more,
});
const server = (horizon: number, more: Partial<Draft> = {}): Draft => ({
  ...{ base, plantRevisionId: "p1", mark: "s1", updatedAt: "2031-04-05T06:07:08.000Z" },
  form: { ...form, test: { ...form.test, horizon } },
  ...more,
});
const horizonOf = (choice: ReturnType<typeof chooseDraft>) => choice.draft?.form.test.horizon;

test("what only one of them has comes back", () => {
  expect(chooseDraft(null, null)).toEqual({ draft: null, marks: [], other: null });
  const mine = local();
  expect(chooseDraft(mine, null)).toEqual({ draft: mine, marks: [], other: null });
  const theirs = chooseDraft(null, server(7));
  expect([horizonOf(theirs), theirs.draft?.where, theirs.marks, theirs.other]).toEqual([7, "server", ["s1"], null]);
});

test("a copy that is ahead of the server's draft, which it grew from, comes back", () => {
  const mine = local({ marks: ["s0", "s1"] });
  expect(chooseDraft(mine, server(7, { updatedAt: "2031-04-06T00:00:00.000Z" }))).toEqual({
    draft: mine,
    marks: ["s1"],
    other: null,
  });
});

test("a copy that the server had in full gives way to what was written elsewhere since, or to its removal", () => {
  const mine = local({ marks: ["s0"], synced: true });
  expect(horizonOf(chooseDraft(mine, server(7)))).toBe(7);
  expect(chooseDraft(mine, null)).toEqual({ draft: null, marks: [], other: null });
});

test("where both went on, the newer comes back and the other is asked about", () => {
  const newer = chooseDraft(local({ at: "2031-04-05T07:00:00.000Z" }), server(7));
  expect([newer.draft?.where, newer.other?.where, newer.marks]).toEqual(["browser", "server", ["s1"]]);
  const older = chooseDraft(local({ at: "2031-04-05T05:00:00.000Z" }), server(7));
  expect([older.draft?.where, older.other?.where, older.marks]).toEqual(["server", "browser", ["s1"]]);
});

test("the same work twice is not asked about, in whatever order its fields come", () => {
  const turned = Object.fromEntries(Object.entries(form).reverse());
  const choice = chooseDraft(local(), server(0, { form: turned }));
  expect([choice.draft?.where, choice.other]).toEqual(["browser", null]);
  expect(sameDraft(local(), local({ base: null }))).toBe(false);
});

test.each([
  ["Ctrl+Enter solves, also while typing", { key: "Enter", ctrl: true, typing: true }, "solve"],
  ["Ctrl+S saves, also while typing", { key: "s", ctrl: true, typing: true }, "save"],
  ["Ctrl+Z undoes", { key: "z", ctrl: true }, "undo"],
  ["Ctrl+Z in a text field is the field's own", { key: "z", ctrl: true, typing: true }, null],
  ["Ctrl+Shift+Z redoes", { key: "Z", ctrl: true, shift: true }, "redo"],
  ["Ctrl+Y redoes", { key: "y", ctrl: true }, "redo"],
  ["? opens the map", { key: "?", shift: true }, "map"],
  ["? in a text field is a question mark", { key: "?", shift: true, typing: true }, null],
  ["Alt belongs to the browser", { key: "z", ctrl: true, alt: true }, null],
  ["Enter alone belongs to what has the focus", { key: "Enter" }, null],
  ["Ctrl+Shift+S belongs to the browser", { key: "S", ctrl: true, shift: true }, null],
])("%s", (_, pressed, act) => {
  expect(benchAct({ ctrl: false, shift: false, alt: false, typing: false, ...pressed })).toBe(act);
});
