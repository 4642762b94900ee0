import { createHash } from "node:crypto";
import { chmodSync, mkdirSync, realpathSync } from "node:fs";
import { basename, join } from "node:path";
import { fileURLToPath } from "node:url";

export const root = realpathSync(fileURLToPath(new URL("../..", import.meta.url)));
const forRoot = "/var/lib/gainwright";
export const isRoot = process.getuid?.() === 0;

/**
 * Where data and secrets of one checkout live; made when missing. PostgreSQL refuses to run as root and its account cannot enter root's
 * folders, so root's data lies outside the checkout.
 * @param {"start" | "dev"} use
 */
export function stateFolder(use) {
  const chosen = process.env.GAINWRIGHT_STATE;
  const own = createHash("sha256").update(root).digest("hex").slice(0, 8);
  const base = chosen ?? (isRoot ? join(forRoot, `${basename(root)}-${own}`) : join(root, ".data"));
  const folder = use === "start" ? base : join(base, use);
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  // PostgreSQL's account has to pass through; the files beside its folder stay closed to it.
  if (isRoot) for (const passed of new Set([...(chosen ? [] : [forRoot]), base, folder])) chmodSync(passed, 0o711);
  return folder;
}

/** @param {string} name a program that an installed package brings @param {string} path its script inside node_modules */
export const script = (name, path) => join(root, "node_modules", name, path);
