export const CONSTANTS: ReadonlyMap<string, number> = new Map([
  ["pi", Math.PI],
  ["e", Math.E],
]);

/** One argument each; angles in rad; `log` is the natural logarithm. */
export const FUNCTIONS: ReadonlyMap<string, (x: number) => number> = new Map([
  ["sqrt", Math.sqrt],
  ["cbrt", Math.cbrt],
  ["abs", Math.abs],
  ["sign", Math.sign],
  ["exp", Math.exp],
  ["log", Math.log],
  ["log10", Math.log10],
  ["log2", Math.log2],
  ["sin", Math.sin],
  ["cos", Math.cos],
  ["tan", Math.tan],
  ["asin", Math.asin],
  ["acos", Math.acos],
  ["atan", Math.atan],
  ["sinh", Math.sinh],
  ["cosh", Math.cosh],
  ["tanh", Math.tanh],
]);

/** Words the parser reads as values or operators, the imaginary unit, and names that objects inherit. */
const WORDS: ReadonlySet<string> = new Set([
  ...["i", "inf", "nan", "infinity", "true", "false", "null", "undefined"],
  ...["end", "mod", "to", "in", "and", "or", "xor", "not"],
  ...["__proto__", "constructor", "prototype", "hasownproperty", "tostring", "valueof"],
]);

/** True for a name that already means something in a formula, in any mix of capitals for words, so that it cannot name a parameter. */
export function isReservedName(name: string): boolean {
  return CONSTANTS.has(name) || FUNCTIONS.has(name) || WORDS.has(name.toLowerCase());
}
