import type { Complex } from "../plant/model";
import { formatNumber } from "./format-number";

/** A real value as itself, a conjugate pair as "−0.91 ± 99.03 i", one of the pair as "−0.91 − 99.03 i". */
export function formatComplex({ re, im }: Complex, options: { readonly pair?: boolean } = { pair: true }): string {
  if (im === 0) return formatNumber(re);
  const sign = options.pair ? "±" : im < 0 ? "\u2212" : "+";
  return `${formatNumber(re)} ${sign} ${formatNumber(Math.abs(im))} i`;
}
