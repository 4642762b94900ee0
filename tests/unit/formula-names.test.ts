import { expect, test } from "vitest";
import { NumericalError } from "@/control/errors";
import { evaluateExpression } from "@/control/expression/evaluate-expression";
import { isReservedName } from "@/control/expression/reserved-names";
import { parameterValues } from "@/control/plant/parameter-values";

const problemsOf = (name: string) => parameterValues([{ name, expression: "1", unit: "1", note: "" }]).problems;
const INHERITED = ["__proto__", "constructor", "toString", "hasOwnProperty", "valueOf", "prototype"];

test.each([...INHERITED, "isPrototypeOf", "__defineGetter__"])("%s is no name, no function and no parameter", (name) => {
  for (const text of [name, `${name}(1)`, `1+${name}`, `sqrt(${name})`]) {
    expect(() => evaluateExpression(text, new Map())).toThrow(NumericalError);
  }
});

test.each([...INHERITED, "e", "i", "pi", "inf", "NaN", "Infinity", "sin", "log", "true", "mod", "in", "not"])(
  "%s cannot name a parameter",
  (name) => {
    expect(isReservedName(name)).toBe(true);
    expect(problemsOf(name).map(({ pointer }) => pointer)).toEqual(["/parameters/0/name"]);
  },
);

test.each(["", "1a", "a b", "a-b", "a.b", "ä", "a".repeat(41)])("%j is not a parameter's name", (name) => {
  expect(problemsOf(name).map(({ pointer }) => pointer)).toEqual(["/parameters/0/name"]);
});

test("reserved words stay refused even when somebody puts them into the map", () => {
  const smuggled = new Map([...INHERITED, "mod", "true", "i", "sin"].map((name) => [name, 1]));
  for (const name of smuggled.keys()) expect(() => evaluateExpression(`${name}+1`, smuggled)).toThrow(NumericalError);
  expect(evaluateExpression("pi", new Map([["pi", 3]]))).toBe(Math.PI);
});
