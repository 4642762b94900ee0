import { buildIfChanged } from "./build.mjs";
import { demoAccounts, demoPassword } from "./demo-accounts.mjs";
import { loadDemoData, loadDemoDataOnce } from "./demo-data.mjs";
import { openExternalDatabase } from "./external-database.mjs";
import { freePort } from "./free-port.mjs";
import { stateFolder } from "./paths.mjs";
import { openPrivateDatabase } from "./private-database.mjs";
import { claim } from "./run-lock.mjs";
import { secrets } from "./secrets.mjs";
import { serviceEnvironment, startService } from "./service.mjs";
import { Stop } from "./stop.mjs";

/** Serves until something ends. @returns {Promise<never>} */
export async function serve() {
  const state = stateFolder("start");
  const lock = process.env.DATABASE_URL ? undefined : claim(state);
  const keys = secrets(state);
  const host = process.env.HOST || "127.0.0.1";
  const port = await servingPort(host);
  const address = process.env.NEXTAUTH_URL || `http://${shownHost(host)}:${port}`;
  const [{ child, demo, ...database }] = await Promise.all([openDatabase(state, keys, address), buildIfChanged()]);
  const service = { ...database, address, host, port, secret: keys.auth, demo };
  const { web, worker } = await startService(service, process.env.GAINWRIGHT_LOG === "terminal" ? undefined : state);
  lock?.announce(address);
  greet(address, demo, state);
  const children = [web, worker, ...(child ? [child] : [])];
  const ended = await Promise.race(children.map((child) => child.exited.then(() => child)));
  throw new Stop(`${ended.name} ended by itself, so everything stops.${ended.log ? ` Its log: ${ended.log}` : ""}`);
}

/** @param {string} host */
const shownHost = (host) => (["127.0.0.1", "0.0.0.0", "::1", "::"].includes(host) ? "localhost" : host);

/** A port asked for by number is taken or refused; without one 3000 is tried first. @param {string} host */
async function servingPort(host) {
  const asked = Number(process.env.PORT || 0);
  const port = await freePort(host, asked || 3000);
  if (asked && port !== asked) throw new Stop(`Port ${asked} is in use. Do one thing: set PORT to another, or leave it unset.`);
  return port;
}

/**
 * @param {string} state
 * @param {import("./secrets.mjs").Secrets} keys
 * @param {string} address
 */
async function openDatabase(state, keys, address) {
  const { DATABASE_URL: given, DATABASE_OWNER_URL: givenOwner, GAINWRIGHT_DEMO_DATA: wish } = process.env;
  // The demo accounts have published passwords: they enter a database of somebody's only by name.
  const demo = given ? wish === "yes" : wish !== "no";
  const settings = (/** @type {{ appUrl: string, ownerUrl: string }} */ urls) =>
    serviceEnvironment({ ...urls, address, secret: keys.auth, demo });
  if (!given) {
    const fill = async (/** @type {{ appUrl: string, ownerUrl: string }} */ urls) => {
      if (demo) await loadDemoData(settings(urls));
    };
    return { ...(await openPrivateDatabase(state, keys, fill)), demo };
  }
  const database = await openExternalDatabase(given, givenOwner);
  if (demo) await loadDemoDataOnce(database.ownerUrl, settings(database));
  return { ...database, demo };
}

/** @param {string} address @param {boolean} demo @param {string} state */
function greet(address, demo, state) {
  console.log(`\n  Gainwright is ready: ${address}\n`);
  if (demo) {
    for (const { role, email } of demoAccounts) console.log(`  demo ${role.padEnd(9)} ${email}`);
    console.log(`  password       ${demoPassword}\n`);
  }
  if (process.env.GAINWRIGHT_LOG !== "terminal") console.log(`  Logs are in ${state}`);
  console.log("  Ctrl-C stops everything; the data stay.\n");
}
