import { describe, expect, test } from "vitest";
import { NumericalError } from "@/control/errors";
import { evaluateExpression } from "@/control/expression/evaluate-expression";
import { parameterValues } from "@/control/plant/parameter-values";

function refusal(work: () => unknown): Readonly<Record<string, unknown>> {
  try {
    work();
  } catch (error) {
    if (error instanceof NumericalError && error.code === "bad-expression") return error.data;
    throw error;
  }
  throw new Error("accepted");
}
const none = new Map<string, number>();

describe("limits of a formula", () => {
  test("200 characters are read, 201 are refused before they are parsed", () => {
    const sum = `${"1+".repeat(99)}10`;
    expect(sum).toHaveLength(200);
    expect(evaluateExpression(sum, none)).toBe(109);
    expect(refusal(() => evaluateExpression(`${sum}0`, none))).toMatchObject({ reason: "too-long", limit: 200 });
  });

  test("20 000 parentheses cannot overflow the stack", () => {
    expect(refusal(() => evaluateExpression("(".repeat(20_000), none))).toMatchObject({ reason: "too-long" });
  });

  test("parentheses, signs, functions and powers nest 32 deep at most", () => {
    const nested = (depth: number) => `${"(".repeat(depth)}1${")".repeat(depth)}`;
    expect(evaluateExpression(nested(31), none)).toBe(1);
    expect(refusal(() => evaluateExpression(nested(33), none))).toMatchObject({ reason: "too-deep", limit: 32 });
    expect(refusal(() => evaluateExpression(`${"-".repeat(33)}(1)`, none))).toMatchObject({ reason: "too-deep" });
    expect(refusal(() => evaluateExpression(`${"abs(".repeat(33)}1${")".repeat(33)}`, none))).toMatchObject({
      reason: "too-deep",
    });
    expect(refusal(() => evaluateExpression(`${"1^".repeat(40)}1`, none))).toMatchObject({ reason: "too-deep" });
  });
});

describe("parameterValues", () => {
  const define = (pairs: readonly (readonly [string, string])[]) =>
    parameterValues(pairs.map(([name, expression]) => ({ name, expression, unit: "1", note: "" })));
  const places = (pairs: readonly (readonly [string, string])[]) => define(pairs).problems.map(({ pointer }) => pointer);

  test("definitions may use one another in any order", () => {
    const { values, problems } = define([
      ["total", "arm + load"],
      ["load", "2*arm"],
      ["arm", "0.5"],
    ]);
    expect(problems).toEqual([]);
    expect(Object.fromEntries(values)).toEqual({ arm: 0.5, load: 1, total: 1.5 });
  });

  test("64 parameters are read, also as one chain, and 65 are refused", () => {
    const chain = Array.from({ length: 64 }, (_, i) => [`p${i}`, i < 63 ? `p${i + 1} + 1` : "1"] as const);
    expect(define(chain).values.get("p0")).toBe(64);
    expect(places([...chain, ["q", "1"]])).toEqual(["/parameters"]);
  });

  test("each parameter of a circle is marked, and the others keep their values", () => {
    const { values, problems } = define([
      ["a", "b+1"],
      ["b", "c"],
      ["c", "sin(b)"],
      ["d", "4"],
    ]);
    expect(problems.map(({ pointer }) => pointer)).toEqual([
      "/parameters/0/expression",
      "/parameters/1/expression",
      "/parameters/2/expression",
    ]);
    expect(values.get("d")).toBe(4);
    expect(places([["a", "a"]])).toEqual(["/parameters/0/expression"]);
  });

  test("a refusal stands at the definition it is about", () => {
    expect(
      places([
        ["a", "1"],
        ["b", "a/0"],
      ]),
    ).toEqual(["/parameters/1/expression"]);
  });

  test("two parameters cannot share a name", () => {
    expect(
      places([
        ["a", "1"],
        ["a", "2"],
      ]),
    ).toEqual(["/parameters/1/name"]);
  });
});
