import { describe, expect, test } from "vitest";
import { parsePasted } from "@/components/matrix/parse-pasted";
import { processorMs } from "../helpers/processor-time";
import { seededUniform } from "../helpers/seeded";

const read = (text: string, columns?: number) => parsePasted(text, columns).entries;

const FIXTURES: readonly { readonly name: string; readonly text: string; readonly entries: readonly (readonly string[])[] }[] = [
  {
    name: "tabs between cells",
    text: "1\t2\n3\t4",
    entries: [
      ["1", "2"],
      ["3", "4"],
    ],
  },
  {
    name: "commas between cells",
    text: "1,2.5,3\n-4,5,6",
    entries: [
      ["1", "2.5", "3"],
      ["-4", "5", "6"],
    ],
  },
  {
    name: "semicolons with decimal commas",
    text: "1,5;2,25\n-3,125;4",
    entries: [
      ["1.5", "2.25"],
      ["-3.125", "4"],
    ],
  },
  {
    name: "single spaces between cells",
    text: "1 0 -2.5\n0 1 3",
    entries: [
      ["1", "0", "-2.5"],
      ["0", "1", "3"],
    ],
  },
  {
    name: "columns lined up by many spaces",
    text: "  1.0    2.0\n -3.5   10.0",
    entries: [
      ["1.0", "2.0"],
      ["-3.5", "10.0"],
    ],
  },
  {
    name: "CRLF line ends",
    text: "1\t2\r\n3\t4",
    entries: [
      ["1", "2"],
      ["3", "4"],
    ],
  },
  {
    name: "a trailing line",
    text: "1\t2\r\n3\t4\r\n",
    entries: [
      ["1", "2"],
      ["3", "4"],
    ],
  },
  {
    name: "blank cells become zero",
    text: "1\t\t3\n\t5\t",
    entries: [
      ["1", "0", "3"],
      ["0", "5", "0"],
    ],
  },
  { name: "exponents", text: "1e-3\t2.5E+4\t-1.2e-4", entries: [["1e-3", "2.5E+4", "-1.2e-4"]] },
  {
    name: "a true minus sign",
    text: "−1\t2\n1e−3\t−0,5",
    entries: [
      ["-1", "2"],
      ["1e-3", "-0.5"],
    ],
  },
  {
    name: "no-break spaces around and inside numbers",
    text: "\u00a01\u202f234,5\t2\u00a0\n12\u00a0345\t-1",
    entries: [
      ["1234.5", "2"],
      ["12345", "-1"],
    ],
  },
  {
    name: "quoted cells with separators and quotes",
    text: '"1,5"\t"k\t/m"\n"say ""x"""\t4',
    entries: [
      ["1.5", "k\t/m"],
      ['say "x"', "4"],
    ],
  },
  {
    name: "quoted thousands with a decimal point",
    text: '"1,234.5",2\n3,4',
    entries: [
      ["1234.5", "2"],
      ["3", "4"],
    ],
  },
  {
    name: "spaces with decimal commas",
    text: "1,5 2,5\n3,5 4,5",
    entries: [
      ["1.5", "2.5"],
      ["3.5", "4.5"],
    ],
  },
  {
    name: "a comma and a space between cells",
    text: "1, 2, 3\n4, 5, 6",
    entries: [
      ["1", "2", "3"],
      ["4", "5", "6"],
    ],
  },
  {
    name: "formulas in parameters, between tabs",
    text: "-(k + k2)/m\t2*d/m\n0\t1",
    entries: [
      ["-(k + k2)/m", "2*d/m"],
      ["0", "1"],
    ],
  },
  {
    name: "ragged rows are filled with zeros",
    text: "1 2 3\n4\n5 6",
    entries: [
      ["1", "2", "3"],
      ["4", "0", "0"],
      ["5", "6", "0"],
    ],
  },
  {
    name: "a byte-order mark",
    text: "\ufeff1;2\n3;4",
    entries: [
      ["1", "2"],
      ["3", "4"],
    ],
  },
];

describe("pasted text", () => {
  test.each(FIXTURES)("is read right with $name", ({ text, entries }) => {
    const pasted = parsePasted(text);
    expect(pasted.entries).toEqual(entries);
    expect(pasted.problems).toEqual([]);
  });

  test("of one column with decimal commas is not taken for two columns where only one has room", () => {
    expect(read("1,5\r\n-2,25\r\n", 1)).toEqual([["1.5"], ["-2.25"]]);
  });

  test("of a lone 1,5 is asked about, because it may be two entries", () => {
    const { entries, problems } = parsePasted("1,5", 4);
    expect(entries).toEqual([["1,5"]]);
    expect(problems).toHaveLength(1);
  });

  test("keeps 1,234 as it stands and marks it while nothing tells what the comma means", () => {
    const { entries, problems } = parsePasted("1,234\t7");
    expect(entries).toEqual([["1,234", "7"]]);
    expect(problems).toEqual([{ row: 0, column: 0, message: "“1,234” may be 1.234 or 1234. Write the one you mean." }]);
  });

  test("reads 1,234 as a decimal once another cell proves the decimal comma", () => {
    expect(parsePasted("1,234\t0,5")).toEqual({ entries: [["1.234", "0.5"]], problems: [] });
  });

  test("marks a spreadsheet's error and keeps every other cell", () => {
    const { entries, problems } = parsePasted("1\t#DIV/0!\n3\t4");
    expect(entries).toEqual([
      ["1", "#DIV/0!"],
      ["3", "4"],
    ]);
    expect(problems.map(({ row, column }) => [row, column])).toEqual([[0, 1]]);
  });

  test("of nothing is nothing", () => {
    expect(parsePasted("")).toEqual({ entries: [], problems: [] });
    expect(parsePasted(" \r\n")).toEqual({ entries: [], problems: [] });
  });

  test("brings back 1,000 doubles bit for bit", () => {
    const draw = seededUniform(20260704);
    const view = new DataView(new ArrayBuffer(8));
    const doubles: number[] = [];
    while (doubles.length < 1000) {
      view.setUint32(0, Math.floor(draw() * 2 ** 32));
      view.setUint32(4, Math.floor(draw() * 2 ** 32));
      const x = view.getFloat64(0);
      if (Number.isFinite(x)) doubles.push(x);
    }
    const text = Array.from({ length: 100 }, (_, r) =>
      doubles
        .slice(10 * r, 10 * r + 10)
        .map(String)
        .join("\t"),
    ).join("\r\n");
    const back = read(text).flat().map(Number);
    expect(back.every((x, index) => Object.is(x, doubles[index]))).toBe(true);
  });

  test("of 50 by 50 entries is read well within a frame or two", () => {
    const text = Array.from({ length: 50 }, (_, r) => Array.from({ length: 50 }, (_, c) => `${r},${c}5`).join(";")).join("\r\n");
    const start = processorMs();
    expect(read(text)).toHaveLength(50);
    expect(processorMs() - start).toBeLessThan(100);
  });
});
