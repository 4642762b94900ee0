import { randomBytes } from "node:crypto";
import { mkdtempSync, readdirSync, rmSync, statfsSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { own, startCluster } from "./cluster.mjs";
import { postgresAccount } from "./postgres-programs.mjs";
import { codeOf } from "./stop.mjs";

const sharedMemory = "/dev/shm";

/** The shared-memory file system where it is large enough (containers often give it 64 MB), else the temporary folder. */
function fastFolder() {
  try {
    const { bavail, bsize } = statfsSync(sharedMemory);
    if (bavail * bsize > 1.5e9) return sharedMemory;
  } catch {
    // No such file system here.
  }
  return tmpdir();
}

/** Removes what runs left behind that were killed outright. @param {string} parent */
function sweep(parent) {
  for (const name of readdirSync(parent)) {
    const pid = /^gainwright-(\d+)-/.exec(name)?.[1];
    if (!pid) continue;
    try {
      process.kill(Number(pid), 0);
    } catch (error) {
      if (codeOf(error) === "ESRCH") rmSync(join(parent, name), { recursive: true, force: true });
    }
  }
}

/** A cluster for one test run: fast, unsafe against power loss, gone when stopped. */
export function startThrowAwayCluster() {
  const parent = fastFolder();
  sweep(parent);
  const folder = mkdtempSync(join(parent, `gainwright-${process.pid}-`));
  own(folder, postgresAccount());
  process.once("exit", () => rmSync(folder, { recursive: true, force: true }));
  return startCluster({
    data: join(folder, "pg"),
    password: randomBytes(16).toString("hex"),
    log: join(folder, "postgres.log"),
    initdb: ["--no-sync"],
    settings: ["fsync=off", "synchronous_commit=off", "full_page_writes=off", "max_wal_size=256MB"],
  });
}
