import type { Complex } from "../plant/model";
import { compressRows } from "./compress-rows";
import { pencilEigenvalues } from "./pencil-eigenvalues";
import type { FlatSystem } from "./reduce-system";
import { reflectColumns } from "./reflections";

/**
 * Zeros of a reduced system, whose feed-through is invertible: with the outputs held at zero what is left is a pencil of the
 * size of the states.
 *
 * Shapes    n states, m inputs, m outputs → at most n values, conjugate pairs exactly conjugate
 * Throws    no-convergence
 * Accuracy  exact for a system within c (n + m) ε of the given one
 * Source    Emami-Naeini & Van Dooren, Automatica 18 (1982) 415-430
 */
export function reducedZeros({ n, m, a, b, c, d }: FlatSystem): Complex[] {
  if (n === 0) return [];
  const width = n + m;
  const held = new Float64Array(width * m);
  for (let k = 0; k < m; k++) {
    for (let j = 0; j < n; j++) held[j * m + k] = c[k * n + j];
    for (let j = 0; j < m; j++) held[(n + j) * m + k] = d[k * m + j];
  }
  const system = new Float64Array(n * width);
  const unit = new Float64Array(n * width);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) system[i * width + j] = a[i * n + j];
    for (let j = 0; j < m; j++) system[i * width + n + j] = b[i * m + j];
    unit[i * width + i] = 1;
  }
  for (const reflection of compressRows(held, width, m, -1, 0).reflections) {
    reflectColumns(system, width, reflection);
    reflectColumns(unit, width, reflection);
  }
  const last = (x: Float64Array) => {
    const part = new Float64Array(n * n);
    for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) part[i * n + j] = x[i * width + m + j];
    return part;
  };
  return pencilEigenvalues(last(system), last(unit), n);
}
