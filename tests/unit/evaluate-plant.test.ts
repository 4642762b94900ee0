import { describe, expect, test } from "vitest";
import { evaluatePlant } from "@/control/plant/evaluate-plant";
import { CheckPlant } from "@/lib/schemas/design";
import { CreatePlant, PlantContent, PlantModel } from "@/lib/schemas/plant";
import { twoCarriages } from "../helpers/plant-content";
import { seededUniform } from "../helpers/seeded";

const errors = (content: PlantContent) => evaluatePlant(content).problems.filter(({ severity }) => severity === "error");
const replaced = (rows: string[][], i: number, j: number, text: string) =>
  rows.map((row, r) => row.map((entry, c) => (r === i && c === j ? text : entry)));

describe("evaluatePlant", () => {
  test("evaluates entries and parameters in dependency order, whatever the order they stand in", () => {
    const { model, parameters, problems } = evaluatePlant(twoCarriages());
    expect(problems).toEqual([]);
    expect(parameters.get("k")).toBe(12 * (2 * Math.PI * 3) ** 2);
    expect(model?.A[2][0]).toBe(-(12 * (2 * Math.PI * 3) ** 2) / 12);
    expect(model?.D).toEqual([
      [0, 0],
      [0, 0],
    ]);
  });

  test("takes the outputs as commanded quantities when none are named, with their scale as amplitude", () => {
    const { model } = evaluatePlant(twoCarriages());
    expect(model?.commanded.map(({ name, amplitude }) => [name, amplitude])).toEqual([
      ["enc1", 0.001],
      ["enc2", 0.001],
    ]);
    expect(model?.H).toEqual(model?.C);
  });

  test("reports each bad cell at its own place and keeps the values of the others", () => {
    const A = replaced(replaced(twoCarriages().A, 0, 1, "2k"), 3, 0, "kk/m");
    const { model, values } = evaluatePlant(twoCarriages({ A }));
    expect(model).toBeNull();
    expect(errors(twoCarriages({ A })).map(({ pointer }) => pointer)).toEqual(["/A/0/1", "/A/3/0"]);
    expect(values.A[3][1]).toBeCloseTo(-((2 * Math.PI * 3) ** 2), 10);
    expect(values.A[0][1]).toBeNull();
  });

  test.each([
    ["a wrong number of rows", { A: twoCarriages().A.slice(1) }, "/A"],
    ["a short row", { B: [["0"], ...twoCarriages().B.slice(1)] }, "/B/0"],
    ["a value that is not finite", { A: replaced(twoCarriages().A, 0, 0, "1/0") }, "/A/0/0"],
    ["an empty cell", { A: replaced(twoCarriages().A, 1, 1, " ") }, "/A/1/1"],
  ])("says where %s stands", (_, change, pointer) => {
    expect(errors(twoCarriages(change)).map((problem) => problem.pointer)).toContain(pointer);
  });

  test("names the signal whose unit is missing and the one whose name is taken", () => {
    const states = twoCarriages().states.map((state, index) => (index === 1 ? { ...state, name: "x1", unit: "" } : state));
    expect(errors(twoCarriages({ states }))).toEqual([
      { pointer: "/states/1/name", severity: "error", message: '"x1" already names state 1' },
      { pointer: "/states/1/unit", severity: "error", message: "x1 needs a unit; write 1 for a pure number" },
    ]);
  });

  test("points at parameters that define one another and at those that wait for them", () => {
    const parameters = [
      { name: "a", expression: "b+1", unit: "1", note: "" },
      { name: "b", expression: "a", unit: "1", note: "" },
      { name: "c", expression: "2*a", unit: "1", note: "" },
      ...twoCarriages().parameters,
    ];
    const places = errors(twoCarriages({ parameters })).map(({ pointer }) => pointer);
    expect(places).toEqual(["/parameters/0/expression", "/parameters/1/expression", "/parameters/2/expression"]);
  });

  test("does not call a parameter unknown that is only in error itself", () => {
    const parameters = twoCarriages().parameters.map((parameter) =>
      parameter.name === "m" ? { ...parameter, expression: "12kg" } : parameter,
    );
    expect(errors(twoCarriages({ parameters })).find(({ pointer }) => pointer === "/B/2/0")?.message).toBe(
      'The parameter "m" has no value yet',
    );
  });

  test.each(["pi", "e", "sqrt", "constructor", "__proto__", "2a", ""])("refuses %j as the name of a parameter", (name) => {
    const parameters = [...twoCarriages().parameters, { name, expression: "1", unit: "1", note: "" }];
    expect(errors(twoCarriages({ parameters })).map(({ pointer }) => pointer)).toContain("/parameters/3/name");
  });

  test("cautions about an input that moves nothing without refusing the plant", () => {
    const B = twoCarriages().B.map(([first]) => [first, "0"]);
    const { model, problems } = evaluatePlant(twoCarriages({ B }));
    expect(model).not.toBeNull();
    expect(problems).toEqual([
      { pointer: "/B/0/1", severity: "caution", message: "Input F2 moves nothing: its whole column is zero" },
    ]);
  });

  test("the schema refuses unknown keys, long entries and more states than the limit", () => {
    const content = twoCarriages();
    expect(PlantContent.safeParse({ ...content, extra: 1 }).success).toBe(false);
    expect(PlantContent.safeParse({ ...content, A: [["1".repeat(201)]] }).success).toBe(false);
    expect(PlantContent.safeParse({ ...content, states: new Array(61).fill(content.states[0]) }).success).toBe(false);
    expect(PlantContent.safeParse(content).success).toBe(true);
  });
});

