import { flatTranspose } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import { compressRows } from "./compress-rows";
import { type Reflection, reflectColumns, reflectRows } from "./reflections";

/** Row-major arrays: a n×n, b n×m, c p×n, d p×m. */
export type FlatSystem = {
  readonly n: number;
  readonly m: number;
  readonly p: number;
  readonly a: Float64Array;
  readonly b: Float64Array;
  readonly c: Float64Array;
  readonly d: Float64Array;
};

/**
 * A smaller system with the same finite zeros and a square, invertible feed-through.
 *
 * Shapes    n states, m inputs, p outputs → ν ≤ n states, r ≤ min(m, p) inputs and outputs
 * Accuracy  exact for a system within the tolerance 4 (n + m + p) ε ‖[A B; C D]‖; at most n stages each way
 * Source    Emami-Naeini & Van Dooren, Automatica 18 (1982) 415-430
 */
export function reduceSystem(system: FlatSystem): FlatSystem {
  const { n, m, p, a, b, c, d } = system;
  const tolerance = 4 * (n + m + p) * Number.EPSILON * flatNorm([a, b, c, d].map(flatNorm));
  return transposed(reduceOutputs(transposed(reduceOutputs(system, tolerance)), tolerance));
}

/** Takes away what keeps D from having full row rank: rows without effect, and states tied by outputs that no input enters. */
function reduceOutputs(given: FlatSystem, tolerance: number): FlatSystem {
  let system = given;
  for (let stage = 0; stage <= given.n; stage++) {
    const { n, m, p } = system;
    const c = system.c.slice();
    const d = system.d.slice();
    const direct = compressRows(d, p, m, tolerance, 0);
    for (const reflection of direct.reflections) {
      reflectRows(c, n, reflection);
      reflectRows(d, m, reflection);
    }
    const kept = direct.rank;
    if (kept === p) return system;
    const idle = flatTranspose(c.slice(kept * n), p - kept, n);
    const tied = compressRows(idle, n, p - kept, tolerance, 0);
    const top = { ...system, p: kept, c: c.slice(0, kept * n), d: d.slice(0, kept * m) };
    if (tied.rank === 0) return top;
    system = eliminateStates(top, tied.reflections, tied.rank);
  }
  return system;
}

/** States turned so that the first `rank` of them are held at zero by outputs; their equations become outputs of the rest. */
function eliminateStates(system: FlatSystem, reflections: readonly Reflection[], rank: number): FlatSystem {
  const { n, m, p } = system;
  const a = system.a.slice();
  const b = system.b.slice();
  const c = system.c.slice();
  for (const reflection of reflections) {
    reflectRows(a, n, reflection);
    reflectColumns(a, n, reflection);
    reflectRows(b, m, reflection);
    reflectColumns(c, n, reflection);
  }
  const rest = n - rank;
  return {
    n: rest,
    m,
    p: p + rank,
    a: block(a, n, rank, n, rank, n),
    b: b.slice(rank * m),
    c: stacked(block(c, n, 0, p, rank, n), block(a, n, 0, rank, rank, n)),
    d: stacked(system.d, b.slice(0, rank * m)),
  };
}

function transposed({ n, m, p, a, b, c, d }: FlatSystem): FlatSystem {
  return {
    n,
    m: p,
    p: m,
    a: flatTranspose(a, n, n),
    b: flatTranspose(c, p, n),
    c: flatTranspose(b, n, m),
    d: flatTranspose(d, p, m),
  };
}

function block(x: Float64Array, columns: number, top: number, bottom: number, left: number, right: number): Float64Array {
  const part = new Float64Array((bottom - top) * (right - left));
  for (let i = top; i < bottom; i++) part.set(x.subarray(i * columns + left, i * columns + right), (i - top) * (right - left));
  return part;
}

function stacked(upper: Float64Array, lower: Float64Array): Float64Array {
  const whole = new Float64Array(upper.length + lower.length);
  whole.set(upper);
  whole.set(lower, upper.length);
  return whole;
}
