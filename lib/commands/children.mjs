import { spawn } from "node:child_process";
import { closeSync, openSync, readFileSync } from "node:fs";
import { onPath } from "./apt.mjs";
import { explain } from "./stop.mjs";

/**
 * @typedef {{ name: string, exited: Promise<number>, hasExited: () => boolean, stop: () => Promise<void>, log?: string }} Child
 * @typedef {{ name: string, env?: NodeJS.ProcessEnv, cwd?: string, log?: string, account?: { uid?: number, gid?: number },
 *   signal?: NodeJS.Signals, lastSignal?: NodeJS.Signals, patience?: number }} ChildOptions
 */

/** Through `setpriv` a child gets its stop signal even when this process is killed outright and cannot stop it. */
const setpriv = onPath("setpriv");

/** @type {Set<Child>} in the order of their start */
const running = new Set();

/**
 * Starts a child in a process group of its own, so that Ctrl-C reaches only this process, which then stops its children
 * in order. Output goes to the terminal, or to `log`.
 * @param {string} command
 * @param {string[]} args
 * @param {ChildOptions} options
 * @returns {Child}
 */
export function startChild(command, args, options) {
  const { name, env, cwd, log, account = {}, signal = "SIGTERM", lastSignal = "SIGKILL", patience = 10_000 } = options;
  const output = log ? openSync(log, "w", 0o600) : undefined;
  const guard = setpriv ? [setpriv, "--pdeathsig", signal.slice(3), "--"] : [];
  const [program, ...all] = [...guard, command, ...args];
  const stdio = /** @type {const} */ (["ignore", output ?? "inherit", output ?? "inherit"]);
  const child = spawn(program, all, { cwd, env, ...account, detached: true, stdio: [...stdio] });
  if (output !== undefined) closeSync(output);
  let ended = false;
  // Its group too: a test that loops for ever, say, hears nothing of its runner's end.
  const signalGroup = (/** @type {NodeJS.Signals} */ which) => {
    try {
      if (child.pid) process.kill(-child.pid, which);
    } catch {
      // Nobody of the group is left.
    }
  };
  /** @type {Promise<number>} */
  const exited = new Promise((resolve) => {
    const end = (/** @type {number} */ code) => {
      if (ended) return;
      ended = true;
      running.delete(handle);
      signalGroup("SIGKILL");
      resolve(code);
    };
    child.once("exit", (code) => end(code ?? 1));
    child.once("error", () => end(127));
  });
  /** @type {Child} */
  const handle = {
    name,
    log,
    exited,
    hasExited: () => ended,
    async stop() {
      if (ended) return;
      child.kill(signal);
      const impatient = setTimeout(() => signalGroup(lastSignal), patience);
      await exited;
      clearTimeout(impatient);
    },
  };
  running.add(handle);
  return handle;
}

/** Stops what still runs, the youngest first: pages, then jobs, then the database under them. */
export async function stopChildren() {
  for (const child of [...running].reverse()) await child.stop().catch(explain);
}

/** @param {Child} child @param {number} [lines] */
export function lastLines(child, lines = 20) {
  if (!child.log) return "";
  return readFileSync(child.log, "utf8").trimEnd().split("\n").slice(-lines).join("\n");
}

/**
 * Runs a child to its end within a time limit; its exit code, 124 when the time ran out.
 * @param {string} command
 * @param {string[]} args
 * @param {ChildOptions & { seconds: number }} options
 */
export async function runChild(command, args, { seconds, ...options }) {
  const child = startChild(command, args, options);
  let late = false;
  const limit = setTimeout(() => {
    late = true;
    console.error(`${options.name} did not end within ${seconds} seconds.`);
    child.stop();
  }, seconds * 1_000);
  const code = await child.exited;
  clearTimeout(limit);
  return { code: late ? 124 : code, child };
}
