import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { frobeniusNorm } from "../linalg/norms";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import { requireRepresentable } from "../linalg/require-representable";
import { solveLinear } from "../linalg/solve-linear";
import { lostInDifference } from "./lost-digits";

export type LoopPlant = {
  readonly A: Matrix;
  readonly B: Matrix;
  readonly C: Matrix;
  readonly D: Matrix;
  readonly H: Matrix;
  readonly J: Matrix;
};

export type ObserverInLoop =
  | { readonly kind: "full"; readonly L: Matrix }
  | {
      readonly kind: "reduced";
      readonly Fw: Matrix;
      readonly Fy: Matrix;
      readonly Fu: Matrix;
      readonly Gw: Matrix;
      readonly Gy: Matrix;
    };

/** How many signals of each kind stand in a response, in this order. */
export type SignalCounts = {
  readonly commanded: number;
  readonly outputs: number;
  readonly states: number;
  readonly estimates: number;
  readonly inputs: number;
};

/**
 * s' = A s + B v, signals = C s + D v (sampled: s(k+1) = ...), v = [references; input disturbances].
 * s is the plant's state with, behind it, what the observer has wrong: xhat = x + (something) o.
 */
export type ClosedLoop = {
  readonly A: Matrix;
  /** What A lost in rounding: A + lost is the loop of the plant and the gains as given, to twice the digits. */
  readonly lost: Matrix;
  readonly B: Matrix;
  readonly C: Matrix;
  readonly D: Matrix;
  readonly references: number;
  readonly disturbances: number;
  readonly counts: SignalCounts;
  /** Start of s for a start of the plant's state with the observer's own state (full order: its estimate) at zero. */
  readonly startFrom: (x0: readonly number[]) => Float64Array;
};

/** o' = self o + disturbed d, xhat = x + seen o + misled d, o(0) = start x0. */
type ObserverError = {
  readonly self: Matrix;
  readonly disturbed: Matrix;
  readonly seen: Matrix;
  readonly misled: Matrix;
  readonly start: Matrix;
};

/**
 * Closes the loop u = -K x + F r, or u = -K xhat + F r with an observer; a disturbance d adds to u at the plant's input and
 * is unknown to the observer. The recorded inputs are what the controller commands, without d.
 *
 * Shapes    n states, m inputs, p outputs, q commanded: K m×n, F m×q or null (then no references), signals q + p + n + (n) + m
 * Units     as the plant's
 * Throws    shape-mismatch; not-finite; too-large when a product leaves the range of numbers; inaccurate for matrices of a
 *           reduced-order observer that do not belong to the plant
 * Accuracy  a few roundings per entry. Observers are written in their error, so that their poles and the regulator's stand in
 *           separate blocks and a set point does not disturb the estimate; continuous and sampled alike
 * Source    Luenberger, IEEE Trans. Automatic Control 16 (1971) 596-602
 */
export function closeLoop(plant: LoopPlant, K: Matrix, F: Matrix | null, observer: ObserverInLoop | null): ClosedLoop {
  const { A, B, C, D, H, J } = plant;
  const n = A.rows;
  const m = B.columns;
  const references = F ? H.rows : 0;
  const feed = F ?? Matrix.zeros(m, 0);
  requireLoop(plant, K, feed, references);
  const error = observerError(plant, observer);
  const order = error.self.rows;
  const fromState = Matrix.mul(K, -1);
  const fromError = fromState.mmul(error.seen);
  const fromDisturbance = fromState.mmul(error.misled);
  const atInput = beside(feed, Matrix.add(Matrix.eye(m), fromDisturbance)); // u + d, from [r; d]
  const through = (onState: Matrix, onInput: Matrix) =>
    beside(Matrix.add(onState, onInput.mmul(fromState)), onInput.mmul(fromError));
  const estimates = observer ? n : 0;
  const system = {
    A: stack([through(A, B), beside(Matrix.zeros(order, n), error.self)]),
    B: stack([B.mmul(atInput), beside(Matrix.zeros(order, references), error.disturbed)]),
    C: stack([
      through(H, J),
      through(C, D),
      beside(Matrix.eye(n), Matrix.zeros(n, order)),
      beside(Matrix.eye(estimates, n), observer ? error.seen : Matrix.zeros(0, order)),
      beside(fromState, fromError),
    ]),
    D: stack([
      J.mmul(atInput),
      D.mmul(atInput),
      Matrix.zeros(n, references + m),
      beside(Matrix.zeros(estimates, references), observer ? error.misled : Matrix.zeros(0, m)),
      beside(feed, fromDisturbance),
    ]),
  };
  for (const M of Object.values(system)) requireRepresentable("closed loop", M.to1DArray());
  return {
    ...system,
    lost: lostDigits(plant, K, observer, system.A),
    references,
    disturbances: m,
    counts: { commanded: H.rows, outputs: C.rows, states: n, estimates, inputs: m },
    startFrom: (x0) => Float64Array.from([...x0, ...error.start.mmul(Matrix.columnVector([...x0])).to1DArray()]),
  };
}

