import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { flatIdentity, flatProduct, fromFlat, toFlat } from "../linalg/flat";
import { frobeniusNorm } from "../linalg/norms";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import { requireRepresentable } from "../linalg/require-representable";
import { solveLinear } from "../linalg/solve-linear";
import { workArray, workCopy } from "../linalg/work-array";
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

export type FlatLoop = Omit<ClosedLoop, "A" | "lost" | "B" | "C" | "D"> & {
  readonly order: number;
  readonly signals: number;
  readonly columns: number;
  readonly a: Float64Array;
  readonly lost: Float64Array;
  readonly b: Float64Array;
  readonly c: Float64Array;
  readonly d: Float64Array;
};

/** Entries of the plant's matrices. */
type Entries = { readonly a: Float64Array; readonly b: Float64Array; readonly c: Float64Array };

/** o' = self o + disturbed d, xhat = x + seen o + misled d, o(0) = start x0; `order` numbers in o. */
type ObserverError = {
  readonly order: number;
  readonly self: Float64Array;
  readonly disturbed: Float64Array;
  readonly seen: Float64Array;
  readonly misled: Float64Array;
  readonly start: Float64Array;
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
  const loop = flatLoop(plant, K, F, observer);
  const { order, signals, columns, references, disturbances, counts, startFrom } = loop;
  return {
    references,
    disturbances,
    counts,
    startFrom,
    A: fromFlat(loop.a, order, order),
    lost: fromFlat(loop.lost, order, order),
    B: fromFlat(loop.b, order, columns),
    C: fromFlat(loop.c, signals, order),
    D: fromFlat(loop.d, signals, columns),
  };
}

/** The same with row-major entries: a order×order, b order×columns, c signals×order, d signals×columns. */
export function flatLoop(plant: LoopPlant, K: Matrix, F: Matrix | null, observer: ObserverInLoop | null): FlatLoop {
  const n = plant.A.rows;
  const m = plant.B.columns;
  const references = F ? plant.H.rows : 0;
  const feed = F ?? Matrix.zeros(m, 0);
  requireLoop(plant, K, feed, references);
  const given = { a: toFlat(plant.A), b: toFlat(plant.B), c: toFlat(plant.C), h: toFlat(plant.H) };
  const [d, j, f, gain] = [toFlat(plant.D), toFlat(plant.J), toFlat(feed), toFlat(K)];
  const counts = { commanded: plant.H.rows, outputs: plant.C.rows, states: n, estimates: observer ? n : 0, inputs: m };
  const { commanded, outputs, estimates } = counts;
  const error = observerError(plant, given, observer);
  const order = n + error.order;
  const columns = references + m;
  const signals = commanded + outputs + n + estimates + m;
  const fromState = gain.map((entry) => -entry);
  const fromError = flatProduct(fromState, error.seen, m, n, error.order);
  const fromDisturbance = flatProduct(fromState, error.misled, m, n, m);
  const atInput = workArray(m * columns); // u + d, from [r; d]
  put(atInput, columns, f, m, references, 0, 0);
  put(atInput, columns, fromDisturbance, m, m, 0, references);
  for (let i = 0; i < m; i++) atInput[i * columns + references + i] += 1;
  const loop = {
    a: workArray(order * order),
    b: workArray(order * columns),
    c: workArray(signals * order),
    d: workArray(signals * columns),
  };
  /** Rows of the whole that see the state and the input like this. */
  const through = (whole: Float64Array, row: number, onState: Float64Array, onInput: Float64Array, rows: number): void => {
    put(whole, order, sum(onState, flatProduct(onInput, fromState, rows, m, n)), rows, n, row, 0);
    put(whole, order, flatProduct(onInput, fromError, rows, m, error.order), rows, error.order, row, n);
  };
  through(loop.a, 0, given.a, given.b, n);
  put(loop.a, order, error.self, error.order, error.order, n, n);
  put(loop.b, columns, flatProduct(given.b, atInput, n, m, columns), n, columns, 0, 0);
  put(loop.b, columns, error.disturbed, error.order, m, n, references);
  through(loop.c, 0, given.h, j, commanded);
  through(loop.c, commanded, given.c, d, outputs);
  const ownStates = commanded + outputs;
  for (let i = 0; i < n + estimates; i++) loop.c[(ownStates + i) * order + (i % n)] = 1;
  const inputs = ownStates + n + estimates;
  if (observer) put(loop.c, order, error.seen, n, error.order, ownStates + n, n);
  put(loop.c, order, fromState, m, n, inputs, 0);
  put(loop.c, order, fromError, m, error.order, inputs, n);
  put(loop.d, columns, flatProduct(j, atInput, commanded, m, columns), commanded, columns, 0, 0);
  put(loop.d, columns, flatProduct(d, atInput, outputs, m, columns), outputs, columns, commanded, 0);
  if (observer) put(loop.d, columns, error.misled, n, m, ownStates + n, references);
  put(loop.d, columns, f, m, references, inputs, 0);
  put(loop.d, columns, fromDisturbance, m, m, inputs, references);
  for (const part of Object.values(loop)) requireRepresentable("closed loop", part);
  return {
    ...loop,
    lost: lostDigits(plant, given, gain, observer, loop.a, order),
    order,
    signals,
    columns,
    references,
    disturbances: m,
    counts,
    startFrom: (x0) => Float64Array.from([...x0, ...flatProduct(error.start, Float64Array.from(x0), error.order, n, 1)]),
  };
}

