/** Ends a command with a message for the person at the terminal, without a stack. */
export class Stop extends Error {
  /** @param {string[]} lines */
  constructor(...lines) {
    super(lines.join("\n"));
    this.name = "Stop";
  }
}

/**
 * Prints what went wrong: the plain message of a `Stop`, the stack of anything unforeseen.
 * @param {unknown} error
 */
export function explain(error) {
  console.error(error instanceof Stop ? error.message : error);
}

/** The code of a system or database error. @param {unknown} error */
export const codeOf = (error) => (error instanceof Error && "code" in error ? error.code : undefined);
