import { NumericalError } from "../errors";

/** Throws too-large { what, limit } when a result ran out of the range of numbers. */
export function requireRepresentable(what: string, values: ArrayLike<number>): void {
  for (let i = 0; i < values.length; i++)
    if (!Number.isFinite(values[i])) throw new NumericalError("too-large", { what, limit: Number.MAX_VALUE });
}
