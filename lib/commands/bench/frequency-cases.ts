import { Matrix } from "ml-matrix";
import { frequencyResponse } from "@/control/margins/frequency-response";
import { seededMatrix, seededUniform } from "@/tests/helpers/seeded";
import type { TimedCase } from "./timed-case";

const [STATES, CHANNELS, POINTS] = [12, 4, 400];

export function frequencyCases(): TimedCase[] {
  const random = seededUniform(611);
  const A = Matrix.sub(seededMatrix(random, STATES, STATES), Matrix.eye(STATES).mul(4));
  const [B, C] = [seededMatrix(random, STATES, CHANNELS), seededMatrix(random, CHANNELS, STATES)];
  const frequencies = Array.from({ length: POINTS }, (_, k) => 10 ** (-2 + (5 * k) / POINTS));
  const system = { A, B, C, D: Matrix.zeros(CHANNELS, CHANNELS) };
  return [
    {
      name: `frequency response, ${STATES} states, ${CHANNELS} x ${CHANNELS} x ${POINTS} points`,
      target: null,
      ours: () => frequencyResponse(system, null, frequencies),
      question: { ask: "frequency_response", A: A.to2DArray(), B: B.to2DArray(), C: C.to2DArray(), frequencies },
    },
  ];
}
