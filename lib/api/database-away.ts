/** SQLSTATE of a server that cannot serve just now: connection, resources, shutdown, time limits of ours. */
const AWAY_STATES = /^(08...|53...|57P0[1-5]|57014|25P0[34]|55P03|40001|40P01)$/;
const AWAY_SYSTEM = new Set([
  "ECONNREFUSED",
  "ECONNRESET",
  "ENOTFOUND",
  "EPIPE",
  "ETIMEDOUT",
  "EAI_AGAIN",
  "ENOENT",
  "EHOSTUNREACH",
]);
/** The driver gives these no code. */
const AWAY_WORDS = [
  "Connection terminated",
  "timeout exceeded when trying to connect",
  "Client has encountered a connection error",
  "Cannot use a pool after calling end",
];
const CAUSES = 6;

/** Follows the causes, because the query layer wraps what the driver threw. */
export function isDatabaseAway(error: unknown): boolean {
  let current = error;
  for (let depth = 0; depth < CAUSES && current instanceof Error; depth++) {
    const code = "code" in current && typeof current.code === "string" ? current.code : "";
    if (AWAY_STATES.test(code)) return true;
    if (AWAY_SYSTEM.has(code) && isSocketError(current)) return true;
    const { message } = current;
    if (AWAY_WORDS.some((words) => message.startsWith(words))) return true;
    if (current instanceof AggregateError) return current.errors.some(isDatabaseAway);
    current = current.cause;
  }
  return false;
}

/** A missing file is ENOENT too; only a failed connect, read or write of a socket counts. */
function isSocketError(error: Error): boolean {
  return "syscall" in error && typeof error.syscall === "string" && /^(connect|read|write|getaddrinfo)$/.test(error.syscall);
}
