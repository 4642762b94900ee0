/** Runs once, before the first request. */
export async function register(): Promise<void> {
  if (process.env.NEXT_RUNTIME !== "nodejs") return;
  const { noteClientAddresses } = await import("@/lib/auth/client-address");
  noteClientAddresses();
}
