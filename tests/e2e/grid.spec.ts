import type { PlantRevision } from "@/lib/schemas/plant";
import { told } from "../helpers/browser-requests";
import { cellOf, entriesOf, gridOf, heldCell, onClipboard, openPlant, pasteAt } from "../helpers/matrix-page";
import { seededUniform } from "../helpers/seeded";
import { expect, storedPlant, test } from "../helpers/team-test";

const zeros = (rows: number, columns: number) => Array.from({ length: rows }, () => new Array<string>(columns).fill("0"));

/** A plant with a square matrix of the wanted size. */
const largePlant = (states: number, A: string[][] = zeros(states, states)) => ({
  axes: [],
  parameters: [],
  states: Array.from({ length: states }, (_, index) => ({ name: `x${index + 1}`, unit: "m", axis: null, scale: null })),
  inputs: [{ name: "F", unit: "N", axis: null, scale: null, lower: null, upper: null }],
  outputs: [{ name: "y", unit: "m", axis: null, scale: null }],
  A,
  B: zeros(states, 1).map((_, row) => [row === 0 ? "1" : "0"]),
  C: [Array.from({ length: states }, (_, column) => (column === 0 ? "1" : "0"))],
});

test.describe("by keyboard", () => {
  test("a four by four matrix is entered without a mouse, and the grid is one tab stop", async ({ page }) => {
    await openPlant(page, "/plants/new");
    await page.getByRole("combobox", { name: "Time base" }).focus();
    await page.keyboard.press("Tab");
    expect(await heldCell(page)).toBe("A, row 1 x1′, column 1 x1: 0");
    const wanted = [
      ["0", "0", "1", "0"],
      ["0", "0", "0", "1"],
      ["-12.5", "3", "-0.4", "1e-3"],
      ["3", "-12.5", "0.25", "-0.4"],
    ];
    for (const row of wanted) {
      for (const entry of row) {
        await page.keyboard.type(entry);
        await page.keyboard.press("ArrowRight");
      }
      await page.keyboard.press("Home");
      await page.keyboard.press("ArrowDown");
    }
    expect(await entriesOf(page, "A")).toEqual(wanted);
    await page.keyboard.press("Tab");
    expect(await heldCell(page)).toBe("B, row 1 x1′, column 1 F1: 0");
    await page.keyboard.press("Shift+Tab");
    expect(await heldCell(page)).toBe("A, row 4 v2′, column 1 x1: 3");
    await expect(gridOf(page, "A").locator("[tabindex='0']")).toHaveCount(1);
  });

  test("Home, End and both with Ctrl move to the ends, and nothing leads out of the grid", async ({ page }) => {
    await openPlant(page, "/plants/new");
    await cellOf(page, "A", 2, 2).click();
    const moves: readonly (readonly [string, string])[] = [
      ["End", "row 2 x2′, column 4 v2"],
      ["ArrowRight", "row 2 x2′, column 4 v2"],
      ["Home", "row 2 x2′, column 1 x1"],
      ["Control+End", "row 4 v2′, column 4 v2"],
      ["ArrowDown", "row 4 v2′, column 4 v2"],
      ["ArrowLeft", "row 4 v2′, column 3 v1"],
      ["Control+ArrowUp", "row 1 x1′, column 3 v1"],
      ["PageDown", "row 4 v2′, column 3 v1"],
      ["Control+Home", "row 1 x1′, column 1 x1"],
      ["ArrowUp", "row 1 x1′, column 1 x1"],
    ];
    for (const [key, place] of moves) {
      await page.keyboard.press(key);
      expect(await heldCell(page), key).toContain(`A, ${place}:`);
    }
  });

  test("Enter and F2 edit, Escape gives up, typing replaces and Delete clears", async ({ page }) => {
    await openPlant(page, "/plants/new");
    const cell = cellOf(page, "A", 1, 3);
    await cell.click();
    await page.keyboard.press("Enter");
    await page.keyboard.type("5");
    await page.keyboard.press("Escape");
    await expect(cell).toHaveText("1");
    await expect(cell).toBeFocused();
    await page.keyboard.press("F2");
    await page.keyboard.type("5");
    await page.keyboard.press("Enter");
    await expect(cell).toHaveText("15");
    expect(await heldCell(page)).toContain("row 2 x2′, column 3 v1");
    await page.keyboard.press("ArrowUp");
    await page.keyboard.type("-2.5");
    await page.keyboard.press("Shift+Enter");
    await expect(cell).toHaveText("−2.5");
    await page.keyboard.press("Delete");
    await expect(cell).toHaveAccessibleName("A, row 1 x1′, column 3 v1: 0");
    await page.keyboard.press("Control+z");
    await expect(cell).toHaveText("−2.5");
  });
});

