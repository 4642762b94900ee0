const CAUSES = 6;
const FRAMES = 12;

/**
 * What the log keeps of an unexpected error: the innermost cause, its code and where it arose. Outer messages are left out,
 * because the query layer puts statements with all their values into them.
 */
export function describeFault(error: unknown): Record<string, unknown> {
  let inner = error;
  for (let depth = 0; depth < CAUSES && inner instanceof Error && inner.cause instanceof Error; depth++) inner = inner.cause;
  if (!(inner instanceof Error)) return { name: typeof inner };
  const frames = (inner.stack ?? "").split("\n").filter((line) => line.startsWith("    at "));
  return {
    name: inner.name,
    ...("code" in inner && typeof inner.code === "string" && { code: inner.code }),
    message: inner.message,
    stack: frames.slice(0, FRAMES).map((line) => line.trim()),
  };
}
