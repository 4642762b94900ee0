import { NumericalError } from "../errors";
import { largestEntry } from "./flat";
import { exponentOf, powerOfTwo, timesPowerOfTwo } from "./power-of-two";
import { workArray } from "./work-array";

/** Rows of complex numbers; `im` null when all are real. */
export type Rows = { readonly re: Float64Array[]; readonly im: Float64Array[] | null };

/** `rows` are orthogonal afterwards, largest first, times a power of two; `turn` is the unitary matrix that made them; values are their lengths. */
export type OrthogonalRows = { readonly values: number[]; readonly rows: Rows; readonly turn: Rows };

const SWEEP_LIMIT = 60;
/** Products this small beside a row's square are remains of cancellation whose own square would vanish. */
const NEGLIGIBLE = 1e-90;
/** The largest entry is brought here, as high as squares allow, so that rows 10^280 times smaller still have theirs in full. */
const HEADROOM = 490;
/** A row whose square is below has too few digits left in its products to turn by: it stays as it is. */
const VANISHED = powerOfTwo(-940);

/**
 * One-sided Jacobi: turns the rows of M until they are orthogonal, which is the singular value decomposition.
 * The lengths of the rows are the singular values, the rows of `turn`, conjugated, the left vectors.
 *
 * Shapes    rows r of c entries, r ≤ c for full information → values r, turn r×r
 * Throws    no-convergence after 60 sweeps (six to ten are usual)
 * Accuracy  small singular values of a matrix with rows of unlike size keep relative accuracy, down to 10^-280 of the largest
 * Source    Demmel & Veselic, Jacobi's method is more accurate than QR, SIAM J. Matrix Anal. Appl. 13 (1992) 1204-1245
 */
export function orthogonaliseRows(given: Rows): OrthogonalRows {
  const count = given.re.length;
  const length = given.re[0]?.length ?? 0;
  const largest = Math.max(0, ...[...given.re, ...(given.im ?? [])].map(largestEntry));
  const shift = largest === 0 ? 0 : HEADROOM - exponentOf(largest);
  const rows = {
    re: given.re.map((row) => row.map((x) => timesPowerOfTwo(x, shift))),
    im: given.im ? given.im.map((row) => row.map((x) => timesPowerOfTwo(x, shift))) : null,
  };
  const unit = () => Array.from({ length: count }, () => workArray(count));
  const turn = { re: unit(), im: given.im ? unit() : null };
  for (let i = 0; i < count; i++) turn.re[i][i] = 1;
  const tolerance = Number.EPSILON * Math.sqrt(Math.max(length, 1));
  const squares = Float64Array.from(rows.re, (_, i) => squareOf(rows, i));
  for (let sweep = 0; ; sweep++) {
    if (sweep === SWEEP_LIMIT) throw new NumericalError("no-convergence", { routine: "one-sided-jacobi", limit: SWEEP_LIMIT });
    let turned = false;
    for (let i = 0; i < count - 1; i++)
      for (let j = i + 1; j < count; j++) turned = turnPair(rows, turn, squares, i, j, tolerance) || turned;
    if (!turned) break;
  }
  const lengths = rows.re.map((_, i) => timesPowerOfTwo(Math.sqrt(squares[i]), -shift));
  const order = lengths.map((_, i) => i).sort((i, j) => lengths[j] - lengths[i] || i - j);
  const pick = ({ re, im }: Rows): Rows => ({ re: order.map((i) => re[i]), im: im ? order.map((i) => im[i]) : null });
  return { values: order.map((i) => lengths[i]), rows: pick(rows), turn: pick(turn) };
}

function squareOf({ re, im }: Rows, i: number): number {
  return dot(re[i], re[i]) + (im ? dot(im[i], im[i]) : 0);
}

/** Summed as four parts that do not wait for each other. */
function dot(x: Float64Array, y: Float64Array): number {
  let [a, b, c, d] = [0, 0, 0, 0];
  const whole = x.length - (x.length % 4);
  let k = 0;
  for (; k < whole; k += 4) {
    a += x[k] * y[k];
    b += x[k + 1] * y[k + 1];
    c += x[k + 2] * y[k + 2];
    d += x[k + 3] * y[k + 3];
  }
  for (; k < x.length; k++) a += x[k] * y[k];
  return a + b + (c + d);
}

/** Makes rows i and j orthogonal; false when they already are. The longer one is kept first. */
function turnPair(rows: Rows, turn: Rows, squares: Float64Array, i: number, j: number, tolerance: number): boolean {
  const a = squares[i];
  const b = squares[j];
  if (a === 0 && b === 0) return false;
  const re = dot(rows.re[i], rows.re[j]) + (rows.im ? dot(rows.im[i], rows.im[j]) : 0);
  const im = rows.im ? dot(rows.im[i], rows.re[j]) - dot(rows.re[i], rows.im[j]) : 0;
  const size = im === 0 ? Math.abs(re) : modulus(re, im);
  const bound = tolerance * Math.sqrt(a) * Math.sqrt(b);
  if (size <= bound || size <= NEGLIGIBLE * Math.max(a, b) || Math.min(a, b) < VANISHED) {
    if (a >= b) return false;
    for (const part of [rows, turn]) exchange(part, i, j);
    [squares[i], squares[j]] = [b, a];
    return false;
  }
  const zeta = (b - a) / (2 * size);
  const t = (zeta >= 0 ? 1 : -1) / (Math.abs(zeta) + Math.sqrt(1 + zeta * zeta));
  const cos = 1 / Math.sqrt(1 + t * t);
  const sin = cos * t;
  for (const part of [rows, turn]) rotate(part, i, j, cos, sin, re / size, im / size);
  if (a < b) for (const part of [rows, turn]) exchange(part, i, j);
  // Computed anew: updated, they would lose the digits of the smaller one.
  squares[i] = squareOf(rows, i);
  squares[j] = squareOf(rows, j);
  return true;
}

/** Squares of products as large or small as these may be leave the range of numbers. */
function modulus(re: number, im: number): number {
  const exponent = exponentOf(Math.max(Math.abs(re), Math.abs(im)));
  const x = timesPowerOfTwo(re, -exponent);
  const y = timesPowerOfTwo(im, -exponent);
  return timesPowerOfTwo(Math.sqrt(x * x + y * y), exponent);
}

function exchange({ re, im }: Rows, i: number, j: number): void {
  [re[i], re[j]] = [re[j], re[i]];
  if (im) [im[i], im[j]] = [im[j], im[i]];
}

/** With the phase p + i q of the inner product put on row j: row i ← cos i - sin p j, row j ← sin i + cos p j. */
function rotate({ re, im }: Rows, i: number, j: number, cos: number, sin: number, p: number, q: number): void {
  const [xr, yr] = [re[i], re[j]];
  if (!im) {
    for (let k = 0; k < xr.length; k++) {
      const x = xr[k];
      const y = yr[k] * p;
      xr[k] = cos * x - sin * y;
      yr[k] = sin * x + cos * y;
    }
    return;
  }
  const [xi, yi] = [im[i], im[j]];
  for (let k = 0; k < xr.length; k++) {
    const x = xr[k];
    const z = xi[k];
    const y = yr[k] * p - yi[k] * q;
    const w = yr[k] * q + yi[k] * p;
    xr[k] = cos * x - sin * y;
    yr[k] = sin * x + cos * y;
    xi[k] = cos * z - sin * w;
    yi[k] = sin * z + cos * w;
  }
}