test.describe("to a screen reader", () => {
  test("the tree holds the grid, its headers and every cell by row and column name", async ({ page, team }) => {
    const plant = await storedPlant(team.lead.request);
    await openPlant(page, `/plants/${plant.id}`);
    await expect(gridOf(page, "B")).toMatchAriaSnapshot(`
      - grid "B · what each actuator does":
        - rowgroup:
          - row:
            - gridcell
            - columnheader "F1 N"
            - columnheader "F2 N"
        - rowgroup:
          - row:
            - rowheader "x1′ m/s"
            - 'gridcell "B, row 1 x1′, column 1 F1: 0" [selected]': "0"
            - 'gridcell "B, row 1 x1′, column 2 F2: 0"': "0"
          - row:
            - rowheader "x2′ m/s"
            - 'gridcell "B, row 2 x2′, column 1 F1: 0"': "0"
            - 'gridcell "B, row 2 x2′, column 2 F2: 0"': "0"
          - row:
            - rowheader "v1′ m/s²"
            - 'gridcell "B, row 3 v1′, column 1 F1: 0.08333, written 1/m"': "0.08333"
            - 'gridcell "B, row 3 v1′, column 2 F2: 0"': "0"
          - row:
            - rowheader "v2′ m/s²"
            - 'gridcell "B, row 4 v2′, column 1 F1: 0"': "0"
            - 'gridcell "B, row 4 v2′, column 2 F2: 0.08333, written 1/m"': "0.08333"
    `);
    const grid = gridOf(page, "B");
    await expect(grid).toHaveAttribute("aria-rowcount", "5");
    await expect(grid).toHaveAttribute("aria-colcount", "3");
    await expect(grid).not.toHaveAttribute("aria-readonly");
    await expect(cellOf(page, "B", 3, 2)).toHaveAttribute("aria-colindex", "3");
    await expect(grid.getByRole("row").nth(3)).toHaveAttribute("aria-rowindex", "4");
    await cellOf(page, "B", 3, 1).click();
    await expect(cellOf(page, "B", 3, 1)).toHaveAccessibleDescription(/1\/m.*= 0\.08333.*m\/s² per N/);
  });

  test("a cell in error is invalid and described by what is wrong", async ({ page }) => {
    await openPlant(page, "/plants/new");
    const cell = cellOf(page, "A", 3, 1);
    await cell.click();
    await page.keyboard.type("-q/m");
    await page.keyboard.press("Enter");
    await expect(cell).toHaveAttribute("aria-invalid", "true");
    await page.keyboard.press("ArrowUp");
    await expect(cell).toHaveAccessibleDescription(/"q" is not a parameter of this plant\. Correct the name/);
  });

  test("a reviewer's grids are read-only in the tree and to every key", async ({ team, colleague }) => {
    const plant = await storedPlant(team.lead.request);
    const page = await colleague("reviewer");
    await openPlant(page, `/plants/${plant.id}`);
    await expect(gridOf(page, "A")).toHaveAttribute("aria-readonly", "true");
    await cellOf(page, "A", 1, 3).click();
    const before = await entriesOf(page, "A");
    for (const key of ["5", "Enter", "Delete", "Backspace", "F2", "Control+x", "Control+v"]) await page.keyboard.press(key);
    expect(await heldCell(page)).toContain("row 1 x1′, column 3 v1");
    expect(await entriesOf(page, "A")).toEqual(before);
  });
});

const START = [
  ["0", "0", "1", "0"],
  ["0", "0", "0", "1"],
  ["0", "0", "0", "0"],
  ["0", "0", "0", "0"],
];
/** START with a block written over its upper left corner. */
const written = (block: readonly (readonly string[])[]) => START.map((row, r) => row.map((entry, c) => block[r]?.[c] ?? entry));

