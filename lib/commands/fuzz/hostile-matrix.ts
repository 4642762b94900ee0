import { Matrix } from "ml-matrix";

/** Uniform in [0, 1). */
export type Random = () => number;

export const whole = (random: Random, low: number, high: number) => low + Math.floor(random() * (high - low + 1));
export const pick = <T>(random: Random, choices: readonly T[]): T => choices[Math.floor(random() * choices.length)];
const uniform = (random: Random) => 2 * random() - 1;

/** Powers of ten by which units or entries are spread. */
const SPREADS = [12, 150, 300];

/** Kinds of single entries. */
const ENTRIES: readonly ((random: Random) => number)[] = [
  (random) => pick(random, [-1, 0, 0, 0, 1]),
  uniform,
  (random) => pick(random, [0, 0, 1, -1, 1e-8, -3, 1e6]),
  (random) => uniform(random) * 10 ** whole(random, -300, 300),
  (random) => pick(random, [0, 1, -1, 5e-324, 2.2e-308, -1e-310, 1e300, -1.7e308]),
  (random) => uniform(random) * 1e-320,
  (random) => uniform(random) * 1e200,
  (random) => whole(random, -4, 4),
];

function filled(rows: number, columns: number, entry: (i: number, j: number) => number): Matrix {
  const M = Matrix.zeros(rows, columns);
  for (let i = 0; i < rows; i++) for (let j = 0; j < columns; j++) M.set(i, j, entry(i, j));
  return M;
}

/** A matrix of entries of one kind, at times with rows repeated, rows or columns of zeros, or units far apart. */
export function hostileMatrix(random: Random, rows: number, columns: number): Matrix {
  if (random() < 0.06) return Matrix.zeros(rows, columns);
  const entry = pick(random, ENTRIES);
  const M = filled(rows, columns, () => entry(random));
  const defect = random();
  if (rows > 1 && defect < 0.1) M.setRow(whole(random, 0, rows - 1), M.getRow(whole(random, 0, rows - 1)));
  else if (rows > 0 && defect < 0.15) M.setRow(whole(random, 0, rows - 1), Array(columns).fill(0));
  else if (columns > 0 && defect < 0.2) M.setColumn(whole(random, 0, columns - 1), Array(rows).fill(0));
  return random() < 0.15 ? spreadUnits(random, M, false) : M;
}

/** D⁻¹ M D (or D₁ M D₂) with powers of ten far apart; what leaves the doubles becomes zero or the largest. */
function spreadUnits(random: Random, M: Matrix, similar: boolean): Matrix {
  const far = pick(random, SPREADS) / 2;
  const left = Array.from({ length: M.rows }, () => 10 ** whole(random, -far, far));
  const right = similar ? left : Array.from({ length: M.columns }, () => 10 ** whole(random, -far, far));
  return filled(M.rows, M.columns, (i, j) => clamp((M.get(i, j) / left[i]) * right[j]));
}

export const clamp = (x: number) => (Number.isFinite(x) ? x : Math.sign(x) * 1e308 || 0);

/** Square matrices with a name in the textbooks of what goes wrong. */
const DYNAMICS: readonly ((random: Random, n: number) => Matrix)[] = [
  // Nilpotent: a chain of integrators, its states in any order
  (random, n) => shuffled(random, n, (i, j) => (j > i ? pick(random, [0, 1, 1, -2]) : 0)),
  // Defective: Jordan blocks of one value, turned by whole numbers
  (random, n) => {
    const value = pick(random, [0, -1, 1, 0.5, -1e-8, 3]);
    const blocks = filled(n, n, (i, j) => (i === j ? value : j === i + 1 && random() < 0.8 ? 1 : 0));
    const turn = filled(n, n, (i, j) => (i === j ? 1 : j > i ? whole(random, -1, 1) : 0));
    return turn.mmul(blocks).mmul(unitUpperInverse(turn));
  },
  // Cyclic shift: eigenvalues on a circle
  (random, n) => shuffled(random, n, (i, j) => (j === (i + 1) % n ? pick(random, [1, 1, -1]) : 0)),
  // Undamped oscillators
  (random, n) => filled(n, n, (i, j) => (j === i + 1 && i % 2 === 0 ? 1 : i === j + 1 && j % 2 === 0 ? -whole(random, 0, 3) : 0)),
  // Companion of a polynomial with coefficients far apart
  (random, n) => filled(n, n, (i, j) => (j === i + 1 ? 1 : i === n - 1 ? uniform(random) * 10 ** whole(random, -9, 9) : 0)),
  // A stable plant with ordinary numbers
  (random, n) => filled(n, n, (i, j) => uniform(random) - (i === j ? n : 0)),
  (random, n) => filled(n, n, () => uniform(random) / Math.max(1, n)),
];

export function hostileDynamics(random: Random, n: number): Matrix {
  if (random() < 0.45) return hostileMatrix(random, n, n);
  const M = pick(random, DYNAMICS)(random, n);
  const fate = random();
  if (fate < 0.2) return spreadUnits(random, M, true);
  const size = fate < 0.3 ? 10 ** whole(random, -300, 300) : 1;
  return filled(n, n, (i, j) => clamp(M.get(i, j) * size));
}

function shuffled(random: Random, n: number, entry: (i: number, j: number) => number): Matrix {
  const order = Array.from({ length: n }, (_, i) => i);
  for (let i = n - 1; i > 0; i--) {
    const j = whole(random, 0, i);
    [order[i], order[j]] = [order[j], order[i]];
  }
  return filled(n, n, (i, j) => entry(order[i], order[j]));
}

function unitUpperInverse(U: Matrix): Matrix {
  const n = U.rows;
  const inverse = Matrix.eye(n);
  for (let i = n - 1; i >= 0; i--)
    for (let k = i + 1; k < n; k++)
      for (let j = 0; j < n; j++) inverse.set(i, j, inverse.get(i, j) - U.get(i, k) * inverse.get(k, j));
  return inverse;
}

/** Symmetric, mostly semidefinite: M'M, a diagonal, zero, or a symmetric matrix of any sign. */
export function hostileWeight(random: Random, n: number): Matrix {
  const kind = random();
  if (kind < 0.35) return filled(n, n, (i, j) => (i === j ? 1 : 0));
  if (kind < 0.5) return filled(n, n, (i, j) => (i === j ? 10 ** whole(random, -12, 12) : 0));
  if (kind < 0.55) return filled(n, n, (i, j) => (i === j ? Math.abs(pick(random, ENTRIES)(random)) : 0));
  const M = hostileMatrix(random, whole(random, 0, n), n);
  if (kind < 0.9) return filled(n, n, (i, j) => clamp(M.rows === 0 ? 0 : dot(M.getColumn(i), M.getColumn(j))));
  const any = hostileMatrix(random, n, n);
  return filled(n, n, (i, j) => any.get(Math.min(i, j), Math.max(i, j)));
}

const dot = (a: readonly number[], b: readonly number[]) => a.reduce((sum, x, k) => sum + x * b[k], 0);