/** Digits lost in A - BK, A - LC and BK; a reduced-order observer brings its own matrices. */
function lostDigits(
  { A, B, C }: LoopPlant,
  { a, b, c }: Entries,
  gain: Float64Array,
  observer: ObserverInLoop | null,
  closed: Float64Array,
  order: number,
): Float64Array {
  const n = A.rows;
  const m = B.columns;
  const lost = workArray(order * order);
  if (n === 0) return lost;
  const shape = { rows: n, inner: m, columns: n };
  put(lost, order, lostInDifference(a, b, gain, cut(closed, order, 0, 0, n), shape), n, n, 0, 0);
  if (observer?.kind !== "full") return lost;
  const given = gain.map((entry) => -entry);
  put(lost, order, lostInDifference(workArray(n * n), b, given, cut(closed, order, 0, n, n), shape), n, n, 0, n);
  const error = cut(closed, order, n, n, n);
  put(lost, order, lostInDifference(a, toFlat(observer.L), c, error, { ...shape, inner: C.rows }), n, n, n, n);
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

function observerError(plant: LoopPlant, { a, b, c }: Entries, observer: ObserverInLoop | null): ObserverError {
  const n = plant.A.rows;
  const m = plant.B.columns;
  const p = plant.C.rows;
  if (observer?.kind === "reduced") return reducedError(plant, observer);
  const misled = workArray(n * m);
  const none = workArray(0);
  if (observer === null) return { order: 0, self: none, disturbed: none, seen: none, misled, start: none };
  // o = x - xhat: o' = (A - L C) o + (B - L D) d
  requireShape("L", observer.L, n, p);
  const l = toFlat(observer.L);
  const start = flatIdentity(n);
  return {
    order: n,
    self: difference(a, flatProduct(l, c, n, p, n)),
    disturbed: difference(b, flatProduct(l, toFlat(plant.D), n, p, m)),
    seen: start.map((entry) => -entry),
    misled,
    start,
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
  return {
    order: Fw.rows,
    self: toFlat(Fw),
    disturbed: toFlat(Matrix.sub(FyD, TB)),
    seen: toFlat(Gw),
    misled: toFlat(Gy.mmul(D)),
    start: toFlat(Matrix.mul(T, -1)),
  };
}

/** Both sides of an identity agree to half the digits of the products they are made of. */
function requireEqual(left: Matrix, right: Matrix, ...products: readonly (readonly [Matrix, Matrix])[]): void {
  const bound = Math.sqrt(Number.EPSILON);
  const size = products.reduce((sum, [a, b]) => sum + frobeniusNorm(a) * frobeniusNorm(b), 1);
  const residual = frobeniusNorm(Matrix.sub(left, right)) / size;
  if (!(residual <= bound)) throw new NumericalError("inaccurate", { residual, bound });
}

function sum(x: Float64Array, y: Float64Array): Float64Array {
  const total = workCopy(x);
  for (let at = 0; at < total.length; at++) total[at] += y[at];
  return total;
}

function difference(x: Float64Array, y: Float64Array): Float64Array {
  const rest = workCopy(x);
  for (let at = 0; at < rest.length; at++) rest[at] -= y[at];
  return rest;
}

/** Puts a block of rows×width into a whole of so many columns, from a row and a column on. */
function put(
  whole: Float64Array,
  columns: number,
  block: Float64Array,
  rows: number,
  width: number,
  row: number,
  column: number,
): void {
  for (let i = 0, from = 0; i < rows; i++)
    for (let to = (row + i) * columns + column, end = to + width; to < end; to++) whole[to] = block[from++];
}

/** The n×n block of a square whole from a row and a column on. */
function cut(whole: Float64Array, order: number, row: number, column: number, n: number): Float64Array {
  const block = workArray(n * n);
  for (let i = 0, to = 0; i < n; i++)
    for (let from = (row + i) * order + column, end = from + n; from < end; from++) block[to++] = whole[from];
  return block;
}