/** Digits lost in A - BK, A - LC and BK; a reduced-order observer brings its own matrices. */
function lostDigits({ A, B, C }: LoopPlant, K: Matrix, observer: ObserverInLoop | null, closed: Matrix): Matrix {
  const n = A.rows;
  const lost = Matrix.zeros(closed.rows, closed.rows);
  if (n === 0) return lost;
  lost.setSubMatrix(lostInDifference(A, B, K, closed.subMatrix(0, n - 1, 0, n - 1)), 0, 0);
  if (observer?.kind !== "full") return lost;
  const last = 2 * n - 1;
  const fed = closed.subMatrix(0, n - 1, n, last);
  lost.setSubMatrix(lostInDifference(Matrix.zeros(n, n), B, Matrix.mul(K, -1), fed), 0, n);
  lost.setSubMatrix(lostInDifference(A, observer.L, C, closed.subMatrix(n, last, n, last)), n, n);
  return lost;
}

function requireLoop({ A, B, C, D, H, J }: LoopPlant, K: Matrix, F: Matrix, references: number): void {
  const [n, m] = [A.rows, B.columns];
  requireSquare("A", A);
  requireShape("B", B, n, m);
  requireShape("C", C, C.rows, n);
  requireShape("D", D, C.rows, m);
  requireShape("H", H, H.rows, n);
  requireShape("J", J, H.rows, m);
  requireShape("K", K, m, n);
  requireShape("F", F, m, references);
  for (const [name, M] of Object.entries({ A, B, C, D, H, J, K, F })) requireFinite(name, M);
}

function observerError(plant: LoopPlant, observer: ObserverInLoop | null): ObserverError {
  const { A, B, C, D } = plant;
  const n = A.rows;
  const m = B.columns;
  if (observer?.kind === "reduced") return reducedError(plant, observer);
  if (observer === null) {
    const none = Matrix.zeros(0, 0);
    return {
      self: none,
      disturbed: Matrix.zeros(0, m),
      seen: Matrix.zeros(n, 0),
      misled: Matrix.zeros(n, m),
      start: Matrix.zeros(0, n),
    };
  }
  // o = x - xhat: o' = (A - L C) o + (B - L D) d
  const { L } = observer;
  requireShape("L", L, n, C.rows);
  return {
    self: Matrix.sub(A, L.mmul(C)),
    disturbed: Matrix.sub(B, L.mmul(D)),
    seen: Matrix.mul(Matrix.eye(n), -1),
    misled: Matrix.zeros(n, m),
    start: Matrix.eye(n),
  };
}

/**
 * o = w - T x with Gw T = I - Gy C: w' = Fw w + Fy y + Fu u follows T x exactly when Fw T + Fy C = T A and Fu + Fy D = T B,
 * which is checked; then o' = Fw o + (Fy D - T B) d and xhat = x + Gw o + Gy D d.
 */
function reducedError(
  { A, B, C, D }: LoopPlant,
  { Fw, Fy, Fu, Gw, Gy }: Extract<ObserverInLoop, { kind: "reduced" }>,
): ObserverError {
  const hidden = Matrix.sub(Matrix.eye(A.rows), Gy.mmul(C));
  const T = Gw.columns === 0 ? Matrix.zeros(0, A.rows) : solveLinear(Gw.transpose().mmul(Gw), Gw.transpose().mmul(hidden)).X;
  const TB = T.mmul(B);
  const FyD = Fy.mmul(D);
  requireEqual(Gw.mmul(T), hidden, [Gw, T], [Gy, C]);
  requireEqual(Matrix.add(Fw.mmul(T), Fy.mmul(C)), T.mmul(A), [Fw, T], [Fy, C], [T, A]);
  requireEqual(Matrix.add(Fu, FyD), TB, [Fy, D], [T, B]);
  return { self: Fw, disturbed: Matrix.sub(FyD, TB), seen: Gw, misled: Gy.mmul(D), start: Matrix.mul(T, -1) };
}

/** Both sides of an identity agree to half the digits of the products they are made of. */
function requireEqual(left: Matrix, right: Matrix, ...products: readonly (readonly [Matrix, Matrix])[]): void {
  const bound = Math.sqrt(Number.EPSILON);
  const size = products.reduce((sum, [a, b]) => sum + frobeniusNorm(a) * frobeniusNorm(b), 1);
  const residual = frobeniusNorm(Matrix.sub(left, right)) / size;
  if (!(residual <= bound)) throw new NumericalError("inaccurate", { residual, bound });
}

function beside(left: Matrix, right: Matrix): Matrix {
  const whole = Matrix.zeros(left.rows, left.columns + right.columns);
  whole.setSubMatrix(left, 0, 0);
  whole.setSubMatrix(right, 0, left.columns);
  return whole;
}

function stack(blocks: readonly Matrix[]): Matrix {
  const whole = Matrix.zeros(
    blocks.reduce((rows, block) => rows + block.rows, 0),
    blocks[0].columns,
  );
  let row = 0;
  for (const block of blocks) {
    whole.setSubMatrix(block, row, 0);
    row += block.rows;
  }
  return whole;
}