/** Rows of the block are told apart by a bar. */
const PASTED: readonly { readonly name: string; readonly text: string; readonly block: string; readonly marked?: number[][] }[] =
  [
    { name: "tabs", text: "1\t2\n3\t4", block: "1 2|3 4" },
    { name: "commas", text: "1,2.5,3\n-4,5,6", block: "1 2.5 3|-4 5 6" },
    { name: "semicolons with decimal commas", text: "1,5;2,25\n-3,125;4", block: "1.5 2.25|-3.125 4" },
    { name: "spaces", text: "1 0 -2.5\n0 1 3", block: "1 0 -2.5|0 1 3" },
    { name: "CRLF line ends and a trailing line", text: "1\t2\r\n3\t4\r\n", block: "1 2|3 4" },
    { name: "blanks", text: "1\t\t3\n\t5\t", block: "1 0 3|0 5 0" },
    { name: "exponents", text: "1e-3\t2.5E+4", block: "1e-3 2.5E+4" },
    { name: "true minus signs", text: "\u22121\t2\n1e\u22123\t\u22120,5", block: "-1 2|1e-3 -0.5" },
    { name: "no-break spaces", text: "\u00a01\u202f234,5\t2\u00a0\n12\u00a0345\t-1", block: "1234.5 2|12345 -1" },
    { name: "quoted cells", text: '"1,5"\t"7"\n"2"\t4', block: "1.5 7|2 4" },
    { name: "a byte-order mark", text: "\ufeff1;2\n3;4", block: "1 2|3 4" },
    { name: "ragged rows", text: "1 2 3\n4\n5 6", block: "1 2 3|4 0 0|5 6 0" },
    { name: "one entry", text: "-7.25\n", block: "-7.25" },
    {
      name: "more rows and columns than there are",
      text: "1 2 3 4 5\n6 7 8 9 1\n2 3 4 5 6\n7 8 9 1 2\n3 4 5 6 7",
      block: "1 2 3 4|6 7 8 9|2 3 4 5|7 8 9 1",
    },
    {
      name: "cells that are no numbers",
      text: "1\t#DIV/0!\n3\tno_such",
      block: "1 #DIV/0!|3 no_such",
      marked: [
        [1, 2],
        [2, 2],
      ],
    },
    { name: "a comma that can mean two things", text: "1,234\t7", block: "1,234 7", marked: [[1, 1]] },
  ];

test.describe("a paste", () => {
  test("of every kind lands whole, marks what it could not read, and is one step back", async ({ page }) => {
    test.setTimeout(150_000);
    await openPlant(page, "/plants/new");
    const undo = page.getByRole("button", { name: "Undo", exact: true });
    for (const { name, text, block, marked = [] } of PASTED) {
      await test.step(name, async () => {
        const wanted = written(block.split("|").map((row) => row.split(" ")));
        await pasteAt(page, cellOf(page, "A", 1, 1), text);
        await expect.poll(() => entriesOf(page, "A")).toEqual(wanted);
        await expect(gridOf(page, "A").locator("[aria-invalid=true]")).toHaveCount(marked.length);
        for (const [row, column] of marked) await expect(cellOf(page, "A", row, column)).toHaveAttribute("aria-invalid", "true");
        await expect(page.getByRole("button", { name: "Save plant" })).toBeEnabled({ enabled: marked.length === 0 });
        await page.keyboard.press("Control+z");
        await expect.poll(() => entriesOf(page, "A")).toEqual(START);
        await expect(undo).toBeDisabled();
      });
    }
    await page.keyboard.press("Control+y");
    expect((await entriesOf(page, "A"))[0][0]).toBe("1,234");
  });

  test("that is too large says how much was left out", async ({ page }) => {
    await openPlant(page, "/plants/new");
    await pasteAt(page, cellOf(page, "A", 4, 3), "1 2 3\n4 5 6");
    await expect(page.getByRole("status").filter({ hasText: "Pasted 2 × 3 entries at row 4, column 3" })).toContainText(
      "4 of its entries fell outside the grid and were left out.",
    );
    expect((await entriesOf(page, "A")).at(3)).toEqual(["0", "0", "1", "2"]);
  });

  test("of fifty by fifty entries is on the page in one step", async ({ page, team }, info) => {
    const plant = await storedPlant(team.lead.request, largePlant(50));
    await openPlant(page, `/plants/${plant.id}`);
    const draw = seededUniform(50);
    const entries = Array.from({ length: 50 }, () =>
      Array.from({ length: 50 }, () => String(Math.round(1e4 * draw()) / 100 + 0.5)),
    );
    await cellOf(page, "A", 1, 1).click();
    await onClipboard(page, entries.map((row) => row.join("\t")).join("\n"));
    await page.evaluate(() =>
      document.addEventListener(
        "paste",
        () => {
          const start = performance.now();
          setTimeout(() => document.body.setAttribute("data-took", String(performance.now() - start)));
        },
        { capture: true, once: true },
      ),
    );
    await page.keyboard.press("Control+v");
    await expect(page.locator("body[data-took]")).toBeAttached();
    const milliseconds = Math.round(Number(await page.locator("body").getAttribute("data-took")));
    info.annotations.push({ type: "measured", description: `50 × 50 pasted and drawn in ${milliseconds} ms` });
    console.log(`50 × 50 entries: pasted and drawn in ${milliseconds} ms`);
    expect(await entriesOf(page, "A")).toEqual(entries);
    await page.keyboard.press("Control+z");
    await expect.poll(() => entriesOf(page, "A")).toEqual(zeros(50, 50));
  });
});

