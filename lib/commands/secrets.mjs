import { randomBytes } from "node:crypto";
import { mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";

const names = /** @type {const} */ (["admin", "owner", "app", "auth"]);
/** @typedef {Record<typeof names[number], string>} Secrets */

/**
 * Passwords of the private database and the secret that signs sessions: made once, readable by this account alone.
 * @param {string} state
 * @returns {Secrets}
 */
export function secrets(state) {
  const file = join(state, "secrets.json");
  mkdirSync(state, { recursive: true, mode: 0o755 });
  try {
    return JSON.parse(readFileSync(file, "utf8"));
  } catch (error) {
    if (!(error instanceof Error && "code" in error && error.code === "ENOENT")) throw error;
  }
  const made = Object.fromEntries(names.map((name) => [name, randomBytes(32).toString("hex")]));
  writeFileSync(file, `${JSON.stringify(made, undefined, 2)}\n`, { mode: 0o600, flag: "wx" });
  return /** @type {Secrets} */ (made);
}
