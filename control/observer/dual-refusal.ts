import { NumericalError, type NumericalErrorCode } from "../errors";

/** What a refusal of the dual regulator problem, A' and C' in place of A and B, means for the observer. */
const DUAL_CODE: Partial<Record<NumericalErrorCode, NumericalErrorCode>> = {
  "not-controllable": "not-observable",
  "not-stabilizable": "not-detectable",
};

const DUAL_MATRIX: Readonly<Record<string, string>> = { B: "C", Q: "process noise", R: "measurement noise" };

/** Runs a computation on the dual plant, with its refusals told in terms of the observer. */
export function inDual<T>(compute: () => T): T {
  try {
    return compute();
  } catch (error) {
    if (!(error instanceof NumericalError)) throw error;
    const matrix = typeof error.data.matrix === "string" ? (DUAL_MATRIX[error.data.matrix] ?? error.data.matrix) : undefined;
    throw new NumericalError(DUAL_CODE[error.code] ?? error.code, matrix === undefined ? error.data : { ...error.data, matrix });
  }
}
