import { expect, test } from "vitest";
import { NumericalError } from "@/control/errors";
import { evaluateExpression } from "@/control/expression/evaluate-expression";
import { processorMs } from "../helpers/processor-time";
import { seededUniform } from "../helpers/seeded";

const PIECES = [
  ..."0123456789.+-*/^()_ \t\n,;:!%&|'\"`[]{}<>=?@#$~\\",
  ...[
    "\u2212",
    "\u00e9",
    "\u{1f600}",
    "e",
    "e5",
    "1e",
    "pi",
    "a",
    "b_1",
    "i",
    "sin(",
    "sqrt(",
    "log(",
    "abs(",
    "^-",
    "**",
    "...",
    "//",
    "=>",
  ],
  ...[
    "__proto__",
    "constructor",
    "toString",
    "mod",
    "to",
    "in",
    "not",
    "true",
    "null",
    "NaN",
    "end",
    "import(",
    "function",
    "0x",
    "1e308",
    "9".repeat(30),
  ],
];
const FORMULA = ["1", "2.5", "a", "b_1", "pi", "+", "-", "*", "/", "^", "(", ")", "sin(", "sqrt(", " ", "-", "3e-2"];
const SEED = 20_250_607;

test(`200 000 random texts (seed ${SEED}) give a finite number or a typed refusal, within ten seconds`, () => {
  const random = seededUniform(SEED);
  const parameters = new Map([
    ["a", 0.5],
    ["b_1", -3],
  ]);
  const started = processorMs();
  let values = 0;
  for (let k = 0; k < 200_000; k++) {
    const pieces = k % 2 === 0 ? PIECES : FORMULA;
    const length = 1 + Math.floor(random() * (k % 50 === 0 ? 120 : 12));
    let text = "";
    for (let j = 0; j < length; j++) text += pieces[Math.floor(random() * pieces.length)];
    try {
      const value = evaluateExpression(text, parameters);
      if (!Number.isFinite(value) || Object.is(value, -0)) throw new Error(`${JSON.stringify(text)} gave ${value}`);
      values++;
    } catch (error) {
      if (!(error instanceof NumericalError) || error.code !== "bad-expression")
        throw new Error(`${JSON.stringify(text)}: ${error}`);
    }
  }
  expect(values).toBeGreaterThan(5_000);
  expect(processorMs() - started).toBeLessThan(10_000);
});

test("random well-formed formulas agree with the same arithmetic done directly", () => {
  const random = seededUniform(SEED + 1);
  const pick = <T>(items: readonly T[]) => items[Math.floor(random() * items.length)];
  function formula(depth: number): { text: string; value: number } {
    if (depth === 0 || random() < 0.2) {
      const value = Math.round(random() * 1e4) / 100;
      return { text: String(value), value };
    }
    const left = formula(depth - 1);
    const right = formula(depth - 1);
    const operator = pick(["+", "-", "*", "/"]);
    const value = {
      "+": left.value + right.value,
      "-": left.value - right.value,
      "*": left.value * right.value,
      "/": left.value / right.value,
    }[operator];
    return { text: `(${left.text})${operator}(${right.text})`, value: value ?? Number.NaN };
  }
  let compared = 0;
  for (let k = 0; k < 2_000; k++) {
    const { text, value } = formula(3);
    if (text.length > 200 || !Number.isFinite(value)) continue;
    expect(evaluateExpression(text, new Map())).toBe(value + 0);
    compared++;
  }
  expect(compared).toBeGreaterThan(1_000);
});
