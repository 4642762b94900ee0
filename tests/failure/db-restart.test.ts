import { randomBytes } from "node:crypto";
import { chmodSync, mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, expect, test } from "vitest";
import { GET as ready } from "@/app/api/health/ready/route";
import { GET as readPlant } from "@/app/api/v1/plants/[plantId]/route";
import { closePool, pool } from "@/db/client";
import { migrate } from "@/db/migrate";
import { bundle } from "@/lib/commands/bundle.mjs";
import { stopChildren } from "@/lib/commands/children.mjs";
import { startCluster } from "@/lib/commands/cluster.mjs";
import { prepareDatabase, withClient } from "@/lib/commands/databases.mjs";
import { isRoot } from "@/lib/commands/paths.mjs";
import { startWorker } from "@/lib/commands/service.mjs";
import { createPlant } from "@/lib/services/plants/create";
import { call, problemIn, signedIn } from "../helpers/call-route";
import { newTeam } from "../helpers/people";
import { twoCarriages } from "../helpers/plant-content";

const PATIENCE_MS = 5_000;
const folder = mkdtempSync(join(tmpdir(), "restart-"));
if (isRoot) chmodSync(folder, 0o711);
const kept = { data: join(folder, "pg"), password: randomBytes(16).toString("hex"), log: join(folder, "postgres.log") };
const start = (fixedPort?: number) => startCluster({ ...kept, initdb: ["--no-sync"], settings: ["fsync=off"], fixedPort });
afterAll(async () => {
  await closePool();
  await stopChildren();
  rmSync(folder, { recursive: true, force: true });
});

/** Asks again and again until the answer fits or the patience is over; the last answer. */
async function eventually<T>(ask: () => Promise<T>, fits: (answer: T) => boolean, patience = PATIENCE_MS): Promise<T> {
  const end = performance.now() + patience;
  for (;;) {
    const answer = await ask();
    if (fits(answer) || performance.now() > end) return answer;
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}

test("a database that restarts while nobody asks ends neither pages nor jobs: 503 while it is away, then all goes on", {
  timeout: 60_000,
}, async () => {
  let cluster = await start();
  const { appUrl, ownerUrl } = await prepareDatabase(cluster.adminUrl, "gainwright", { owner: "owner", app: "app" });
  await migrate(ownerUrl);
  const secret = "a-secret-for-tests-only-0123456789abcdef";
  const address = "http://localhost:3000";
  Object.assign(process.env, { DATABASE_URL: appUrl, NEXTAUTH_URL: address, NEXTAUTH_SECRET: secret });
  await bundle(["worker"]);
  const worker = startWorker({ appUrl, ownerUrl, address, secret, demo: false }, folder);
  const asOwner = (statement: string) => withClient(ownerUrl, async (client) => (await client.query(statement)).rows);
  const schedule = () => asOwner("select identifier from graphile_worker._private_known_crontabs").catch(() => []);
  expect(await eventually(schedule, (rows) => rows.length > 0, 20_000)).toEqual([{ identifier: "sweep" }]);

  const ctx = await newTeam();
  const headers = await signedIn(ctx);
  const { id: plantId } = await createPlant(ctx, { name: "Gantry", content: twoCarriages(), note: "" });
  const read = () => call(readPlant, { params: { plantId }, headers });
  // Connections to lose: several idle ones at once.
  await Promise.all(Array.from({ length: 6 }, read));
  expect(pool().idleCount).toBeGreaterThan(1);

  await cluster.stop();
  expect((await eventually(ready, ({ status }) => status === 503)).status).toBe(503);
  const away = await read();
  expect(Number(away.headers.get("retry-after"))).toBeGreaterThan(0);
  expect(await problemIn(away)).toMatchObject({ status: 503, code: "unavailable" });

  cluster = await start(Number(new URL(cluster.adminUrl).port));
  expect((await eventually(ready, ({ status }) => status === 200)).status).toBe(200);
  expect((await (await read()).json()).name).toBe("Gantry");
  expect(pool().totalCount - pool().idleCount).toBe(0);

  expect(worker.hasExited()).toBe(false);
  await asOwner("select graphile_worker.add_job('sweep')");
  const jobs = () => asOwner("select 1 from graphile_worker.jobs where task_identifier = 'sweep'");
  expect(await eventually(jobs, (rows) => rows.length === 0, 20_000)).toEqual([]);
  expect(worker.hasExited()).toBe(false);
});
