import { NumericalError } from "../errors";
import { largestEntry } from "./flat";
import { exponentOf, powerOfTwo } from "./power-of-two";

const SWEEP_LIMIT = 60;
/** Squares of inner products below this, beside a largest entry of 1, have no digits left to turn by. */
const VANISHED = 2 ** -900;

/** Scratch for matrices of one shape; `values` holds the min(r, c) singular values after a call, largest first. */
export type SingularRoom = {
  readonly lines: number;
  readonly length: number;
  readonly columns: number;
  readonly re: Float64Array;
  readonly im: Float64Array;
  readonly squares: Float64Array;
  readonly values: Float64Array;
};

export function singularRoom(rows: number, columns: number): SingularRoom {
  const lines = Math.min(rows, columns);
  const entries = () => new Float64Array(rows * columns);
  const line = () => new Float64Array(lines);
  return {
    lines,
    length: Math.max(rows, columns),
    columns,
    re: entries(),
    im: entries(),
    squares: line(),
    values: line(),
  };
}

/**
 * Singular values of a complex matrix without its vectors, for thousands of small matrices in a row.
 *
 * Shapes    re, im r×c row-major, left untouched; finite → room.values
 * Throws    no-convergence after 60 sweeps (four to six are usual)
 * Accuracy  c ε of the largest; smaller ones keep relative accuracy where the shorter side's lines differ in size
 * Source    Hestenes, J. SIAM 6 (1958) 51-90; Demmel & Veselic, SIAM J. Matrix Anal. Appl. 13 (1992) 1204-1245
 */
export function complexSingularValues(re: Float64Array, im: Float64Array, room: SingularRoom): Float64Array {
  const { lines, values, squares } = room;
  const largest = Math.max(largestEntry(re), largestEntry(im));
  values.fill(0);
  if (largest === 0 || lines === 0) return values;
  const exponent = Math.min(exponentOf(largest), 1000);
  load(re, im, powerOfTwo(-exponent), room);
  if (lines > 1) orthogonalise(room);
  else squares[0] = squareOfLine(room, 0);
  const unit = powerOfTwo(exponent);
  for (let i = 0; i < lines; i++) values[i] = Math.sqrt(squares[i]) * unit;
  sortDown(values);
  return values;
}

/** Lines of the shorter side, one after the other. */
function load(re: Float64Array, im: Float64Array, factor: number, room: SingularRoom): void {
  const { lines, length, columns } = room;
  if (lines < columns || length === columns) {
    for (let k = 0; k < re.length; k++) {
      room.re[k] = re[k] * factor;
      room.im[k] = im[k] * factor;
    }
    return;
  }
  for (let i = 0; i < length; i++) {
    for (let j = 0; j < columns; j++) {
      room.re[j * length + i] = re[i * columns + j] * factor;
      room.im[j * length + i] = im[i * columns + j] * factor;
    }
  }
}

function squareOfLine({ re, im, length }: SingularRoom, i: number): number {
  let sum = 0;
  for (let k = i * length; k < (i + 1) * length; k++) sum += re[k] * re[k] + im[k] * im[k];
  return sum;
}

function orthogonalise(room: SingularRoom): void {
  const { lines, length, re, im, squares } = room;
  const tolerance = 16 * Number.EPSILON * Number.EPSILON * length;
  for (let sweep = 0; sweep < SWEEP_LIMIT; sweep++) {
    for (let i = 0; i < lines; i++) squares[i] = squareOfLine(room, i);
    let turned = false;
    for (let i = 0; i + 1 < lines; i++) {
      for (let j = i + 1; j < lines; j++) {
        let pr = 0;
        let pi = 0;
        for (let k = i * length, l = j * length; k < (i + 1) * length; k++, l++) {
          pr += re[k] * re[l] + im[k] * im[l];
          pi += im[k] * re[l] - re[k] * im[l];
        }
        const product = pr * pr + pi * pi;
        if (product <= tolerance * squares[i] * squares[j] || product <= VANISHED) continue;
        turned = true;
        turnPair(room, i, j, pr, pi, Math.sqrt(product));
      }
    }
    if (!turned) return;
  }
  throw new NumericalError("no-convergence", {
    routine: "complex-one-sided-jacobi",
    limit: SWEEP_LIMIT,
  });
}

/** Lines i and j made orthogonal; their inner product is pr + i pi, of that size. */
function turnPair({ length, re, im, squares }: SingularRoom, i: number, j: number, pr: number, pi: number, size: number): void {
  const zeta = (squares[j] - squares[i]) / (2 * size);
  const t = (zeta >= 0 ? 1 : -1) / (Math.abs(zeta) + Math.sqrt(1 + zeta * zeta));
  const cos = 1 / Math.sqrt(1 + t * t);
  const sin = cos * t;
  const p = pr / size;
  const q = pi / size;
  for (let k = i * length, l = j * length; k < (i + 1) * length; k++, l++) {
    const x = re[k];
    const z = im[k];
    const y = re[l] * p - im[l] * q;
    const w = re[l] * q + im[l] * p;
    re[k] = cos * x - sin * y;
    im[k] = cos * z - sin * w;
    re[l] = sin * x + cos * y;
    im[l] = sin * z + cos * w;
  }
  squares[i] -= t * size;
  squares[j] += t * size;
}

function sortDown(values: Float64Array): void {
  for (let i = 1; i < values.length; i++) {
    const value = values[i];
    let k = i;
    for (; k > 0 && values[k - 1] < value; k--) values[k] = values[k - 1];
    values[k] = value;
  }
}
