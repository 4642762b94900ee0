import "server-only";
/** A session ends 24 hours after its last use, and 14 days after its start in any case. */
export const SESSION_SECONDS = { idle: 24 * 3600, absolute: 14 * 24 * 3600 } as const;
