import type { Instrumentation } from "next";

/** Runs once, before the first request. */
export async function register(): Promise<void> {
  if (process.env.NEXT_RUNTIME !== "nodejs") return;
  const { noteClientAddresses } = await import("@/lib/auth/client-address");
  noteClientAddresses();
}

/** What no page or route caught. Only the route's pattern is told: an address can hold the secret of an invitation. */
export const onRequestError: Instrumentation.onRequestError = async (error, { method }, { routePath, routeType }) => {
  if (process.env.NEXT_RUNTIME !== "nodejs") return;
  const { log } = await import("@/lib/log");
  // The digest is what the error page shows, so a report from a person leads to this line.
  const digest = error instanceof Error && "digest" in error ? error.digest : undefined;
  log.error({ err: error, digest, method, route: routePath, in: routeType }, "a request failed unforeseen");
};
