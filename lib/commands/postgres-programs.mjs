import { spawnSync } from "node:child_process";
import { accessSync, constants, readdirSync, readFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { canInstall, install, onPath } from "./apt.mjs";
import { isRoot } from "./paths.mjs";
import { Stop } from "./stop.mjs";

const debian = "/usr/lib/postgresql";
const oldest = 14;

/** @param {string} folder */
function complete(folder) {
  try {
    for (const program of ["postgres", "initdb", "pg_ctl"]) accessSync(join(folder, program), constants.X_OK);
    return true;
  } catch {
    return false;
  }
}

function debianFolders() {
  try {
    const versions = readdirSync(debian).filter((name) => Number(name) >= oldest);
    return versions.sort((a, b) => Number(b) - Number(a)).map((version) => join(debian, version, "bin"));
  } catch {
    return [];
  }
}

/** @param {string} [version] the major version that existing data were written by */
function find(version) {
  const chosen = process.env.PG_BIN;
  if (chosen) return complete(chosen) ? chosen : undefined;
  const onPathFolder = onPath("postgres");
  const folders = [...(version ? [join(debian, version, "bin")] : []), ...debianFolders()];
  if (onPathFolder) folders.push(dirname(onPathFolder));
  return folders.find(complete);
}

/** @param {string} folder */
function majorVersion(folder) {
  const { stdout } = spawnSync(join(folder, "postgres"), ["--version"], { encoding: "utf8" });
  return /\b(\d+)(\.|devel|beta|rc|\s|$)/.exec(stdout ?? "")?.[1];
}

/** @param {string} data a data folder, which need not exist yet */
function writtenBy(data) {
  try {
    return readFileSync(join(data, "PG_VERSION"), "utf8").trim();
  } catch {
    return undefined;
  }
}

/**
 * The folder of PostgreSQL's server programs, installed from Debian's packages when root may do so.
 * @param {string} data the data folder they are to serve
 */
export function postgresPrograms(data) {
  const version = writtenBy(data);
  const wanted = version ? `postgresql-${version}` : "postgresql";
  let folder = find(version);
  if (!folder && !process.env.PG_BIN && canInstall() && install([wanted])) folder = find(version);
  if (!folder) {
    throw new Stop(
      `PostgreSQL ${oldest} or newer is needed and its programs (postgres, initdb, pg_ctl) were not found.`,
      `Do one thing: install it (on Debian: sudo apt-get install ${wanted}), and run this command again.`,
      "Or set PG_BIN to the folder of these programs, or DATABASE_URL to a server that you already have.",
    );
  }
  const found = majorVersion(folder);
  if (version && found !== version) {
    throw new Stop(
      `The data in ${data} were written by PostgreSQL ${version}; only version ${found} was found.`,
      `Do one thing: install version ${version} (on Debian: sudo apt-get install ${wanted}), and run this command again.`,
      `Or set PG_BIN to the folder of its programs.`,
    );
  }
  return folder;
}

/** PostgreSQL refuses to run as root: then its own account runs it. @returns {{ uid?: number, gid?: number }} */
export function postgresAccount() {
  if (!isRoot) return {};
  const [uid, gid] = ["-u", "-g"].map((flag) =>
    Number.parseInt(spawnSync("id", [flag, "postgres"], { encoding: "utf8" }).stdout, 10),
  );
  if (Number.isNaN(uid) || Number.isNaN(gid)) {
    throw new Stop(
      "PostgreSQL does not run as root, and this system has no account named postgres to run it as.",
      "Do one thing: add it (useradd --system postgres), and run this command again.",
      "Or run this command as an ordinary user.",
    );
  }
  return { uid, gid };
}
