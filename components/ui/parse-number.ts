export type NumberReading =
  | { readonly kind: "empty" }
  | { readonly kind: "number"; readonly value: number }
  /** `1,234` is one and a bit to some and above a thousand to others: the reader has to say which. */
  | { readonly kind: "ambiguous"; readonly decimal: number; readonly grouped: number }
  | { readonly kind: "not-a-number" };

const SPACES = /[\s\u00a0\u2007\u2009\u202f]/g;
const MINUSES = /[\u2212\u2012\u2013\ufe63\uff0d]/g;
const PLAIN = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i;
const ONE_COMMA = /^([+-]?)(\d*),(\d+)(e[+-]?\d+)?$/i;
const GROUPED_BY_COMMA = /^[+-]?\d{1,3}(,\d{3})+(\.\d*)?(e[+-]?\d+)?$/i;
const GROUPED_BY_POINT = /^[+-]?\d{1,3}(\.\d{3})+(,\d*)?(e[+-]?\d+)?$/i;

/** True minus and spaces as they arrive from documents and spreadsheets, written plainly. */
export const plainSigns = (text: string) => text.replace(MINUSES, "-").replace(SPACES, "");

const finite = (text: string): NumberReading => {
  const value = Number(text);
  return Number.isFinite(value) ? { kind: "number", value } : { kind: "not-a-number" };
};

/**
 * Reads what a person typed, the same in every locale: a single point is always the decimal sign, a comma is unless it could as
 * well group thousands. Both signs together: the last one is the decimal sign.
 */
export function parseNumber(typed: string): NumberReading {
  const text = plainSigns(typed);
  if (text === "") return { kind: "empty" };
  if (PLAIN.test(text)) return finite(text);
  const comma = ONE_COMMA.exec(text);
  if (comma) {
    const [, sign, whole, part, exponent = ""] = comma;
    const decimal = Number(`${sign}${whole || "0"}.${part}${exponent}`);
    const couldGroup = part.length === 3 && whole.length >= 1 && whole.length <= 3 && !whole.startsWith("0");
    if (!couldGroup) return Number.isFinite(decimal) ? { kind: "number", value: decimal } : { kind: "not-a-number" };
    return { kind: "ambiguous", decimal, grouped: Number(`${sign}${whole}${part}${exponent}`) };
  }
  if (GROUPED_BY_COMMA.test(text)) return finite(text.replaceAll(",", ""));
  if (GROUPED_BY_POINT.test(text)) return finite(text.replaceAll(".", "").replace(",", "."));
  return { kind: "not-a-number" };
}
