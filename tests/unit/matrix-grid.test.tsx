// @vitest-environment happy-dom
import { act, useState } from "react";
import { createRoot, type Root } from "react-dom/client";
import { afterEach, beforeEach, describe, expect, test } from "vitest";
import { MatrixGrid } from "@/components/matrix/matrix-grid";
import { WovenMatrix } from "@/components/matrix/woven-matrix";

// React's own switch for tests that drive it with act().
Object.assign(globalThis, { IS_REACT_ACT_ENVIRONMENT: true });

const rows = [
  { label: "travel rate", unit: "m/s", axis: 0 },
  { label: "pitch rate", unit: "rad/s", axis: 1 },
];
const columns = [
  { label: "travel", unit: "m", axis: 0 },
  { label: "pitch", unit: "rad", axis: 1 },
  { label: "force", unit: "N", axis: 0 },
];
const START = [
  ["0", "1", "2.5"],
  ["0", "-4", "k"],
];

let host: HTMLElement;
let root: Root;
let latest: readonly (readonly string[])[];
const reasons: string[] = [];

function Bench({ symmetric = false, readOnly = false }: Readonly<{ symmetric?: boolean; readOnly?: boolean }>) {
  const [entries, setEntries] = useState(symmetric ? START.map((row) => row.slice(0, 2)) : START);
  latest = entries;
  const problems = new Map(
    entries.flatMap((row, r) => row.flatMap((text, c) => (text === "k" ? [[`${r},${c}`, "k is no parameter."] as const] : []))),
  );
  const change = (next: string[][], reason: string) => {
    reasons.push(reason);
    setEntries(next);
  };
  return (
    <MatrixGrid
      name="A"
      caption="how the states drive each other"
      rows={rows}
      columns={symmetric ? rows : columns}
      entries={entries}
      onChange={readOnly ? undefined : change}
      problems={problems}
      symmetric={symmetric}
    />
  );
}

const show = (node: React.ReactNode) => act(async () => root.render(node));
const cell = (r: number, c: number) => host.querySelector<HTMLElement>(`[data-r="${r}"][data-c="${c}"]`) as HTMLElement;
const input = () => host.querySelector<HTMLInputElement>("td input");
const press = (key: string, more: KeyboardEventInit = {}) =>
  act(async () =>
    document.activeElement?.dispatchEvent(new KeyboardEvent("keydown", { key, bubbles: true, cancelable: true, ...more })),
  );
async function type(text: string) {
  const field = input() as HTMLInputElement;
  await act(async () => {
    // React listens to the native setter, not to the property of the element.
    Object.getOwnPropertyDescriptor(HTMLInputElement.prototype, "value")?.set?.call(field, text);
    field.dispatchEvent(new Event("input", { bubbles: true }));
  });
}
async function paste(text: string) {
  const event = new Event("paste", { bubbles: true, cancelable: true });
  Object.assign(event, { clipboardData: { getData: () => text } });
  await act(async () => document.activeElement?.dispatchEvent(event));
}

beforeEach(() => {
  host = document.createElement("div");
  document.body.append(host);
  root = createRoot(host);
  reasons.length = 0;
});
afterEach(async () => {
  await act(async () => root.unmount());
  host.remove();
});

