import { accelerator } from "./accelerator";

/** Multiplications from which a call repays the copies it needs. */
const WORTH_A_CALL = 1500;

/** As `factorByLoops`, to the bit, over lu and rows; null when the loops must do it. */
export function acceleratedFactor(lu: Float64Array, rows: Int32Array, n: number): number | null {
  const square = n * n;
  const found = square * n < 2 * WORTH_A_CALL ? null : accelerator(square + n);
  if (!found) return null;
  const { kernel, numbers } = found;
  const order = new Int32Array(numbers.buffer, 8 * square, n);
  numbers.set(lu);
  order.set(rows);
  const zeroPivot = kernel.factor(0, n, 8 * square);
  lu.set(numbers.subarray(0, square));
  rows.set(order);
  return zeroPivot;
}

/** As `solveByLoops`, to the bit, over x; false when the loops must do it. */
export function acceleratedSolve(lu: Float64Array, n: number, x: Float64Array, columns: number): boolean {
  const square = n * n;
  const found = columns < 4 || square * columns < WORTH_A_CALL ? null : accelerator(square + n * columns);
  if (!found) return false;
  const { kernel, numbers } = found;
  numbers.set(lu);
  numbers.set(x, square);
  kernel.solve(0, n, 8 * square, columns);
  x.set(numbers.subarray(square, square + n * columns));
  return true;
}
