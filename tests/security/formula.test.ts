import { readdirSync, readFileSync } from "node:fs";
import { expect, test } from "vitest";
import { NumericalError } from "@/control/errors";
import { evaluateExpression } from "@/control/expression/evaluate-expression";

const parameters = new Map([
  ["a", 2],
  ["b", 3],
]);

const HOSTILE = [
  'cos.constructor("return process")()',
  "a.constructor",
  "a.__proto__",
  '"".constructor.constructor("return 1")()',
  "constructor",
  "constructor(1)",
  "__proto__",
  "__proto__(1)",
  "toString()",
  "toString(1)",
  "hasOwnProperty(1)",
  "valueOf(1)",
  'import({"pi": 3}, {"override": true})',
  'createUnit("zz")',
  'config({"number": "BigNumber"})',
  'evaluate("1+1")',
  'parse("1+1")',
  'simplify("a+a")',
  'derivative("a^2", "a")',
  "parser()",
  'compile("1")',
  "f(x) = x",
  "f(x) = x; f(1)",
  "a = 3",
  "a += 1",
  "1; 2",
  "1\n2",
  "[1, 2, 3]",
  "[1, 2][1]",
  "{x: 1}",
  "{x: 1}.x",
  "a[1]",
  "1:1e7",
  "size(1:1e7)",
  "zeros(2000, 2000)",
  "range(1, 1e9)",
  "170!",
  "a'",
  "5 cm",
  "5 cm to m",
  "a to b",
  "a mod b",
  "not a",
  "a and b",
  "a ? 1 : 2",
  "a == b",
  "a | b",
  "1 << 30",
  "~a",
  '"text"',
  "'text'",
  "true",
  "null",
  "undefined",
  "NaN",
  "Infinity",
  "i",
  "0b1111",
  "0xffff",
  "1 + 2i",
  "5%",
  "a .* b",
  "a ?. b",
  "# comment",
  "1 # comment",
  "random()",
  "reviver(1)",
  "chain(1)",
  "typed(1)",
  "help(1)",
  "sqrt(1, 2)",
  "sqrt()",
  "sqrt",
  "max(1, 2)",
  "end",
  "process",
  "globalThis",
  "this",
  "=1+1",
  "@SUM(1)",
  "\u0000",
  "1\u2028+1",
  "$(1)",
];

test(`${HOSTILE.length} hostile texts are all refused with a place`, () => {
  expect(HOSTILE.length).toBeGreaterThanOrEqual(47);
  for (const text of HOSTILE) {
    let refusal: unknown = null;
    try {
      evaluateExpression(text, parameters);
    } catch (error) {
      refusal = error;
    }
    expect(refusal, text).toBeInstanceOf(NumericalError);
    expect((refusal as NumericalError).code, text).toBe("bad-expression");
    expect((refusal as NumericalError).data.position, text).toBeGreaterThanOrEqual(0);
  }
});

test.each([
  ["a + b", 5],
  ["a * b ^ 2", 18],
  ["-a", -2],
  ["(a + b) / 2", 2.5],
  ["sqrt(16)", 4],
  ["2 * pi", 2 * Math.PI],
  ["e", Math.E],
  ["1.5e-3", 0.0015],
  ["abs(a - b)", 1],
])("the good text %s is %d", (text, value) => expect(evaluateExpression(text, parameters)).toBe(value));

test("a hostile text leaves no trace in the process", () => {
  const before = Object.getOwnPropertyNames(Object.prototype).join();
  for (const text of HOSTILE) expect(() => evaluateExpression(text, parameters)).toThrow();
  expect(Object.getOwnPropertyNames(Object.prototype).join()).toBe(before);
  expect(evaluateExpression("pi", parameters)).toBe(Math.PI);
});

test("one file takes the parser from its package, and nothing there can evaluate", () => {
  const folder = new URL("../../control/expression/", import.meta.url);
  const importing = readdirSync(folder).filter((file) => /from "mathjs/.test(readFileSync(new URL(file, folder), "utf8")));
  expect(importing).toEqual(["parse-tree.ts"]);
  const source = readFileSync(new URL("parse-tree.ts", folder), "utf8");
  expect(source).not.toMatch(/\b(evaluate|compile|simplify|derivative|evaluateDependencies|all)\s*[(,]/);
});
