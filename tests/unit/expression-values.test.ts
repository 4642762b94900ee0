import { describe, expect, test } from "vitest";
import { NumericalError } from "@/control/errors";
import { evaluateExpression, parameterNamesIn } from "@/control/expression/evaluate-expression";
import { parsePlainNumber } from "@/control/expression/plain-number";

const parameters = new Map([
  ["mass", 2],
  ["k_1", 300],
  ["Ts", 0.01],
]);

function refusal(text: string): Readonly<Record<string, unknown>> {
  try {
    evaluateExpression(text, parameters);
  } catch (error) {
    if (error instanceof NumericalError && error.code === "bad-expression") return error.data;
    throw error;
  }
  throw new Error(`accepted: ${text}`);
}

describe("evaluateExpression", () => {
  test.each([
    ["-k_1/mass", -150],
    ["1 + 2 * 3", 7],
    ["(1 + 2) * 3", 9],
    ["8/4/2", 1],
    ["2-3-4", -5],
    ["-2^2", -4],
    ["(-2)^2", 4],
    ["2^3^2", 512],
    ["2^-1", 0.5],
    ["2*-3", -6],
    ["--3", 3],
    ["+3", 3],
    ["1.5e3 + .5 + 2.", 1502.5],
    ["sqrt(k_1 / mass)", Math.sqrt(150)],
    ["2*pi*e^0", 2 * Math.PI],
    ["exp(-Ts)", Math.exp(-0.01)],
    ["log(e^2)", 2],
    ["log10(1000)", Math.log10(1000)],
    ["sin ( pi / 2 )", 1],
    ["abs(-mass)", 2],
    ["\u2212k_1", -300],
    ["3\u22125", -2],
    ["\t7\u00a0+ 1", 8],
  ])("%s is %d", (text, value) => expect(evaluateExpression(text, parameters)).toBe(value));

  test("a result of minus zero becomes zero, with and without the parser", () => {
    for (const text of ["-0", "0*-1", "mass*0*-1", "-(mass-mass)"])
      expect(Object.is(evaluateExpression(text, parameters), 0)).toBe(true);
  });

  test.each([
    ["", "empty", 0],
    ["1,5", "decimal-comma", 1],
    ["2 mass", "implicit-multiplication", 2],
    ["2(3)", "implicit-multiplication", 1],
    ["pi(3)", "implicit-multiplication", 2],
    ["0x10", "implicit-multiplication", 1],
    ["(1", "unbalanced-parenthesis", 0],
    ["1)", "unbalanced-parenthesis", 1],
    ["()", "operand-missing", 1],
    ["1+", "operand-missing", 2],
    ["*2", "operand-missing", 0],
    ["1 + stiffness", "unknown-name", 4],
    ["1 + foo(2)", "unknown-function", 4],
    ["1 + sqrt", "argument-missing", 4],
    ["2 % 3", "bad-character", 2],
    ["3 + 1/0", "not-finite", 5],
    ["1/(1/0)", "not-finite", 1],
    ["1 + sqrt(-1)", "not-finite", 4],
    ["1e999", "not-finite", 0],
  ])("%j is refused as %s at character %d", (text, reason, position) =>
    expect(refusal(text)).toMatchObject({ text, reason, position }),
  );

  test("an unknown name is named", () => expect(refusal("mass * stiffness")).toMatchObject({ name: "stiffness", position: 7 }));

  test("a parameter that is not finite never gets through", () => {
    expect(() => evaluateExpression("a+1", new Map([["a", Number.NaN]]))).toThrow(NumericalError);
  });
});

describe("parsePlainNumber", () => {
  test.each([
    ["1", 1],
    [" -1.25 ", -1.25],
    ["+.5", 0.5],
    ["5.", 5],
    ["\u22123e-2", -0.03],
    ["1.2E+05", 120000],
    ["-0", 0],
    ["0.1000000000000000055511151231257827", 0.1],
  ])("%j is %d", (text, value) => expect(parsePlainNumber(text)).toBe(value));

  test.each(["", "mass", "1+1", "1,5", "1e999", "0x10", "NaN", "Infinity", "1 2", "--1", "1_000", `${"1".repeat(201)}`])(
    "%j is none",
    (text) => expect(parsePlainNumber(text)).toBeNull(),
  );

  test("every double survives the way through its shortest decimal", () => {
    for (const value of [1 / 3, Math.PI * 1e-300, 5e-324, Number.MAX_VALUE, 2 ** 53 + 2, -1.1e22]) {
      expect(evaluateExpression(String(value), new Map())).toBe(value);
      expect(evaluateExpression(`(${value})`, new Map())).toBe(value);
    }
  });
});

describe("parameterNamesIn", () => {
  test("lists parameters once, in order of appearance, without functions and constants", () => {
    expect(parameterNamesIn("k_1 + mass*sin(k_1) - pi*e")).toEqual(["k_1", "mass"]);
    expect(parameterNamesIn("12.5")).toEqual([]);
  });
});
