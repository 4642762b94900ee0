import { workArray } from "../linalg/work-array";
/** Forms in the coordinates z of a pair's eigenvector: rows a and b (real, then imaginary parts), P Hermitian, R symmetric. */
export type PairForms = {
  readonly size: number;
  readonly a: Float64Array;
  readonly b: Float64Array;
  readonly pRe: Float64Array;
  readonly pIm: Float64Array;
  readonly rRe: Float64Array;
  readonly rIm: Float64Array;
};

/** Room for a descent in k variables. */
export type DescentRoom = {
  readonly x: Float64Array;
  readonly gradient: Float64Array;
  readonly direction: Float64Array;
  readonly trial: Float64Array;
  readonly trialGradient: Float64Array;
  readonly bent: Float64Array;
  /** Inverse of the curvature, k×k. */
  readonly inverse: Float64Array;
};

/** Room for the steps of a search, made once: small arrays made anew at every step would cost more than the steps. */
export type Scratch = {
  readonly u: Float64Array;
  readonly v: Float64Array;
  readonly a: Float64Array;
  readonly b: Float64Array;
  readonly row: Float64Array;
  /** One such row for each state. */
  readonly rows: Float64Array;
  readonly square: Float64Array;
  readonly products: readonly [Float64Array, Float64Array];
  readonly forms: PairForms;
  readonly descent: DescentRoom;
};

/** Room for k variables. */
export function createDescentRoom(k: number): DescentRoom {
  const vector = () => workArray(k);
  return {
    x: vector(),
    gradient: vector(),
    direction: vector(),
    trial: vector(),
    trialGradient: vector(),
    bent: vector(),
    inverse: workArray(k * k),
  };
}

/** Room for n states and admissible spaces of one size. */
export function createScratch(n: number, size: number): Scratch {
  const vector = () => workArray(2 * size);
  const square = () => workArray(size * size);
  return {
    u: workArray(n),
    v: workArray(n),
    a: vector(),
    b: vector(),
    row: vector(),
    rows: workArray(2 * n * size),
    square: square(),
    products: [vector(), vector()],
    forms: { size, a: vector(), b: vector(), pRe: square(), pIm: square(), rRe: square(), rIm: square() },
    descent: createDescentRoom(2 * size),
  };
}
