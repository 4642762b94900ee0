import { NumericalError } from "../errors";
import { flatTranspose } from "../linalg/flat";
import { factorLu, solveLu } from "../linalg/lu";
import { flatSchur } from "../linalg/real-schur";
import { reorderFlat } from "../linalg/reorder-schur";
import { schurValues } from "../linalg/schur-values";
import { workArray } from "../linalg/work-array";
import type { PlainProblem } from "./remove-cross-term";

/**
 * Rough stabilising solution from the stable invariant subspace of the Hamiltonian matrix. A sampled problem is brought
 * there by the Cayley transform of its symplectic pencil, so that a singular A does no harm.
 *
 * Throws    no-convergence when the subspace cannot be split off or is no graph of a matrix
 * Accuracy  ordinarily cond ε; the caller verifies
 * Source    Laub, A Schur method for solving algebraic Riccati equations, IEEE Trans. Autom. Control 24 (1979) 913-921
 */
export function startBySchur(problem: PlainProblem): Float64Array {
  const { n } = problem;
  const size = 2 * n;
  const { t, qt } = flatSchur(hamiltonianMatrix(problem), size);
  const values = schurValues(t, size);
  const limit =
    values.filter((value) => value.re < 0).length === n
      ? 0
      : middleOf(
          values.map((value) => value.re),
          n,
        );
  const selected = reorderFlat(t, qt, size, (value) => value.re < limit);
  if (selected !== n) throw new NumericalError("no-convergence", { routine: "ordered-schur", limit: n });
  const u1 = workArray(n * n);
  const u2 = workArray(n * n);
  for (let k = 0; k < n; k++) {
    for (let i = 0; i < n; i++) {
      u1[i * n + k] = qt[k * size + i];
      u2[i * n + k] = qt[k * size + n + i];
    }
  }
  // X = U2 U1⁻¹, so X' = U1'⁻¹ U2'.
  const factors = factorLu(flatTranspose(u1, n, n), n);
  if (factors.zeroPivot >= 0) throw new NumericalError("no-convergence", { routine: "ordered-schur", limit: n });
  const x = solveLu(factors, flatTranspose(u2, n, n), n);
  for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) x[i * n + j] = x[j * n + i] = 0.5 * (x[i * n + j] + x[j * n + i]);
  if (!x.every(Number.isFinite)) throw new NumericalError("no-convergence", { routine: "ordered-schur", limit: n });
  return x;
}

/** Halfway between the n-th and the next real part, when rounding left a wrong number of them below zero. */
function middleOf(parts: number[], n: number): number {
  const sorted = [...parts].sort((x, y) => x - y);
  return 0.5 * (sorted[n - 1] + sorted[n]);
}

/** Its eigenvalues with negative real part belong to the stable closed loop; the sampled pencil is brought to the same form. */
export function hamiltonianMatrix(problem: PlainProblem): Float64Array {
  return problem.sampled ? cayleyOfPencil(problem) : hamiltonian(problem);
}

/** [A -G; -Q -A'] */
function hamiltonian({ n, a, g, q }: PlainProblem): Float64Array {
  const size = 2 * n;
  const h = workArray(size * size);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      h[i * size + j] = a[i * n + j];
      h[i * size + n + j] = -g[i * n + j];
      h[(n + i) * size + j] = -q[i * n + j];
      h[(n + i) * size + n + j] = -a[j * n + i];
    }
  }
  return h;
}

/** (M + L)⁻¹ (M - L) for M = [A 0; -Q I], L = [I G; 0 A']: eigenvalue z becomes (z - 1) / (z + 1). */
function cayleyOfPencil({ n, a, g, q }: PlainProblem): Float64Array {
  const size = 2 * n;
  const sum = workArray(size * size);
  const difference = workArray(size * size);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const one = i === j ? 1 : 0;
      sum[i * size + j] = a[i * n + j] + one;
      difference[i * size + j] = a[i * n + j] - one;
      sum[i * size + n + j] = g[i * n + j];
      difference[i * size + n + j] = -g[i * n + j];
      sum[(n + i) * size + j] = difference[(n + i) * size + j] = -q[i * n + j];
      sum[(n + i) * size + n + j] = one + a[j * n + i];
      difference[(n + i) * size + n + j] = one - a[j * n + i];
    }
  }
  const factors = factorLu(sum, size);
  if (factors.zeroPivot >= 0) throw new NumericalError("no-convergence", { routine: "ordered-schur", limit: n });
  const h = solveLu(factors, difference, size);
  if (!h.every(Number.isFinite)) throw new NumericalError("no-convergence", { routine: "ordered-schur", limit: n });
  return h;
}
