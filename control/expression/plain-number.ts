const PLAIN = /^\s*[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?\s*$/;
const LONGEST = 200;

/**
 * Value of a text that is nothing but a decimal number, else null. Needs no parser, so that a page of plain numbers loads none.
 *
 * Shapes    text → number or null; U+2212 counts as a minus sign; 200 characters at most
 * Throws    nothing: null also stands for a number beyond the largest double
 * Accuracy  correctly rounded; never -0
 */
export function parsePlainNumber(text: string): number | null {
  if (text.length > LONGEST) return null;
  const ascii = text.replaceAll("\u2212", "-");
  if (!PLAIN.test(ascii)) return null;
  const value = Number(ascii);
  return Number.isFinite(value) ? value + 0 : null;
}
