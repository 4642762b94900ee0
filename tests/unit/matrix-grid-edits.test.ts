import { describe, expect, test } from "vitest";
import { blockShares } from "@/components/matrix/block-shares";
import { areaOf, fill, writeBlock } from "@/components/matrix/grid-edits";
import { afterEntry, gridAction } from "@/components/matrix/grid-keys";
import { pasteInto } from "@/components/matrix/grid-paste";
import { entriesAsText, valuesAsText } from "@/components/matrix/matrix-text";
import { readTyped } from "@/components/matrix/parse-pasted";

const zeros = (rows: number, columns: number) => Array.from({ length: rows }, () => Array.from({ length: columns }, () => "0"));
const press = (key: string, more: Partial<{ ctrl: boolean; shift: boolean; alt: boolean }> = {}) => ({
  key,
  ctrl: false,
  shift: false,
  alt: false,
  ...more,
});
const everything = (rows: number, columns: number) => areaOf({ r: 0, c: 0 }, { r: rows - 1, c: columns - 1 });

describe("keys in a grid of 4 by 3, in row 2 and column 2", () => {
  const at = { r: 1, c: 1 };
  const go = (key: string, more = {}) => gridAction(press(key, more), at, 4, 3);

  test.each([
    ["ArrowUp", {}, 0, 1],
    ["ArrowDown", {}, 2, 1],
    ["ArrowLeft", {}, 1, 0],
    ["ArrowRight", {}, 1, 2],
    ["Home", {}, 1, 0],
    ["End", {}, 1, 2],
    ["Home", { ctrl: true }, 0, 0],
    ["End", { ctrl: true }, 3, 2],
    ["ArrowDown", { ctrl: true }, 3, 1],
    ["PageDown", {}, 3, 1],
  ])("%s %o moves to where a spreadsheet would", (key, more, r, c) => {
    expect(go(key, more)).toEqual({ do: "move", to: { r, c }, extend: false });
  });

  test("Shift extends the selection", () => {
    expect(go("ArrowRight", { shift: true })).toEqual({ do: "move", to: { r: 1, c: 2 }, extend: true });
  });

  test("Enter and F2 edit, a character replaces, Delete clears", () => {
    expect(go("Enter")).toEqual({ do: "edit" });
    expect(go("F2")).toEqual({ do: "edit" });
    expect(go("7")).toEqual({ do: "replace", text: "7" });
    expect(go("-")).toEqual({ do: "replace", text: "-" });
    expect(go("Delete")).toEqual({ do: "clear" });
  });

  test("undo and redo answer to the usual keys", () => {
    expect(go("z", { ctrl: true })).toEqual({ do: "undo" });
    expect(go("Z", { ctrl: true, shift: true })).toEqual({ do: "redo" });
    expect(go("y", { ctrl: true })).toEqual({ do: "redo" });
  });

  test("Tab, copy, paste and browser keys are left to the browser", () => {
    for (const key of [
      press("Tab"),
      press("c", { ctrl: true }),
      press("v", { ctrl: true }),
      press("F5"),
      press("ArrowLeft", { alt: true }),
    ])
      expect(gridAction(key, at, 4, 3)).toBeNull();
  });

  test("moves stop at the edges", () => {
    expect(gridAction(press("ArrowUp"), { r: 0, c: 0 }, 4, 3)).toEqual({ do: "move", to: { r: 0, c: 0 }, extend: false });
  });

  test("arrows finish an entry that was begun by typing over the cell, and move the caret in one that is edited", () => {
    expect(afterEntry(press("ArrowRight"), true)).toEqual([0, 1]);
    expect(afterEntry(press("ArrowRight"), false)).toBeNull();
    expect(afterEntry(press("Enter"), false)).toEqual([1, 0]);
    expect(afterEntry(press("Enter", { shift: true }), false)).toEqual([-1, 0]);
  });
});

describe("edits", () => {
  test("a symmetric entry is mirrored across the diagonal", () => {
    const { entries } = writeBlock(zeros(3, 3), { r: 0, c: 2 }, [["k"]], true);
    expect(entries).toEqual([
      ["0", "0", "k"],
      ["0", "0", "0"],
      ["k", "0", "0"],
    ]);
  });

  test("a pasted block keeps both sides of the diagonal as they were pasted", () => {
    const block = [
      ["1", "2"],
      ["3", "4"],
    ];
    expect(writeBlock(zeros(2, 2), { r: 0, c: 0 }, block, true).entries).toEqual(block);
  });

  test("an edit that changes nothing gives the same entries back, so it is no step", () => {
    const entries = zeros(2, 2);
    expect(writeBlock(entries, { r: 0, c: 0 }, [["0"]]).entries).toBe(entries);
    expect(fill(entries, everything(2, 2), "0")).toBe(entries);
  });

  test("nothing that was given is changed in place", () => {
    const entries = zeros(2, 2);
    writeBlock(entries, { r: 0, c: 0 }, [["5"]]);
    expect(entries).toEqual(zeros(2, 2));
  });
});

