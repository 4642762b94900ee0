import { Matrix } from "ml-matrix";
import { toFlat } from "@/control/linalg/flat";
import { respondEnsemble } from "@/control/response/ensemble";
import { respondToStep } from "@/control/response/respond-to-step";
import { seededMatrix, seededUniform } from "@/tests/helpers/seeded";
import type { TimedCase } from "./timed-case";

const [STATES, INPUTS, OUTPUTS] = [12, 4, 4];
const SAMPLES = 2_000;
const STEP = 0.01;
const PLANTS = 1_000;
/** Parts by which the entries of the plants of an ensemble differ. */
const SPREAD = 0.1;

function plant() {
  const random = seededUniform(4_242);
  const A = Matrix.sub(seededMatrix(random, STATES, STATES), Matrix.eye(STATES).mul(4));
  return { A, B: seededMatrix(random, STATES, INPUTS), C: seededMatrix(random, OUTPUTS, STATES), random };
}

function stepCase(): TimedCase {
  const { A, B, C } = plant();
  const D = Matrix.zeros(OUTPUTS, INPUTS);
  return {
    name: `step responses, ${STATES} states, ${INPUTS} x ${OUTPUTS} x ${SAMPLES} points`,
    target: 0.02,
    ours: () => respondToStep({ A, B, C, D, step: STEP, samples: SAMPLES }),
    question: {
      ask: "step_responses",
      ...{ A: A.to2DArray(), B: B.to2DArray(), C: C.to2DArray() },
      ...{ step: STEP, samples: SAMPLES },
    },
  };
}

function ensembleCase(): TimedCase {
  const { A, B, C, random } = plant();
  const varied = (M: Matrix) => toFlat(M).map((entry) => entry * (1 + SPREAD * (2 * random() - 1)));
  const plants = Array.from({ length: PLANTS }, () => ({ a: varied(A), b: varied(B), c: new Float64Array(0), h: toFlat(C) }));
  const K = seededMatrix(random, INPUTS, STATES).mul(0.1);
  const F = Matrix.eye(INPUTS);
  return {
    name: `${PLANTS} re-closed loops, ${STATES} states, ${INPUTS * OUTPUTS} channels x ${SAMPLES} points`,
    target: 0.05,
    ours: () => respondEnsemble({ law: { K, F, observer: null }, plants, period: null, step: STEP, samples: SAMPLES }),
    question: {
      ask: "ensemble",
      ...{ C: C.to2DArray(), K: K.to2DArray() },
      ...{ plants: plants.map(({ a, b }) => [Array.from(a), Array.from(b)]), step: STEP, samples: SAMPLES },
    },
  };
}

export const responseCases = (): TimedCase[] => [stepCase(), ensembleCase()];
