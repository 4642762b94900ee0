const TRIES = 4;

/** A driver's error may come wrapped by the query builder: its code is looked for along the causes. */
export function sqlState(error: unknown): string | undefined {
  let current = error;
  for (let depth = 0; depth < 5 && current instanceof Error; depth++) {
    if ("code" in current && typeof current.code === "string") return current.code;
    current = current.cause;
  }
  return undefined;
}

/** The constraint that a statement broke, by its name in the schema. */
export function brokenConstraint(error: unknown): string | undefined {
  let current = error;
  for (let depth = 0; depth < 5 && current instanceof Error; depth++) {
    if ("constraint" in current && typeof current.constraint === "string") return current.constraint;
    current = current.cause;
  }
  return undefined;
}

/** Only a serialization failure and a deadlock are certain to have changed nothing; every other error goes to the caller. */
const isSafeToRepeat = (error: unknown) => ["40001", "40P01"].includes(sqlState(error) ?? "");

export async function withRetries<T>(work: () => Promise<T>): Promise<T> {
  for (let attempt = 1; ; attempt++) {
    try {
      return await work();
    } catch (error) {
      if (attempt >= TRIES || !isSafeToRepeat(error)) throw error;
      await new Promise((resolve) => setTimeout(resolve, Math.random() * 20 * 2 ** attempt));
    }
  }
}
