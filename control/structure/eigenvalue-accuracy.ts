import { balance } from "../linalg/balance";
import type { Eigensystem } from "../linalg/eigensystem";
import { flatNorm } from "../linalg/norms";
import { powerOfTwo } from "../linalg/power-of-two";
import { strongComponents } from "../linalg/strong-components";
import { workArray } from "../linalg/work-array";

/**
 * How far each computed eigenvalue may be from the true one: condition times rounding of the block that it belongs to.
 *
 * Shapes    a n×n row-major with its eigensystem → n distances
 * Units     those of a
 * Accuracy  first order, with the factor 4 n; grows like the root that a defective value takes
 * Source    Wilkinson, The Algebraic Eigenvalue Problem, 1965, chapter 2: condition of an eigenvalue
 */
export function eigenvalueAccuracy(a: Float64Array, n: number, { values, right, left }: Eigensystem): Float64Array {
  const { matrix, order, scale, shift } = balance(a, n);
  const { starts } = strongComponents(a, n);
  const norms = starts.slice(1).map((to, b) => blockNorm(matrix, n, starts[b], to) * powerOfTwo(-shift));
  return Float64Array.from(values, (_, k) => {
    const v = workArray(n);
    const w = workArray(n);
    let re = 0;
    let im = 0;
    for (let i = 0; i < n; i++) {
      const from = order[i];
      const [x, y] = [right.re.get(from, k), right.im.get(from, k)];
      const [p, q] = [left.re.get(from, k), left.im.get(from, k)];
      re += p * x + q * y;
      im += p * y - q * x;
      v[i] = Math.sqrt(x * x + y * y) / scale[i];
      w[i] = Math.sqrt(p * p + q * q) * scale[i];
    }
    const home = homeBlock(v, w, starts);
    const [from, to] = [starts[home], starts[home + 1]];
    const condition = (flatNorm(v.subarray(from, to)) * flatNorm(w.subarray(from, to))) / Math.sqrt(re * re + im * im);
    const norm = norms[home];
    const limited = Math.min(condition, 1 / Number.EPSILON);
    return to - from === 1 ? 2 * Number.EPSILON * norm : 4 * (to - from) * Number.EPSILON * norm * limited;
  });
}

/** The diagonal block that holds most of the mode: the others can not move it. */
function homeBlock(v: Float64Array, w: Float64Array, starts: readonly number[]): number {
  let home = 0;
  let most = -1;
  for (let b = 0; b + 1 < starts.length; b++) {
    let share = 0;
    for (let i = starts[b]; i < starts[b + 1]; i++) share += v[i] * w[i];
    if (share <= most) continue;
    most = share;
    home = b;
  }
  return home;
}

function blockNorm(matrix: Float64Array, n: number, from: number, to: number): number {
  const norms = [];
  for (let i = from; i < to; i++) norms.push(flatNorm(matrix.subarray(i * n + from, i * n + to)));
  return flatNorm(norms);
}
