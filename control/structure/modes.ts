import type { Matrix } from "ml-matrix";
import { type Eigensystem, eigensystem } from "../linalg/eigensystem";
import { toFlat } from "../linalg/flat";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import type { TimeBase } from "../plant/model";
import type { ModeReport } from "../plant/report";
import type { System } from "../plant/scale-plant";
import { poleFigures, stabilityMargin } from "./continuous-pole";
import { eigenvalueAccuracy } from "./eigenvalue-accuracy";
import { reachOfInputs, sightOfOutputs } from "./plant-reach";
import type { ReachAnalysis } from "./reach-analysis";

/**
 * Modes of a scaled plant, least stable first: frequency, damping, who takes part, who reaches and who sees each of them.
 *
 * Shapes    A n×n, B n×m, C p×n → at most n modes; a conjugate pair is one mode
 * Units     rad/s and s; shares and distances have none
 * Throws    shape-mismatch; not-finite; no-convergence
 * Accuracy  `marginal` is judged within the accuracy of each eigenvalue; distances within n ε
 * Source    Hamdan & Nayfeh, J. Guidance 12 (1989) 421-428, for the measures; Perez-Arriaga, Verghese & Schweppe,
 *           IEEE Trans. Power Apparatus and Systems 101 (1982) 3117-3125, for participation
 */
export function modes(plant: Omit<System, "D">, timeBase: TimeBase): ModeReport[] {
  const { A, B, C } = plant;
  requireSquare("A", A);
  requireShape("B", B, A.rows, B.columns);
  requireShape("C", C, C.rows, A.rows);
  for (const [name, M] of Object.entries({ A, B, C })) requireFinite(name, M);
  const spectrum = eigensystem(A);
  const reach = reachOfInputs(plant, spectrum.values);
  const sight = sightOfOutputs(plant, timeBase, spectrum.values);
  return describeModes(plant, timeBase, spectrum, reach, sight);
}

/** The same from parts that are at hand already. */
export function describeModes(
  { A, B, C }: Omit<System, "D">,
  timeBase: TimeBase,
  spectrum: Eigensystem,
  reach: ReachAnalysis,
  sight: ReachAnalysis,
): ModeReport[] {
  const accuracy = eigenvalueAccuracy(toFlat(A), A.rows, spectrum);
  const shown = spectrum.values.flatMap((pole, k) => {
    if (pole.im < 0) return [];
    const margin = stabilityMargin(pole, timeBase);
    const marginal = Math.abs(margin) <= accuracy[k];
    const mode: ModeReport = {
      pole,
      ...poleFigures(pole, timeBase, accuracy[k]),
      stable: margin > 0 && !marginal,
      marginal,
      participation: participation(spectrum, k),
      controlDistance: reach.distances[k],
      observeDistance: sight.distances[k],
      controllable: reach.reached[k],
      observable: sight.reached[k],
      inputShare: shares(spectrum.left, k, B),
      outputShare: shares(spectrum.right, k, C.transpose()),
    };
    return [{ mode, margin }];
  });
  shown.sort((x, y) => x.margin - y.margin || x.mode.pole.im - y.mode.pole.im);
  return shown.map(({ mode }) => mode);
}

/** |w v| per state, of left and right vector; for a defective value, where all of these vanish, the right vector alone. */
export function participation({ right, left }: Eigensystem, k: number): number[] {
  const n = right.re.rows;
  const size = (x: Matrix, y: Matrix, i: number) => Math.sqrt(x.get(i, k) * x.get(i, k) + y.get(i, k) * y.get(i, k));
  const v = Array.from({ length: n }, (_, i) => size(right.re, right.im, i));
  const both = v.map((entry, i) => entry * size(left.re, left.im, i));
  const total = both.reduce((sum, entry) => sum + entry, 0);
  if (total > n * Number.EPSILON) return both.map((entry) => entry / total);
  const squares = v.map((entry) => entry * entry);
  const whole = squares.reduce((sum, entry) => sum + entry, 0);
  return squares.map((entry) => entry / whole);
}

/** Cosine of the angle between a complex unit vector and each column of M; zero for a zero column. */
function shares({ re, im }: { re: Matrix; im: Matrix }, k: number, M: Matrix): number[] {
  return Array.from({ length: M.columns }, (_, j) => {
    let largest = 0;
    for (let i = 0; i < M.rows; i++) largest = Math.max(largest, Math.abs(M.get(i, j)));
    if (largest === 0) return 0;
    let square = 0;
    let real = 0;
    let imaginary = 0;
    for (let i = 0; i < M.rows; i++) {
      const entry = M.get(i, j) / largest;
      square += entry * entry;
      real += entry * re.get(i, k);
      imaginary += entry * im.get(i, k);
    }
    const cosine = Math.sqrt((real * real + imaginary * imaginary) / square);
    return Math.min(cosine, 1);
  });
}
