import { describe, expect, test } from "vitest";
import { NumericalError } from "@/control/errors";
import { evaluateExpression } from "@/control/expression/evaluate-expression";
import { evaluateParameters } from "@/control/expression/evaluate-parameters";

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

describe("evaluateParameters", () => {
  const define = (pairs: Record<string, string>) => Object.entries(pairs).map(([name, expression]) => ({ name, expression }));

  test("definitions may use one another in any order", () => {
    const values = evaluateParameters(define({ total: "arm + load", load: "2*arm", arm: "0.5" }));
    expect([...values]).toEqual([
      ["arm", 0.5],
      ["load", 1],
      ["total", 1.5],
    ]);
  });

  test("64 parameters are read, also as one chain, and 65 are refused", () => {
    const chain = Array.from({ length: 64 }, (_, i) => ({ name: `p${i}`, expression: i < 63 ? `p${i + 1} + 1` : "1" }));
    expect(evaluateParameters(chain).get("p0")).toBe(64);
    const more = [...chain, { name: "q", expression: "1" }];
    expect(refusal(() => evaluateParameters(more))).toMatchObject({ reason: "too-many-parameters", limit: 64 });
  });

  test("a circle is refused with the names that make it", () => {
    const data = refusal(() => evaluateParameters(define({ a: "b+1", b: "c", c: "sin(b)" })));
    expect(data).toMatchObject({ reason: "cycle", names: ["b", "c"], parameter: "c" });
    expect(refusal(() => evaluateParameters(define({ a: "a" })))).toMatchObject({ reason: "cycle", names: ["a"] });
  });

  test("a refusal says which definition it is about", () => {
    const data = refusal(() => evaluateParameters(define({ a: "1", b: "a/0" })));
    expect(data).toMatchObject({ reason: "not-finite", parameter: "b", text: "a/0", position: 1 });
  });

  test("two parameters cannot share a name", () => {
    const twice = [
      { name: "a", expression: "1" },
      { name: "a", expression: "2" },
    ];
    expect(refusal(() => evaluateParameters(twice))).toMatchObject({ reason: "duplicate-name", name: "a" });
  });
});
