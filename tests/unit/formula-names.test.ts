import { expect, test } from "vitest";
import { NumericalError } from "@/control/errors";
import { evaluateExpression } from "@/control/expression/evaluate-expression";
import { evaluateParameters } from "@/control/expression/evaluate-parameters";
import { isReservedName } from "@/control/expression/reserved-names";

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
    expect(() => evaluateParameters([{ name, expression: "1" }])).toThrow(NumericalError);
  },
);

test.each(["", "1a", "a b", "a-b", "a.b", "ä", "a".repeat(41)])("%j is not a parameter's name", (name) => {
  expect(() => evaluateParameters([{ name, expression: "1" }])).toThrow(NumericalError);
});

test("reserved words stay refused even when somebody puts them into the map", () => {
  const smuggled = new Map([...INHERITED, "mod", "true", "i", "sin"].map((name) => [name, 1]));
  for (const name of smuggled.keys()) expect(() => evaluateExpression(`${name}+1`, smuggled)).toThrow(NumericalError);
  expect(evaluateExpression("pi", new Map([["pi", 3]]))).toBe(Math.PI);
});
