const WELL_FORMED = /^[A-Za-z0-9_-]{8,64}$/;

/** The caller's own id where it is harmless in a log line and a header, else a new one. */
export function requestIdOf(headers: Headers): string {
  const given = headers.get("x-request-id");
  return given && WELL_FORMED.test(given) ? given : crypto.randomUUID();
}
