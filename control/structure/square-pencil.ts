import { addWide, split, type Wide, widen, wideProduct, wideTranspose } from "../linalg/double-double";
import type { FlatSystem } from "./reduce-system";
import { wideByWide } from "./wide-by-wide";

/** [A - s I, B; C, D] with as many inputs as outputs: `matrix` at s = 0, size×size, of which the first n rows and columns hold A. */
export type SquarePencil = { readonly n: number; readonly size: number; readonly matrix: Wide };

/**
 * The system matrix with inputs and outputs mixed down to `rank` of each by small whole numbers, without rounding of its own.
 * It keeps every zero of the given one and, unless that is square already, gains others, which differ between kinds 0 and 1.
 *
 * Shapes    n states, m inputs, p outputs, rank ≤ min(m, p) → n + rank
 * Accuracy  ε² of what is summed
 * Source    Davison, Int. J. Control 37 (1983) 1-25, for the squaring (from memory)
 */
export function squarePencil({ n, m, p, a, b, c, d }: FlatSystem, rank: number, kind: number): SquarePencil {
  const inputs = mixing(m, rank, kind);
  const outputs = mixing(p, rank, kind);
  const size = n + rank;
  const hi = new Float64Array(size * size);
  const lo = new Float64Array(size * size);
  const put = (part: Wide, rows: number, columns: number, top: number, left: number) => {
    for (let i = 0; i < rows; i++) {
      for (let j = 0; j < columns; j++) {
        hi[(top + i) * size + left + j] = part.hi[i * columns + j];
        lo[(top + i) * size + left + j] = part.lo[i * columns + j];
      }
    }
  };
  const fromInputs = (x: Wide, rows: number) =>
    m === rank ? x : wideTranspose(wideProduct(split(inputs), wideTranspose(x, rows, m), rank, m, rows), rank, rows);
  const toOutputs = (x: Wide, columns: number) => (p === rank ? x : wideProduct(split(outputs), x, rank, p, columns));
  put(widen(a), n, n, 0, 0);
  put(fromInputs(widen(b), n), n, rank, 0, n);
  put(toOutputs(widen(c), n), rank, n, n, 0);
  put(toOutputs(fromInputs(widen(d), p), rank), rank, rank, n, n);
  return { n, size, matrix: { hi, lo } };
}

/** rank×from small whole numbers that no plant is made of, in two kinds. */
function mixing(from: number, rank: number, kind: number): Float64Array {
  return Float64Array.from({ length: rank * from }, (_, k) => {
    const i = Math.floor(k / from);
    const j = k % from;
    return kind === 0
      ? ((5 * i * i + 7 * j + 3 * i * j + 2 * j * j + 1) % 13) - 6
      : ((4 * i + 9 * j + 7 * i * j + 6 * j * j + 8) % 17) - 8;
  });
}

/** The same system in doubles. */
export function pencilSystem({ n, size, matrix }: SquarePencil): FlatSystem {
  const rank = size - n;
  const part = (top: number, rows: number, left: number, columns: number) =>
    Float64Array.from(
      { length: rows * columns },
      (_, k) => matrix.hi[(top + Math.floor(k / columns)) * size + left + (k % columns)],
    );
  return { n, m: rank, p: rank, a: part(0, n, 0, n), b: part(0, n, n, rank), c: part(n, rank, 0, n), d: part(n, rank, n, rank) };
}

/** M v - E v s for the pencil, v size×k and s k×k. */
export function pencilResidual({ n, size, matrix }: SquarePencil, v: Wide, s: Wide, k: number): Wide {
  const residual = wideByWide(matrix, v, size, size, k);
  const upper = wideByWide({ hi: v.hi.subarray(0, n * k), lo: v.lo.subarray(0, n * k) }, s, n, k, k);
  addWide({ hi: residual.hi.subarray(0, n * k), lo: residual.lo.subarray(0, n * k) }, upper, -1);
  return residual;
}

export function transposedPencil({ n, size, matrix }: SquarePencil): SquarePencil {
  return { n, size, matrix: wideTranspose(matrix, size, size) };
}
