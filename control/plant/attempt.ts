import { NumericalError } from "../errors";
import type { Part } from "./report";

/** Runs one part of a computation; a refusal of the core becomes its result, anything else is a fault and goes on. */
export function attempt<T>(work: () => T): Part<T> {
  try {
    return { state: "computed", value: work() };
  } catch (error) {
    if (error instanceof NumericalError) return { state: "refused", code: error.code, data: error.data };
    throw error;
  }
}

/** The same for a part that needs another one: refused with that one's reason when it was refused. */
export function attemptAfter<T, U>(part: Part<T>, work: (value: T) => U): Part<U> {
  return part.state === "refused" ? part : attempt(() => work(part.value));
}

/** The same part with something else shown of it. */
export function shown<T, U>(part: Part<T>, of: (value: T) => U): Part<U> {
  return part.state === "refused" ? part : { state: "computed", value: of(part.value) };
}
