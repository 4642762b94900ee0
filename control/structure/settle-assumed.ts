import type { Matrix } from "ml-matrix";
import { modulus } from "../linalg/complex";
import { eigenvalues } from "../linalg/eigenvalues";
import { fromFlat, largestEntry, toFlat } from "../linalg/flat";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import type { ScaledPlant, System } from "../plant/scale-plant";
import { balanceStates } from "./balance-states";

const MOST_ROUNDS = 40;

/**
 * The scaled plant with units of its own for signals that have no declared deviation, where 1 would say more about the
 * unit they were typed in than about the machine: states are balanced against those they act on, inputs brought to the
 * size of A, outputs to the size of 1. What is declared stays.
 *
 * Shapes    as the scaled plant
 * Throws    no-convergence
 * Accuracy  exact but for underflow, powers of two only; at most 40 rounds
 * Source    Parlett & Reinsch, Numer. Math. 13 (1969) 293-304
 */
export function settleAssumed(plant: ScaledPlant): System {
  const n = plant.A.rows;
  const a = toFlat(plant.A);
  const scale = new Float64Array(n).fill(1);
  const fastest = eigenvalues(plant.A).reduce((size, pole) => Math.max(size, modulus(pole)), 0);
  const lost = 64 * n * Number.EPSILON * fastest * fastest;
  for (let round = 0; round < MOST_ROUNDS && balanceStates(a, n, scale, lost, plant.assumedStates); round++);
  const B = plant.B.clone();
  const C = plant.C.clone();
  const D = plant.D.clone();
  for (let i = 0; i < n; i++) {
    if (scale[i] === 1) continue;
    B.mulRow(i, 1 / scale[i]);
    C.mulColumn(i, scale[i]);
  }
  for (const j of plant.assumedInputs) {
    const factor = toSize(largestEntry(B.getColumn(j)), largestEntry(a));
    B.mulColumn(j, factor);
    D.mulColumn(j, factor);
  }
  for (const k of plant.assumedOutputs) {
    const factor = toSize(largestEntry(C.getRow(k)), 1);
    C.mulRow(k, factor);
    D.mulRow(k, factor);
  }
  const settled = { A: fromFlat(a, n, n), B, C, D };
  return Object.values(settled).every(allFinite) ? settled : plant;
}

/** The power of two that brings a size near another; 1 where there is nothing to bring. */
function toSize(size: number, wanted: number): number {
  return size === 0 || wanted === 0 ? 1 : powerOfTwo(exponentOf(wanted) - exponentOf(size));
}

function allFinite(M: Matrix): boolean {
  return M.to1DArray().every(Number.isFinite);
}