test("a thousand random doubles are copied, pasted and stored bit for bit", async ({ page, team }) => {
  const draw = seededUniform(20260704);
  const bits = new DataView(new ArrayBuffer(8));
  const oneDouble = (): number => {
    bits.setUint32(0, Math.floor(draw() * 2 ** 32));
    bits.setUint32(4, Math.floor(draw() * 2 ** 32));
    // Exponents between -20 and 20: a plant's checks are not what is under test here.
    const scaled =
      (1 + (bits.getUint32(0) % 2 ** 20) / 2 ** 20 + bits.getUint32(4) / 2 ** 52) * 2 ** Math.floor(draw() * 40 - 20);
    return draw() < 0.5 ? -scaled : scaled;
  };
  const doubles = Array.from({ length: 32 }, () => Array.from({ length: 32 }, oneDouble));
  const from = await storedPlant(team.lead.request, {
    name: "From",
    ...largePlant(
      32,
      doubles.map((row) => row.map(String)),
    ),
  });
  const to = await storedPlant(team.lead.request, { name: "To", ...largePlant(32) });
  await page.context().grantPermissions(["clipboard-read", "clipboard-write"]);
  await openPlant(page, `/plants/${from.id}`);
  await cellOf(page, "A", 5, 5).click();
  await page.keyboard.press("Control+a");
  await page.keyboard.press("Control+c");
  await openPlant(page, `/plants/${to.id}`);
  await cellOf(page, "A", 1, 1).click();
  await page.keyboard.press("Control+v");
  await page.getByRole("button", { name: "Save revision 2" }).click();
  await page.getByRole("dialog").getByRole("button", { name: "Save", exact: true }).click();
  await expect(page.getByText("Revision 2 is saved.")).toBeVisible();
  const { currentRevision } = await told<typeof to>(team.lead.request, `/api/v1/plants/${to.id}`);
  const stored = await told<PlantRevision>(team.lead.request, `/api/v1/plants/${to.id}/revisions/${currentRevision.id}`);
  const differ = stored.model.A.flatMap((row, r) => row.filter((value, c) => !Object.is(value, doubles[r][c])));
  expect(differ).toEqual([]);
  expect(doubles.flat().length).toBeGreaterThanOrEqual(1_000);
});

test("a hundred random edits, pastes, resizes and clears are all taken back and all done again", async ({ page }) => {
  test.setTimeout(150_000);
  await openPlant(page, "/plants/new");
  const draw = seededUniform(606);
  const pick = (count: number) => Math.floor(draw() * count);
  const number = () => String((1 + pick(9_000)) / 100 + 0.001 * (1 + pick(9)));
  const everything = async () => ({
    A: await entriesOf(page, "A"),
    B: await entriesOf(page, "B"),
    C: await entriesOf(page, "C"),
  });
  const anyCell = async () => {
    const name = (["A", "B", "C"] as const)[pick(3)];
    const entries = await entriesOf(page, name);
    return cellOf(page, name, 1 + pick(entries.length), 1 + pick(entries[0].length));
  };
  const resize = async (button: RegExp) => {
    await page.getByRole("tab", { name: /^Signals/ }).click();
    await page.getByRole("button", { name: button }).first().click();
    await page.getByRole("tab", { name: "Model" }).click();
  };
  const start = await everything();
  let edited = cellOf(page, "A", 1, 1);
  for (let step = 0; step < 100; step++) {
    const kind = step % 10;
    if (kind === 9) await resize(step % 20 === 9 ? /^Add state$/ : /^Remove state/);
    else if (kind === 3 || kind === 6) await pasteAt(page, await anyCell(), `${number()}\t${number()}\n${number()}\t${number()}`);
    else if (kind === 8) {
      await edited.click();
      await page.keyboard.press("Delete");
    } else {
      edited = await anyCell();
      await edited.click();
      await page.keyboard.type(number());
      await page.keyboard.press("Enter");
    }
  }
  const end = await everything();
  const pressAll = async (name: string) => {
    const button = page.getByRole("button", { name, exact: true });
    let presses = 0;
    for (; await button.isEnabled(); presses++) await button.click();
    return presses;
  };
  expect(await pressAll("Undo")).toBe(100);
  expect(await everything()).toEqual(start);
  expect(await pressAll("Redo")).toBe(100);
  expect(await everything()).toEqual(end);
});
