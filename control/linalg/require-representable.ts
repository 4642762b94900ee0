import { NumericalError } from "../errors";

/** Throws too-large { what, limit } when a result ran out of the range of numbers. */
export function requireRepresentable(what: string, values: readonly number[]): void {
  if (!values.every(Number.isFinite)) throw new NumericalError("too-large", { what, limit: Number.MAX_VALUE });
}
