import { Matrix } from "ml-matrix";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import { requireRepresentable } from "../linalg/require-representable";
import type { System } from "../plant/scale-plant";
import type { ObserverInLoop } from "../response/close-loop";
import { inverse } from "./closed-sensitivity";

/** Where the loop is cut open: at what the actuators do, or at what the sensors say. */
export type LoopCut = "inputs" | "outputs";

/**
 * The loop L cut open, with the sign that makes the closed loop (I + L)⁻¹: what enters at the cut comes back as -L times it.
 * The controller knows what it commands, not what the actuators make of it.
 *
 * At the inputs L is m×m. At the outputs it is p×p with an observer; without one the states themselves are measured: n×n.
 * States of L: the plant's, and behind them the error of a full observer or the state of a reduced one.
 *
 * Shapes    A n×n, B n×m, C p×n, D p×m, K m×n, observer as `closeLoop` takes it → square system
 * Units     the cut signals'
 * Throws    shape-mismatch; not-finite; too-large; singular when a reduced observer's feed-through leaves no command
 * Accuracy  a few roundings per entry; written in the error of a full observer, so that closing the loop leaves the observer's
 *           poles in a block of their own
 * Source    Doyle & Stein, IEEE Trans. Autom. Control 24 (1979) 607-611, for the two places of the cut
 */
export function openLoop(plant: System, K: Matrix, observer: ObserverInLoop | null, cut: LoopCut): System {
  const { A, B, C, D } = plant;
  requireSquare("A", A);
  requireShape("B", B, A.rows, B.columns);
  requireShape("C", C, C.rows, A.rows);
  requireShape("D", D, C.rows, B.columns);
  requireShape("K", K, B.columns, A.rows);
  for (const [name, M] of Object.entries({ A, B, C, D, K })) requireFinite(name, M);
  const loop = openedLoop(plant, K, observer, cut);
  for (const M of Object.values(loop)) requireRepresentable("closed loop", M.to1DArray());
  return loop;
}

function openedLoop(plant: System, K: Matrix, observer: ObserverInLoop | null, cut: LoopCut): System {
  if (observer === null) return stateFeedback(plant, K, cut);
  return observer.kind === "full" ? withFull(plant, K, observer.L, cut) : withReduced(plant, K, observer, cut);
}

function stateFeedback({ A, B }: System, K: Matrix, cut: LoopCut): System {
  const [n, m] = [A.rows, B.columns];
  return cut === "inputs" ? { A, B, C: K, D: Matrix.zeros(m, m) } : { A, B: B.mmul(K), C: Matrix.eye(n), D: Matrix.zeros(n, n) };
}

/** o = x - xhat, u = -K (x - o). */
function withFull({ A, B, C, D }: System, K: Matrix, L: Matrix, cut: LoopCut): System {
  requireShape("L", L, A.rows, C.rows);
  requireFinite("L", L);
  const [n, m, p] = [A.rows, B.columns, C.rows];
  const error = Matrix.sub(A, L.mmul(C));
  const misled = Matrix.sub(B, L.mmul(D));
  if (cut === "inputs") {
    const fed = misled.mmul(K);
    return {
      A: blocks([
        [A, Matrix.zeros(n, n)],
        [fed, Matrix.sub(error, fed)],
      ]),
      B: blocks([[B], [misled]]),
      C: blocks([[K, Matrix.mul(K, -1)]]),
      D: Matrix.zeros(m, m),
    };
  }
  const BK = B.mmul(K);
  const DK = D.mmul(K);
  const seen = Matrix.sub(C, DK);
  return {
    A: blocks([
      [Matrix.sub(A, BK), BK],
      [L.mmul(seen), Matrix.add(error, L.mmul(DK))],
    ]),
    B: blocks([[Matrix.zeros(n, p)], [Matrix.mul(L, -1)]]),
    C: blocks([[Matrix.mul(seen, -1), Matrix.mul(DK, -1)]]),
    D: Matrix.zeros(p, p),
  };
}

/** u = -K (Gw w + Gy (y - D u)), so u = -N K (Gw w + Gy y) with N = (I - K Gy D)⁻¹. */
function withReduced(
  { A, B, C, D }: System,
  K: Matrix,
  { Fw, Fy, Fu, Gw, Gy }: Extract<ObserverInLoop, { kind: "reduced" }>,
  cut: LoopCut,
): System {
  const [n, m, p, r] = [A.rows, B.columns, C.rows, Fw.rows];
  requireShape("Fw", Fw, r, r);
  requireShape("Fy", Fy, r, p);
  requireShape("Fu", Fu, r, m);
  requireShape("Gw", Gw, n, r);
  requireShape("Gy", Gy, n, p);
  for (const [name, M] of Object.entries({ Fw, Fy, Fu, Gw, Gy })) requireFinite(name, M);
  const KGy = K.mmul(Gy);
  const N = inverse(Matrix.sub(Matrix.eye(m), KGy.mmul(D)), "I - K Gy D");
  const fromState = N.mmul(K.mmul(Gw)); // u = -fromState w - fromOutput y
  const fromOutput = N.mmul(KGy);
  const inner = Matrix.sub(Fw, Fu.mmul(fromState));
  const taken = Matrix.sub(Fy, Fu.mmul(fromOutput));
  if (cut === "inputs") {
    return {
      A: blocks([
        [A, Matrix.zeros(n, r)],
        [taken.mmul(C), inner],
      ]),
      B: blocks([[B], [taken.mmul(D)]]),
      C: blocks([[fromOutput.mmul(C), fromState]]),
      D: fromOutput.mmul(D),
    };
  }
  return {
    A: blocks([
      [A, Matrix.mul(B.mmul(fromState), -1)],
      [Matrix.zeros(r, n), inner],
    ]),
    B: blocks([[Matrix.mul(B.mmul(fromOutput), -1)], [taken]]),
    C: blocks([[Matrix.mul(C, -1), D.mmul(fromState)]]),
    D: D.mmul(fromOutput),
  };
}

/** Blocks of matching sizes, row after row. */
export function blocks(rows: readonly (readonly Matrix[])[]): Matrix {
  const height = rows.reduce((sum, row) => sum + row[0].rows, 0);
  const width = rows[0].reduce((sum, block) => sum + block.columns, 0);
  const whole = Matrix.zeros(height, width);
  let top = 0;
  for (const row of rows) {
    let left = 0;
    for (const block of row) {
      for (let i = 0; i < block.rows; i++) for (let j = 0; j < block.columns; j++) whole.set(top + i, left + j, block.get(i, j));
      left += block.columns;
    }
    top += row[0].rows;
  }
  return whole;
}
