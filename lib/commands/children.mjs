import { spawn } from "node:child_process";
import { closeSync, openSync, readFileSync } from "node:fs";
import { onPath } from "./apt.mjs";

/**
 * @typedef {{ name: string, pid: number, exited: Promise<void>, hasExited: () => boolean, stop: () => Promise<void>, log?: string }} Child
 * @typedef {{ name: string, env?: NodeJS.ProcessEnv, cwd?: string, log?: string, account?: { uid?: number, gid?: number },
 *   signal?: NodeJS.Signals, lastSignal?: NodeJS.Signals, patience?: number }} ChildOptions
 */

/** Through `setpriv` a child gets its stop signal even when this process is killed outright and cannot stop it. */
const setpriv = onPath("setpriv");

/**
 * Starts a long-lived child in a process group of its own, so that Ctrl-C reaches only this process, which then stops
 * its children in order.
 * @param {string} command
 * @param {string[]} args
 * @param {ChildOptions} options
 * @returns {Child}
 */
export function startChild(
  command,
  args,
  { name, env, cwd, log, account = {}, signal = "SIGTERM", lastSignal = "SIGKILL", patience = 10_000 },
) {
  const output = log ? openSync(log, "w", 0o600) : undefined;
  const [program, all] = setpriv ? [setpriv, ["--pdeathsig", signal.slice(3), "--", command, ...args]] : [command, args];
  const child = spawn(program, all, {
    cwd,
    env,
    ...account,
    detached: true,
    stdio: ["ignore", output ?? "inherit", output ?? "inherit"],
  });
  if (output !== undefined) closeSync(output);
  let ended = false;
  /** @type {Promise<void>} */
  const exited = new Promise((resolve) => {
    const end = () => {
      ended = true;
      resolve();
    };
    child.once("exit", end);
    child.once("error", end);
  });
  const stop = async () => {
    if (ended) return;
    child.kill(signal);
    const impatient = setTimeout(() => child.kill(lastSignal), patience);
    await exited;
    clearTimeout(impatient);
  };
  return { name, pid: child.pid ?? 0, exited, hasExited: () => ended, stop, log };
}

/** @param {Child} child @param {number} [lines] */
export function lastLines(child, lines = 20) {
  if (!child.log) return "";
  return readFileSync(child.log, "utf8").trimEnd().split("\n").slice(-lines).join("\n");
}
