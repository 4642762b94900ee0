import { readFileSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { codeOf, Stop } from "./stop.mjs";

/** @typedef {{ pid: number, started: string, address?: string }} Run */

/** When a process began, so that a number reused after a restart is not taken for the old run. @param {number} pid */
function startOf(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, "utf8");
    return stat.slice(stat.lastIndexOf(")") + 2).split(" ")[19];
  } catch {
    return "unknown";
  }
}

/** @param {Run} run */
function lives({ pid, started }) {
  try {
    process.kill(pid, 0);
  } catch (error) {
    if (codeOf(error) === "ESRCH") return false;
  }
  return startOf(pid) === started;
}

/**
 * Claims a state folder for this process: one run at a time may hold its data.
 * @param {string} state
 */
export function claim(state) {
  const file = join(state, "running.json");
  /** @type {Run} */
  const mine = { pid: process.pid, started: startOf(process.pid) };
  const write = (/** @type {string} */ flag) => writeFileSync(file, JSON.stringify(mine), { mode: 0o600, flag });
  try {
    write("wx");
  } catch (error) {
    if (codeOf(error) !== "EEXIST") throw error;
    const other = read(file);
    if (other && lives(other)) {
      throw new Stop(
        `Gainwright is already running${other.address ? ` at ${other.address}` : ""} (process ${other.pid}).`,
        "Stop it with Ctrl-C in its terminal before starting it again.",
      );
    }
    rmSync(file, { force: true });
    write("wx");
  }
  process.once("exit", () => rmSync(file, { force: true }));
  return {
    /** @param {string} address */
    announce(address) {
      mine.address = address;
      write("w");
    },
  };
}

/** @param {string} file @returns {Run | undefined} */
function read(file) {
  try {
    return JSON.parse(readFileSync(file, "utf8"));
  } catch {
    return undefined;
  }
}
