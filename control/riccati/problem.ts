/** A Riccati problem on flat row-major arrays: a n×n, b n×m, q n×n, r m×m, s n×m. */
export type FlatProblem = {
  readonly n: number;
  readonly m: number;
  readonly sampled: boolean;
  readonly a: Float64Array;
  readonly b: Float64Array;
  readonly q: Float64Array;
  readonly r: Float64Array;
  readonly s: Float64Array;
};

/** A rough solution x, or, where only that is known, a stabilising gain. */
export type Start = { readonly x: Float64Array } | { readonly gain: Float64Array };
