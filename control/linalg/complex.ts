import type { Matrix } from "ml-matrix";
import type { Complex } from "../plant/model";
import { pythagoras } from "./flat";

/** Real and imaginary parts, of equal shape. */
export type ComplexMatrix = { readonly re: Matrix; readonly im: Matrix };
export type ComplexVector = { readonly re: Float64Array; readonly im: Float64Array };

export function complexProduct(a: Complex, b: Complex): Complex {
  return { re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re };
}

/** a / b without overflow in between (Smith, Commun. ACM 5 (1962) 435). b ≠ 0. */
export function complexQuotient(a: Complex, b: Complex): Complex {
  if (Math.abs(b.re) >= Math.abs(b.im)) {
    const ratio = b.im / b.re;
    const denominator = b.re + b.im * ratio;
    return { re: (a.re + a.im * ratio) / denominator, im: (a.im - a.re * ratio) / denominator };
  }
  const ratio = b.re / b.im;
  const denominator = b.re * ratio + b.im;
  return { re: (a.re * ratio + a.im) / denominator, im: (a.im * ratio - a.re) / denominator };
}

export function modulus(a: Complex): number {
  return pythagoras(a.re, a.im);
}