describe("the doubles of a plant", () => {
  /** Every number in it by its bits, so that nothing passes for equal that is not. */
  const bitsOf = (model: unknown) =>
    JSON.stringify(model, (_, value) => {
      if (typeof value !== "number") return value;
      const view = new DataView(new ArrayBuffer(8));
      view.setFloat64(0, value);
      return view.getBigUint64(0).toString(16);
    });

  test("are the same bits after JSON, after the schema and after a second evaluation", () => {
    const random = seededUniform(4242);
    const names = ["m", "k", "wn", "pi", "e"];
    const operand = () =>
      random() < 0.5 ? names[Math.floor(random() * 5)] : String((random() - 0.5) * 10 ** (12 * random() - 6));
    const formula = () => {
      const [a, b, c] = [operand(), operand(), operand()];
      return [
        `${a}*${b}-${c}`,
        `(${a}+${b})/k`,
        `-${a}`,
        `sin(${a})*cos(${b})`,
        `sqrt(m)*${c}`,
        `0*(${a})`,
        `m^-2*${b}`,
        "1e-310",
      ][Math.floor(random() * 8)].replaceAll("--", "+");
    };
    for (let round = 0; round < 300; round++) {
      const content = twoCarriages({
        A: twoCarriages().A.map((row) => row.map(formula)),
        operatingPoint: { states: [-0, 0.1, 5e-324, 1e308], inputs: [-0, 1 / 3], outputs: [0, -0] },
      });
      const sent = JSON.parse(JSON.stringify(content)) as PlantContent;
      const [here, there] = [evaluatePlant(content), evaluatePlant(sent)];
      expect(here.problems).toEqual([]);
      const bits = bitsOf(here.model);
      expect(bitsOf(there.model)).toBe(bits);
      expect(bitsOf(JSON.parse(JSON.stringify(here.model)))).toBe(bits);
      expect(bitsOf(PlantModel.parse(JSON.parse(JSON.stringify(here.model))))).toBe(bits);
      expect(bits).not.toContain("8000000000000000");
    }
  });

  test("are never taken from whoever sends a plant, only the text they come from", () => {
    const content = twoCarriages();
    const { model } = evaluatePlant(content);
    const body = { name: "Gantry", content };
    expect(CreatePlant.safeParse(body).success).toBe(true);
    for (const more of [{ model }, { values: { A: [[1]] } }, { version: 9 }]) {
      expect(CreatePlant.safeParse({ ...body, ...more }).success).toBe(false);
      expect(CheckPlant.safeParse({ content, ...more }).success).toBe(false);
    }
    for (const more of [{ model }, { values: {} }]) expect(PlantContent.safeParse({ ...content, ...more }).success).toBe(false);
    expect(PlantContent.safeParse({ ...content, A: [[1, 2]] }).success).toBe(false);
  });
});