describe("MatrixGrid", () => {
  test("is a grid with counted rows and columns, headers, and one tab stop", async () => {
    await show(<Bench />);
    const grid = host.querySelector("[role=grid]");
    expect(grid?.getAttribute("aria-rowcount")).toBe("3");
    expect(grid?.getAttribute("aria-colcount")).toBe("4");
    expect([...host.querySelectorAll("thead th")].map((th) => th.getAttribute("aria-colindex"))).toEqual(["2", "3", "4"]);
    expect([...host.querySelectorAll("tbody tr")].map((tr) => tr.getAttribute("aria-rowindex"))).toEqual(["2", "3"]);
    expect(host.querySelectorAll("[role=gridcell][tabindex='0']")).toHaveLength(1);
    expect(cell(1, 2).getAttribute("aria-label")).toBe("A, row 2 pitch rate, column 3 force: k");
  });

  test("marks the cell at fault and says what is wrong by row and column name", async () => {
    await show(<Bench />);
    expect(cell(1, 2).getAttribute("aria-invalid")).toBe("true");
    expect(cell(0, 0).getAttribute("aria-invalid")).toBeNull();
    expect(host.textContent).toContain("row 2 pitch rate, column 3 force");
    expect(host.textContent).toContain("k is no parameter.");
  });

  test("weaves coupling apart from an axis acting on itself and leaves zeros plain", async () => {
    await show(<Bench />);
    expect(cell(0, 1).dataset.weave).toBe("coupling");
    expect(cell(1, 1).dataset.weave).toBe("own");
    expect(cell(0, 0).dataset.weave).toBe("none");
  });

  test("is filled by keys alone: typing replaces, arrows and Enter finish, Escape cancels", async () => {
    await show(<Bench />);
    await act(async () => cell(0, 0).focus());
    await press("7");
    expect(input()?.value).toBe("7");
    await type("7.5");
    await press("ArrowRight");
    expect(latest[0][0]).toBe("7.5");
    expect(document.activeElement).toBe(cell(0, 1));
    await press("Enter");
    await type("-2*k");
    await press("Escape");
    expect(latest[0][1]).toBe("1");
    expect(document.activeElement).toBe(cell(0, 1));
    await press("F2");
    await type("\u22120,25");
    await press("Enter");
    expect(latest[0][1]).toBe("-0.25");
    expect(document.activeElement).toBe(cell(1, 1));
    expect(reasons).toEqual(["edit", "edit"]);
  });

  test("pastes as one step that can be taken back and done again", async () => {
    await show(<Bench />);
    await act(async () => cell(0, 0).focus());
    await paste("1\t2\t3\r\n4\t5\t6\r\n");
    const pasted = [
      ["1", "2", "3"],
      ["4", "5", "6"],
    ];
    expect(latest).toEqual(pasted);
    expect(host.querySelector("[role=status]")?.textContent).toContain("Pasted 2 × 3");
    await press("z", { ctrlKey: true });
    expect(latest).toEqual(START);
    await press("y", { ctrlKey: true });
    expect(latest).toEqual(pasted);
    expect(reasons).toEqual(["paste", "undo", "redo"]);
  });

  test("marks a pasted cell that cannot be read, until it is written anew", async () => {
    await show(<Bench />);
    await act(async () => cell(0, 0).focus());
    await paste("#DIV/0!\t9");
    expect(latest[0]).toEqual(["#DIV/0!", "9", "2.5"]);
    expect(cell(0, 0).getAttribute("aria-invalid")).toBe("true");
    await press("3");
    await press("Enter");
    expect(cell(0, 0).getAttribute("aria-invalid")).toBeNull();
  });

  test("selects with Shift and clears the selection to zeros in one step", async () => {
    await show(<Bench />);
    await act(async () => cell(0, 0).focus());
    await press("ArrowRight", { shiftKey: true });
    await press("ArrowDown", { shiftKey: true });
    expect(host.querySelectorAll("[aria-selected=true]")).toHaveLength(4);
    await press("Delete");
    expect(latest).toEqual([
      ["0", "0", "2.5"],
      ["0", "0", "k"],
    ]);
    await press("z", { ctrlKey: true });
    expect(latest).toEqual(START);
  });

  test("mirrors a typed weight when it is symmetric", async () => {
    await show(<Bench symmetric />);
    await act(async () => cell(0, 0).focus());
    await press("ArrowDown");
    await press("8");
    await press("Enter");
    expect(latest).toEqual([
      ["0", "8"],
      ["8", "-4"],
    ]);
  });

  test("only to be read, takes neither keys nor paste and says so", async () => {
    await show(<Bench readOnly />);
    await act(async () => cell(0, 0).focus());
    await press("7");
    await paste("1\t2");
    expect(input()).toBeNull();
    expect(latest).toEqual(START);
    expect(host.querySelector("[role=grid]")?.getAttribute("aria-readonly")).toBe("true");
    await press("ArrowRight");
    expect(document.activeElement).toBe(cell(0, 1));
  });
});

test("WovenMatrix shows four digits, keeps full precision on hover and reads zeros out", async () => {
  await show(
    <WovenMatrix
      name="B"
      caption="what each actuator does"
      rows={rows}
      columns={[columns[2]]}
      values={[[833.3333333333334], [0]]}
    />,
  );
  const [first, second] = host.querySelectorAll("td[title]");
  expect(first.textContent).toBe("833.3");
  expect(first.getAttribute("title")).toBe("833.3333333333334");
  expect(second.textContent).toBe("·0");
});