describe("paste into a grid", () => {
  test("keeps what fits and counts what falls outside", () => {
    const { entries, said, area } = pasteInto(zeros(2, 2), areaOf({ r: 1, c: 1 }, { r: 1, c: 1 }), "1\t2\n3\t4", false);
    expect(entries).toEqual([
      ["0", "0"],
      ["0", "1"],
    ]);
    expect(said).toContain("3 of its entries fell outside");
    expect(area).toEqual({ top: 1, left: 1, bottom: 1, right: 1 });
  });

  test("marks a bad cell where it lands and keeps the rest", () => {
    const { entries, doubts } = pasteInto(zeros(3, 3), areaOf({ r: 1, c: 1 }, { r: 1, c: 1 }), "1\t#REF!\n3\t4", false);
    expect(entries[1]).toEqual(["0", "1", "#REF!"]);
    expect(entries[2]).toEqual(["0", "3", "4"]);
    expect(doubts).toMatchObject([{ r: 1, c: 2, entry: "#REF!" }]);
  });

  test("of a single entry fills the whole selection", () => {
    expect(pasteInto(zeros(2, 3), everything(2, 3), "2.5", false).entries).toEqual([
      ["2.5", "2.5", "2.5"],
      ["2.5", "2.5", "2.5"],
    ]);
  });

  test("of a column with decimal commas into a one-column grid stays a column", () => {
    expect(pasteInto(zeros(2, 1), areaOf({ r: 0, c: 0 }, { r: 0, c: 0 }), "0,5\n-1,25", false).entries).toEqual([
      ["0.5"],
      ["-1.25"],
    ]);
  });

  test("brings copied entries back exactly, expressions and odd texts included", () => {
    const entries = [
      ["-(k + k2)/m", "0.1", "1e-300"],
      ['say "x"', "5e-324", "-1.7976931348623157e308"],
    ];
    expect(pasteInto(zeros(2, 3), everything(2, 3), entriesAsText(entries), false).entries).toEqual(entries);
  });
});

test("a typed decimal comma and a true minus become plain; 1,234 is asked back", () => {
  expect(readTyped("\u22120,5")).toEqual({ entry: "-0.5" });
  expect(readTyped("  ")).toEqual({ entry: "0" });
  expect(readTyped("1,234").message).toContain("1.234 or 1234");
});

test("copied values come back bit for bit, negative zero included", () => {
  const values = [[0.1 + 0.2, -0, 5e-324, 1 / 3]];
  const back = valuesAsText(values).split("\t").map(Number);
  expect(back.every((x, i) => Object.is(x, values[0][i]))).toBe(true);
});

describe("block shares", () => {
  const axis = (index: number, scale: number | null = null) => ({ label: "s", axis: index, scale });

  test("are the Frobenius shares of the blocks and square to one", () => {
    const values = [
      [3, 0],
      [4, 0],
    ];
    const share = blockShares(values, [axis(0), axis(1)], [axis(0), axis(1)]);
    expect(share(0, 0)).toBeCloseTo(0.6, 15);
    expect(share(1, 0)).toBeCloseTo(0.8, 15);
    expect(share(0, 1)).toBe(0);
  });

  test("follow the largest acceptable deviations: a map divides by the row's, a form multiplies by both", () => {
    const values = [
      [1, 1],
      [1, 1],
    ];
    const [headers, plain] = [
      [axis(0, 1), axis(1, 10)],
      [axis(0), axis(1)],
    ];
    const map = blockShares(values, headers, headers);
    expect(map(0, 1) / map(1, 0)).toBeCloseTo(100, 10);
    const form = blockShares(values, headers, headers, "form");
    expect(form(0, 1)).toBeCloseTo(form(1, 0), 15);
    expect(form(1, 1) / form(0, 0)).toBeCloseTo(100, 10);
    expect(blockShares(values, plain, plain)(0, 0)).toBeCloseTo(0.5, 15);
  });

  test("of zeros and of entries near the end of the range of doubles are finite", () => {
    expect(blockShares([[0]], [axis(0)], [axis(0)])(0, 0)).toBe(0);
    expect(blockShares([[1e200, 1e200]], [axis(0)], [axis(0), axis(1)])(0, 1)).toBeCloseTo(Math.SQRT1_2, 15);
  });
});
