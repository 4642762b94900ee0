import { describe, expect, test } from "vitest";
import {
  addSignal,
  blankPlant,
  changeSignal,
  moveSignal,
  outputsCommanded,
  ownCommanded,
  removeAxis,
  removeSignal,
} from "@/components/plants/editor/plant-document";
import { evaluatePlant } from "@/control/plant/evaluate-plant";
import { twoCarriages } from "../helpers/plant-content";

const shapes = (content: ReturnType<typeof twoCarriages>) => [
  content.A.map((row) => row.length),
  content.B.map((row) => row.length),
  content.C.map((row) => row.length),
];

describe("a plant being edited", () => {
  test("a new state gets a row and a column of zeros in every matrix that it touches", () => {
    const grown = addSignal(twoCarriages(), "states");
    expect(shapes(grown)).toEqual([
      [5, 5, 5, 5, 5],
      [2, 2, 2, 2, 2],
      [5, 5],
    ]);
    expect(grown.A[4]).toEqual(["0", "0", "0", "0", "0"]);
    expect(grown.A[2].slice(0, 4)).toEqual(twoCarriages().A[2]);
  });

  test("removing the state that was just added gives back the same matrices", () => {
    const { A, B, C, states } = removeSignal(addSignal(twoCarriages(), "states"), "states", 4);
    expect({ A, B, C, states }).toEqual({
      A: twoCarriages().A,
      B: twoCarriages().B,
      C: twoCarriages().C,
      states: twoCarriages().states,
    });
  });

  test("a moved state takes its row and its column with it, so the machine stays the same", () => {
    const moved = moveSignal(twoCarriages(), "states", 1, 1);
    const before = evaluatePlant(twoCarriages()).model;
    const after = evaluatePlant(moved).model;
    const place = (name: string, names: readonly { name: string }[]) => names.findIndex((signal) => signal.name === name);
    for (const row of ["x1", "x2", "v1", "v2"]) {
      for (const column of ["x1", "x2", "v1", "v2"]) {
        expect(after?.A[place(row, after.states)][place(column, after.states)]).toBe(
          before?.A[place(row, before.states)][place(column, before.states)],
        );
      }
    }
  });

  test("the first state does not move up", () => {
    const content = twoCarriages();
    expect(moveSignal(content, "states", 0, -1)).toBe(content);
  });

  test("removing an axis leaves its signals without one and renumbers the later axes", () => {
    const { axes, states } = removeAxis(twoCarriages(), 0);
    expect(axes).toEqual([{ name: "right", tag: "R" }]);
    expect(states.map(({ axis }) => axis)).toEqual([null, 0, null, 0]);
  });

  test("commanded quantities of their own start as the outputs and evaluate to the same numbers", () => {
    const own = evaluatePlant(ownCommanded(twoCarriages())).model;
    expect(own?.H).toEqual(evaluatePlant(twoCarriages()).model?.H);
    expect(outputsCommanded(ownCommanded(twoCarriages())).commanded).toBeNull();
  });

  test("a disturbance makes E appear with a column for it", () => {
    const grown = addSignal(twoCarriages(), "disturbances");
    expect(grown.E).toEqual([["0"], ["0"], ["0"], ["0"]]);
  });

  test("a change of one signal leaves the others as they are", () => {
    const changed = changeSignal(twoCarriages(), "inputs", 1, { upper: 90 });
    expect(changed.inputs[1].upper).toBe(90);
    expect(changed.inputs[0]).toEqual(twoCarriages().inputs[0]);
  });

  test.each([1, 2, 3])("a blank plant of %i axes can be evaluated as it stands", (count) => {
    const { model, problems } = evaluatePlant(blankPlant(Array.from({ length: count }, (_, index) => `axis ${index + 1}`)));
    expect(problems).toEqual([]);
    expect(model?.states).toHaveLength(2 * count);
  });
});
