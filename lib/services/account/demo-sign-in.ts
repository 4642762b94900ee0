import "server-only";
import { demoAccounts, demoPassword } from "@/lib/commands/demo-accounts.mjs";
import { env } from "@/lib/env";

/** The published accounts, where the demonstration was asked for; null everywhere else. */
export function demoSignIn() {
  if (!env().GAINWRIGHT_DEMO) return null;
  return { accounts: demoAccounts.map(({ email, role }) => ({ email, role })), password: demoPassword };
}
