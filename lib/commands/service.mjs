import { join } from "node:path";
import { lastLines, startChild } from "./children.mjs";
import { root, script } from "./paths.mjs";
import { Stop } from "./stop.mjs";

/**
 * @typedef {{ appUrl: string, ownerUrl: string, address: string, secret: string, demo: boolean }} Service
 * @typedef {{ web: import("./children.mjs").Child, worker: import("./children.mjs").Child }} Running
 */

/**
 * The settings of the pages and jobs. What the person set stands, but for the accounts of the database.
 * @param {Service} service
 * @param {"production" | "development"} [mode]
 * @returns {NodeJS.ProcessEnv}
 */
export function serviceEnvironment({ appUrl, address, secret, demo }, mode = "production") {
  const { DATABASE_OWNER_URL: _, ...given } = process.env;
  return {
    ...given,
    NODE_ENV: mode,
    NEXT_TELEMETRY_DISABLED: "1",
    NEXTAUTH_URL: given.NEXTAUTH_URL || address,
    NEXTAUTH_SECRET: given.NEXTAUTH_SECRET || secret,
    GAINWRIGHT_DEMO: given.GAINWRIGHT_DEMO || (demo ? "yes" : "no"),
    DATABASE_URL: appUrl,
  };
}

/** @param {string} name @param {string | undefined} logs a folder, or the terminal */
const logIn = (logs, name) => (logs ? join(logs, `${name}.log`) : undefined);

/**
 * Runs the jobs. The queue needs the owner's rights, which the pages never get.
 * @param {Service} service
 * @param {string} [logs]
 */
export function startWorker(service, logs) {
  const env = { ...serviceEnvironment(service), DATABASE_OWNER_URL: service.ownerUrl };
  return startChild(process.execPath, [join(root, "dist/worker.mjs")], {
    name: "The job worker",
    env,
    cwd: root,
    log: logIn(logs, "worker"),
  });
}

/**
 * Serves the production build and returns once it answers.
 * @param {Service & { host: string, port: number }} service
 * @param {string} [logs]
 * @returns {Promise<Running>}
 */
export async function startService({ host, port, ...service }, logs) {
  const worker = startWorker(service, logs);
  const args = [script("next", "dist/bin/next"), "start", "--hostname", host, "--port", String(port)];
  const env = serviceEnvironment(service);
  const web = startChild(process.execPath, args, { name: "The web server", env, cwd: root, log: logIn(logs, "web") });
  await untilHealthy([web, worker], `http://${host === "0.0.0.0" ? "127.0.0.1" : host}:${port}`);
  return { web, worker };
}

/**
 * @param {import("./children.mjs").Child[]} children
 * @param {string} address
 */
export async function untilHealthy(children, address) {
  const end = Date.now() + 60_000;
  for (;;) {
    const gone = children.find((child) => child.hasExited());
    if (gone) throw new Stop(`${gone.name} ended at once:`, lastLines(gone));
    const answer = await fetch(`${address}/api/health`, { signal: AbortSignal.timeout(5_000) }).catch(() => undefined);
    if (answer?.ok) return;
    if (Date.now() > end) throw new Stop(`${children[0].name} did not answer within 60 seconds:`, lastLines(children[0]));
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}
