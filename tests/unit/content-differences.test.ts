import { describe, expect, test } from "vitest";
import { contentDifferences } from "@/lib/services/plants/content-differences";
import { twoCarriages } from "../helpers/plant-content";

const typed = twoCarriages();
const changed = (list: string[][], row: number, column: number, entry: string) =>
  list.map((line, i) => line.map((text, j) => (i === row && j === column ? entry : text)));
const lines = (after = typed, before = typed) =>
  contentDifferences(before, after).map(({ pointer, place, before, after }) => [pointer, place, before, after]);

test("a plant differs in nothing from itself, nor from one that writes out what it leaves out", () => {
  expect(lines()).toEqual([]);
  const writtenOut = twoCarriages({
    D: [
      ["0", "0"],
      ["0", "0"],
    ],
    operatingPoint: { states: [0, 0, 0, 0], inputs: [0, 0], outputs: [0, 0] },
    C: changed(typed.C, 0, 0, "  1 "),
  });
  expect(lines(writtenOut)).toEqual([]);
});

describe("a change is told once, at its place, in names", () => {
  test("of an entry of each matrix", () => {
    const after = twoCarriages({
      A: changed(typed.A, 2, 2, "-0.5"),
      B: changed(typed.B, 3, 0, "1/(2*m)"),
      D: [
        ["0", "0"],
        ["0.1", "0"],
      ],
    });
    expect(lines(after)).toEqual([
      ["/A/2/2", "A, row v1, column v1", "-0.4", "-0.5"],
      ["/B/3/0", "B, row v2, column F1", "0", "1/(2*m)"],
      ["/D/1/0", "D, row enc2, column F1", "0", "0.1"],
    ]);
  });

  test("of a name, a unit, an axis, a scale and a limit", () => {
    const [x1, ...states] = typed.states;
    const [F1, F2] = typed.inputs;
    const after = twoCarriages({
      states: [{ ...x1, name: "left", axis: 1, scale: null }, ...states],
      inputs: [F1, { ...F2, unit: "kN", upper: null, axis: null }],
    });
    expect(lines(after)).toEqual([
      ["/states/0/name", "state left, name", "x1", "left"],
      ["/states/0/axis", "state left, axis", "left", "right"],
      ["/states/0/scale", "state left, scale", "0.001", "none"],
      ["/inputs/1/unit", "input F2, unit", "N", "kN"],
      ["/inputs/1/axis", "input F2, axis", "right", "none"],
      ["/inputs/1/upper", "input F2, upper", "120", "none"],
    ]);
  });

  test("of a parameter, the time base, the operating point and the source", () => {
    const [m, ...others] = typed.parameters;
    const after = twoCarriages({
      timeBase: { kind: "sampled", period: 0.002 },
      parameters: [{ ...m, expression: "15", note: "weighed" }, ...others],
      operatingPoint: { states: [0, 0, 0, 0], inputs: [0, 12.5], outputs: [0, 0] },
      source: "Sheet 2",
    });
    expect(lines(after)).toEqual([
      ["/timeBase", "time base", "continuous", "sampled every 0.002 s"],
      ["/parameters/0/expression", "parameter m, expression", "12", "15"],
      ["/parameters/0/note", "parameter m, note", "", "weighed"],
      ["/operatingPoint/inputs/1", "operating point, input F2", "0", "12.5"],
      ["/source", "source note", "", "Sheet 2"],
    ]);
    const slower = twoCarriages({ timeBase: { kind: "sampled", period: 0.004 } });
    expect(lines(slower, after)[0]).toEqual(["/timeBase", "time base", "sampled every 0.002 s", "sampled every 0.004 s"]);
  });
});

test("a signal that comes or goes takes its rows and columns along, told by the name it has or had", () => {
  const more = twoCarriages({
    outputs: [...typed.outputs, { name: "tacho", unit: "m/s", axis: 0, scale: null }],
    C: [...typed.C, ["0", "0", "1", "0"]],
  });
  const came = lines(more);
  expect(came[0]).toEqual(["/outputs/2", "output 3", null, "tacho"]);
  // The commanded quantities are the outputs here, which is told once.
  expect(came.filter(([pointer]) => String(pointer).startsWith("/commanded"))).toEqual([]);
  expect(came).toContainEqual(["/C/2/2", "C, row tacho, column v1", null, "1"]);
  const gone = lines(typed, more);
  expect(gone).toHaveLength(came.length);
  expect(gone).toContainEqual(["/C/2/2", "C, row tacho, column v1", "1", null]);
});

test("commanded quantities of their own are told with their maps, beside those that were derived", () => {
  const after = twoCarriages({
    commanded: [{ name: "mean", unit: "m", axis: null, amplitude: 0.01 }],
    H: [["0.5", "0.5", "0", "0"]],
  });
  const told = lines(after);
  expect(told).toContainEqual(["/commanded/0/name", "commanded quantity mean, name", "enc1", "mean"]);
  expect(told).toContainEqual(["/commanded/0/amplitude", "commanded quantity mean, amplitude", "0.001", "0.01"]);
  expect(told).toContainEqual(["/commanded/1", "commanded quantity 2", "enc2", null]);
  expect(told).toContainEqual(["/H/0/1", "H, row mean, column x2", "0", "0.5"]);
});
