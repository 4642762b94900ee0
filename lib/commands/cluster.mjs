import { spawnSync } from "node:child_process";
import { chownSync, existsSync, mkdirSync, renameSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { lastLines, startChild } from "./children.mjs";
import { connect } from "./databases.mjs";
import { freePort } from "./free-port.mjs";
import { postgresAccount, postgresPrograms } from "./postgres-programs.mjs";
import { codeOf, Stop } from "./stop.mjs";

/** @typedef {{ adminUrl: string, stop: () => Promise<void>, child: import("./children.mjs").Child }} Cluster */

const host = "127.0.0.1";
const admin = "postgres";

/**
 * Makes a folder that only PostgreSQL's account can enter.
 * @param {string} folder
 * @param {{ uid?: number, gid?: number }} account
 */
export function own(folder, { uid, gid }) {
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  if (uid !== undefined && gid !== undefined) chownSync(folder, uid, gid);
}

/**
 * @param {string} programs
 * @param {string} data
 * @param {string} password
 * @param {{ uid?: number, gid?: number }} account
 * @param {string[]} extra
 */
function initialise(programs, data, password, account, extra) {
  // Made beside its place and renamed when whole: an interrupted first start leaves nothing half made.
  const fresh = `${data}.new`;
  const passwordFile = `${data}.password`;
  rmSync(fresh, { recursive: true, force: true });
  own(fresh, account);
  writeFileSync(passwordFile, password, { mode: 0o600 });
  if (account.uid !== undefined && account.gid !== undefined) chownSync(passwordFile, account.uid, account.gid);
  const args = [
    "-D",
    fresh,
    "-U",
    admin,
    `--pwfile=${passwordFile}`,
    "--auth=scram-sha-256",
    "--encoding=UTF8",
    "--locale=C.UTF-8",
  ];
  const made = spawnSync(join(programs, "initdb"), [...args, ...extra], { ...account, cwd: "/", encoding: "utf8" });
  rmSync(passwordFile, { force: true });
  if (made.status !== 0) throw new Stop(`PostgreSQL could not make its data folder ${fresh}:`, made.stderr || String(made.error));
  renameSync(fresh, data);
}

/** @param {import("./children.mjs").Child} child @param {string} url */
async function untilReady(child, url) {
  const end = Date.now() + 60_000;
  for (;;) {
    if (child.hasExited()) return false;
    try {
      const client = await connect(url);
      await client.end();
      return true;
    } catch (error) {
      if (codeOf(error) === "28P01")
        throw new Stop("The data of PostgreSQL and the secrets file beside them do not belong together.");
      if (Date.now() > end) throw new Stop("PostgreSQL did not answer within 60 seconds. Its last words:", lastLines(child));
    }
    await new Promise((resolve) => setTimeout(resolve, 30));
  }
}

/**
 * Starts PostgreSQL on loopback only, without a socket file, on `fixedPort` or else a free one.
 * @param {{ data: string, password: string, log: string, initdb?: string[], settings?: string[], fixedPort?: number }} options
 * @returns {Promise<Cluster>}
 */
export async function startCluster({ data, password, log, initdb = [], settings = [], fixedPort }) {
  const programs = postgresPrograms(data);
  const account = postgresAccount();
  if (!existsSync(data)) initialise(programs, data, password, account, initdb);
  // A server left behind by a killed run holds the data; whoever calls this has made sure that no such run lives.
  if (existsSync(join(data, "postmaster.pid"))) {
    spawnSync(join(programs, "pg_ctl"), ["-D", data, "stop", "-m", "fast", "-w", "-t", "20"], { ...account, cwd: "/" });
  }
  let child;
  for (let attempt = 0; attempt < 3; attempt++) {
    const port = fixedPort ?? (await freePort(host));
    const options = [`listen_addresses=${host}`, "unix_socket_directories=", `port=${port}`, "max_connections=200", ...settings];
    const args = ["-D", data, ...options.flatMap((option) => ["-c", option])];
    child = startChild(join(programs, "postgres"), args, {
      name: "PostgreSQL",
      cwd: "/",
      log,
      account,
      signal: "SIGINT",
      lastSignal: "SIGQUIT",
      patience: 20_000,
    });
    const adminUrl = `postgres://${admin}:${password}@${host}:${port}/postgres`;
    if (await untilReady(child, adminUrl)) return { adminUrl, stop: child.stop, child };
  }
  throw new Stop("PostgreSQL does not start. Its last words:", child ? lastLines(child) : "");
}

/**
 * The lasting cluster of `npm start` or `npm run dev`.
 * @param {string} state
 * @param {string} password
 */
export function startPrivateCluster(state, password) {
  return startCluster({ data: join(state, "pg"), password, log: join(state, "postgres.log") });
}
