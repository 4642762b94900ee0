import { accelerator } from "./accelerator";

/** Below this size a call costs more than it saves. */
const WORTH_A_CALL = 5;

/** As `hessenbergByLoops`, to the bit and in place; false when the loops must do it. */
export function acceleratedHessenberg(h: Float64Array, n: number, qt: Float64Array | null): boolean {
  const square = n * n;
  const found = n < WORTH_A_CALL ? null : accelerator(2 * square + 2 * n);
  if (!found) return false;
  const { kernel, numbers } = found;
  numbers.set(h, 0);
  if (qt) numbers.set(qt, square);
  kernel.hessenberg(0, qt ? 8 * square : 0, n, 16 * square, 16 * square + 8 * n);
  h.set(numbers.subarray(0, square));
  qt?.set(numbers.subarray(square, 2 * square));
  return true;
}

/**
 * As `chaseByLoops`, to the bit, on copies of h and qt in the kernel's memory; null when the loops must do it. The copies are
 * good until the next accelerated call.
 */
export function acceleratedChase(h: Float64Array, n: number, full: boolean, qt: Float64Array | null) {
  const square = n * n;
  const found = n < WORTH_A_CALL ? null : accelerator(2 * square);
  if (!found) return null;
  const { kernel, numbers } = found;
  numbers.set(h, 0);
  if (qt) numbers.set(qt, square);
  return {
    h: numbers.subarray(0, square),
    qt: qt ? numbers.subarray(square, 2 * square) : null,
    n,
    full,
    sweep: (m: number, start: number, end: number, v0: number, v1: number, v2: number): void =>
      kernel.sweep(0, qt ? 8 * square : 0, n, full ? 1 : 0, m, start, end, v0, v1, v2),
  };
}
