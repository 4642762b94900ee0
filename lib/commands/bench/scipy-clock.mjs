import { spawn } from "node:child_process";
import { join } from "node:path";
import { createInterface } from "node:readline";
import { root } from "../paths.mjs";
import { findScipy, oneThread } from "../reference/scipy.mjs";

/**
 * SciPy's side of the clock, in a process that stays; null where SciPy cannot be had.
 * A question is sent once and then known by its place.
 */
export function startScipyClock() {
  const python = findScipy();
  if (!python) return null;
  const child = spawn(python, [join(root, "lib/commands/bench/time.py")], {
    env: oneThread(),
    stdio: ["pipe", "pipe", "inherit"],
  });
  const lines = createInterface({ input: child.stdout })[Symbol.asyncIterator]();
  /** @type {Map<object, string>} */
  const known = new Map();
  return {
    /** @param {object} question @param {number} budget in seconds */
    clock: async (question, budget) => {
      const name = known.get(question) ?? `q${known.size}`;
      const first = !known.has(question);
      known.set(question, name);
      child.stdin.write(`${JSON.stringify({ name, budget, ...(first ? { question } : {}) })}\n`);
      const { value, done } = await lines.next();
      if (done) throw new Error("The process that times SciPy has ended.");
      return Number(value);
    },
    stop: () => child.stdin.end(),
  };
}
