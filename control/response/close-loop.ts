import { Matrix } from "ml-matrix";
import { requireShape } from "../linalg/require";

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
 * The plant's state comes first in s; behind it the estimation error x - xhat (full order) or the observer's own state (reduced).
 */
export type ClosedLoop = {
  readonly A: Matrix;
  readonly B: Matrix;
  readonly C: Matrix;
  readonly D: Matrix;
  readonly references: number;
  readonly disturbances: number;
  readonly counts: SignalCounts;
  /** Start of s for a start of the plant's state with the observer's state (full order: the estimate) at zero. */
  readonly startFrom: (x0: readonly number[]) => Float64Array;
};

/** u = onPlant x + onObserver o + F r + onDisturbance d; o' = observerPlant x + observerSelf o + observerInput [r; d]. */
type Law = {
  readonly onPlant: Matrix;
  readonly onObserver: Matrix;
  readonly onDisturbance: Matrix;
  readonly observerPlant: Matrix;
  readonly observerSelf: Matrix;
  readonly observerInput: Matrix;
  /** xhat = estimatePlant x + estimateObserver o + estimateDisturbance d; no rows without an observer */
  readonly estimatePlant: Matrix;
  readonly estimateObserver: Matrix;
  readonly estimateDisturbance: Matrix;
};

/**
 * Closes the loop u = -K x + F r, or u = -K xhat + F r with an observer; a disturbance d adds to u at the plant's input and
 * is unknown to the observer. The recorded inputs are what the controller commands, without d.
 *
 * Shapes    n states, m inputs, p outputs, q commanded: K m×n, F m×q or null (then no references), signals q + p + n + (n) + m
 * Units     as the plant's
 * Throws    shape-mismatch
 * Accuracy  a few roundings per entry. The full-order observer is written in its estimation error, so that its poles and the
 *           regulator's stand in separate blocks; continuous and sampled alike
 * Source    Luenberger, IEEE Trans. Automatic Control 16 (1971) 596-602
 */
export function closeLoop(plant: LoopPlant, K: Matrix, F: Matrix | null, observer: ObserverInLoop | null): ClosedLoop {
  const { A, B, C, D, H, J } = plant;
  const n = A.rows;
  const m = B.columns;
  requireShape("K", K, m, n);
  const references = F ? H.rows : 0;
  const feed = F ?? Matrix.zeros(m, 0);
  requireShape("F", feed, m, references);
  const law =
    observer === null
      ? stateLaw(K, references)
      : observer.kind === "full"
        ? fullLaw(plant, K, observer.L, references)
        : reducedLaw(plant, K, feed, observer);
  const order = law.observerSelf.rows;
  const onInput = beside(feed, Matrix.add(Matrix.eye(m), law.onDisturbance)); // of the plant's input u + d
  const zeroReferences = (rows: number) => Matrix.zeros(rows, references);
  const through = (onState: Matrix, onU: Matrix) => beside(Matrix.add(onState, onU.mmul(law.onPlant)), onU.mmul(law.onObserver));
  const dynamic = stack([through(A, B), beside(law.observerPlant, law.observerSelf)]);
  const signals = stack([
    through(H, J),
    through(C, D),
    beside(Matrix.eye(n), Matrix.zeros(n, order)),
    beside(law.estimatePlant, law.estimateObserver),
    beside(law.onPlant, law.onObserver),
  ]);
  const direct = stack([
    J.mmul(onInput),
    D.mmul(onInput),
    Matrix.zeros(n, references + m),
    beside(zeroReferences(law.estimateDisturbance.rows), law.estimateDisturbance),
    beside(feed, law.onDisturbance),
  ]);
  const startError = observer?.kind === "full";
  return {
    A: dynamic,
    B: stack([B.mmul(onInput), law.observerInput]),
    C: signals,
    D: direct,
    references,
    disturbances: m,
    counts: { commanded: H.rows, outputs: C.rows, states: n, estimates: law.estimatePlant.rows, inputs: m },
    startFrom: (x0) => Float64Array.from({ length: n + order }, (_, i) => (i < n ? x0[i] : startError ? x0[i - n] : 0)),
  };
}

function stateLaw(K: Matrix, references: number): Law {
  const m = K.rows;
  const n = K.columns;
  return {
    onPlant: Matrix.mul(K, -1),
    onObserver: Matrix.zeros(m, 0),
    onDisturbance: Matrix.zeros(m, m),
    observerPlant: Matrix.zeros(0, n),
    observerSelf: Matrix.zeros(0, 0),
    observerInput: Matrix.zeros(0, references + m),
    estimatePlant: Matrix.zeros(0, n),
    estimateObserver: Matrix.zeros(0, 0),
    estimateDisturbance: Matrix.zeros(0, m),
  };
}

/** o = x - xhat: o' = (A - L C) o + (B - L D) d. */
function fullLaw({ A, B, C, D }: LoopPlant, K: Matrix, L: Matrix, references: number): Law {
  const n = A.rows;
  const m = B.columns;
  requireShape("L", L, n, C.rows);
  return {
    onPlant: Matrix.mul(K, -1),
    onObserver: K,
    onDisturbance: Matrix.zeros(m, m),
    observerPlant: Matrix.zeros(n, n),
    observerSelf: Matrix.sub(A, L.mmul(C)),
    observerInput: beside(Matrix.zeros(n, references), Matrix.sub(B, L.mmul(D))),
    estimatePlant: Matrix.eye(n),
    estimateObserver: Matrix.mul(Matrix.eye(n), -1),
    estimateDisturbance: Matrix.zeros(n, m),
  };
}

/** o = w: w' = Fw w + Fy y + Fu u, xhat = Gw w + Gy (y - D u), with y - D u = C x + D d. */
function reducedLaw({ C, D }: LoopPlant, K: Matrix, feed: Matrix, observer: Extract<ObserverInLoop, { kind: "reduced" }>): Law {
  const { Fw, Fy, Fu, Gw, Gy } = observer;
  const onPlant = Matrix.mul(K.mmul(Gy).mmul(C), -1);
  const onObserver = Matrix.mul(K.mmul(Gw), -1);
  const onDisturbance = Matrix.mul(K.mmul(Gy).mmul(D), -1);
  const fromInput = Matrix.add(Fu, Fy.mmul(D));
  return {
    onPlant,
    onObserver,
    onDisturbance,
    observerPlant: Matrix.add(Fy.mmul(C), fromInput.mmul(onPlant)),
    observerSelf: Matrix.add(Fw, fromInput.mmul(onObserver)),
    observerInput: beside(fromInput.mmul(feed), Matrix.add(Fy.mmul(D), fromInput.mmul(onDisturbance))),
    estimatePlant: Gy.mmul(C),
    estimateObserver: Gw,
    estimateDisturbance: Gy.mmul(D),
  };
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
