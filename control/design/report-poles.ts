import { Matrix } from "ml-matrix";
import type { ComplexMatrix } from "../linalg/complex";
import { type Eigensystem, eigensystem } from "../linalg/eigensystem";
import { toFlat } from "../linalg/flat";
import { singularValues } from "../linalg/singular-values";
import type { Complex, TimeBase } from "../plant/model";
import { poleFigures, stabilityMargin } from "../structure/continuous-pole";
import { eigenvalueAccuracy } from "../structure/eigenvalue-accuracy";
import { participation } from "../structure/modes";
import type { PoleReport } from "./evidence";

/**
 * Poles of a loop or of an estimation error, slowest first, a pair once, each with the state that takes most part in it.
 *
 * Shapes    dynamics n×n; scale n, the states' largest acceptable deviations
 * Units     rad/s and s, of the equivalent continuous pole when sampled
 * Throws    not-finite; no-convergence; too-large
 * Accuracy  figures below the accuracy of the eigenvalue count as zero
 * Source    participation: Perez-Arriaga, Verghese & Schweppe, IEEE Trans. Power Apparatus and Systems 101 (1982) 3117-3125
 */
export function reportPoles(dynamics: Matrix, timeBase: TimeBase, scale: Float64Array): PoleReport[] {
  const scaled = dynamics.clone();
  for (let i = 0; i < scaled.rows; i++) {
    for (let j = 0; j < scaled.columns; j++) scaled.set(i, j, (dynamics.get(i, j) * scale[j]) / scale[i]);
  }
  const spectrum = eigensystem(scaled);
  const accuracy = eigenvalueAccuracy(toFlat(scaled), scaled.rows, spectrum);
  const reports = spectrum.values.flatMap((pole, k) => {
    if (pole.im < 0) return [];
    const shares = participation(spectrum, k);
    return [{ pole, ...poleFigures(pole, timeBase, accuracy[k]), mainState: shares.indexOf(Math.max(...shares)) }];
  });
  return slowestFirst(reports, timeBase);
}

/** The same for the poles of a reduced-order observer, whose states are none of the plant's. */
export function reportPlainPoles(poles: readonly Complex[], timeBase: TimeBase): PoleReport[] {
  const reports = poles.filter(({ im }) => im >= 0).map((pole) => ({ pole, ...poleFigures(pole, timeBase), mainState: null }));
  return slowestFirst(reports, timeBase);
}

function slowestFirst(reports: PoleReport[], timeBase: TimeBase): PoleReport[] {
  return reports.sort((a, b) => stabilityMargin(a.pole, timeBase) - stabilityMargin(b.pole, timeBase) || a.pole.im - b.pole.im);
}

/**
 * Condition of the unit eigenvectors of a matrix in the 2-norm, null when they do not span the space.
 * A complex pair v, conj v has the singular values of the real columns √2 Re v, √2 Im v.
 */
export function eigenvectorCondition({ values, right }: Omit<Eigensystem, "left">): number | null {
  const n = values.length;
  const sizes = singularValues(realForm(values, right, n));
  const condition = sizes[0] / sizes[n - 1];
  return condition * n * Number.EPSILON < 1 ? condition : null;
}

function realForm(values: readonly Complex[], right: ComplexMatrix, n: number): Matrix {
  const X = Matrix.zeros(n, n);
  values.forEach(({ im }, k) => {
    for (let i = 0; i < n; i++)
      X.set(i, k, im === 0 ? right.re.get(i, k) : Math.SQRT2 * (im > 0 ? right.re.get(i, k) : right.im.get(i, k)));
  });
  return X;
}
