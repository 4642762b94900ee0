import { randomBytes } from "node:crypto";
import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { codeOf } from "./stop.mjs";

const names = /** @type {const} */ (["admin", "owner", "app", "auth"]);
/** @typedef {Record<typeof names[number], string>} Secrets */

/**
 * Passwords of the private database and the secret that signs sessions: made once, readable by this account alone.
 * @param {string} state
 * @returns {Secrets}
 */
export function secrets(state) {
  const file = join(state, "secrets.json");
  try {
    return JSON.parse(readFileSync(file, "utf8"));
  } catch (error) {
    if (codeOf(error) !== "ENOENT") throw error;
  }
  const made = Object.fromEntries(names.map((name) => [name, randomBytes(32).toString("hex")]));
  writeFileSync(file, `${JSON.stringify(made, undefined, 2)}\n`, { mode: 0o600, flag: "wx" });
  return /** @type {Secrets} */ (made);
}
