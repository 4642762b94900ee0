import { spawnSync } from "node:child_process";
import { chmodSync, existsSync, mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, expect, test } from "vitest";
import { startPrivateCluster } from "@/lib/commands/cluster.mjs";
import { prepareDatabase, urlWith, withClient } from "@/lib/commands/databases.mjs";
import { isRoot } from "@/lib/commands/paths.mjs";
import { secrets } from "@/lib/commands/secrets.mjs";

const state = mkdtempSync(join(tmpdir(), "state-"));
if (isRoot) chmodSync(state, 0o711);
const keys = secrets(state);
const open = async () => {
  const cluster = await startPrivateCluster(state, keys.admin);
  return { cluster, urls: await prepareDatabase(cluster.adminUrl, "gainwright", keys) };
};
afterAll(() => rmSync(state, { recursive: true, force: true }));

/** Addresses on which any process of this machine listens at `port`, as the kernel writes them. */
const listeners = (port: string) =>
  ["/proc/net/tcp", "/proc/net/tcp6"]
    .flatMap((file) => (existsSync(file) ? readFileSync(file, "utf8").split("\n") : []))
    .map((line) => line.trim().split(/\s+/))
    .filter(([, local, , status]) => status === "0A" && Number.parseInt(local.split(":")[1], 16) === Number(port))
    .map(([, local]) => local.split(":")[0]);

test("the private database listens on loopback only, wants a password and keeps its data over a restart", async () => {
  const first = await open();
  expect(listeners(new URL(first.cluster.adminUrl).port)).toEqual(["0100007F"]);
  const wrong = urlWith(first.urls.appUrl, { password: "guessed" });
  await expect(withClient(wrong, (client) => client.query("select 1"))).rejects.toThrow("password authentication failed");
  await withClient(first.urls.ownerUrl, (client) => client.query("create table kept as select 42 as answer"));
  await first.cluster.stop();
  expect(existsSync(join(state, "pg/postmaster.pid"))).toBe(false);
  const second = await open();
  const { rows } = await withClient(second.urls.ownerUrl, (client) => client.query("select answer from kept"));
  expect(rows).toEqual([{ answer: 42 }]);
  await second.cluster.stop();
});

test("the role that serves is no superuser, passes no row security and can neither make nor own anything", async () => {
  const { cluster, urls } = await open();
  const { rows } = await withClient(urls.appUrl, (client) =>
    client.query(
      "select rolsuper, rolbypassrls, rolcreatedb, rolcreaterole, rolreplication from pg_roles where rolname = current_user",
    ),
  );
  expect(Object.values(rows[0])).toEqual([false, false, false, false, false]);
  for (const statement of ["create table mine (a int)", "create schema mine", "create temporary table mine (a int)"]) {
    await expect(withClient(urls.appUrl, (client) => client.query(statement))).rejects.toThrow("permission denied");
  }
  await cluster.stop();
});

test("a server that a killed run left behind is taken over, and nothing committed is lost", async () => {
  const { cluster, urls } = await open();
  await withClient(urls.ownerUrl, (client) => client.query("create table survives as select 7 as number"));
  const pid = readFileSync(join(state, "pg/postmaster.pid"), "utf8").split("\n")[0];
  const next = await open();
  expect(cluster.child.hasExited()).toBe(true);
  expect(spawnSync("kill", ["-0", pid]).status).not.toBe(0);
  const { rows } = await withClient(next.urls.ownerUrl, (client) => client.query("select number from survives"));
  expect(rows).toEqual([{ number: 7 }]);
  await next.cluster.stop();
});

test("data and secrets that do not belong together are told apart in plain words", async () => {
  await expect(startPrivateCluster(state, "another-password")).rejects.toThrow("do not belong together");
  const { stopChildren } = await import("@/lib/commands/children.mjs");
  await stopChildren();
});
