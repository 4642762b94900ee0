import { afterAll, expect, test } from "vitest";
import { appRole, urlWith, withClient } from "@/lib/commands/databases.mjs";
import { openExternalDatabase } from "@/lib/commands/external-database.mjs";
import { startThrowAwayCluster } from "@/lib/commands/throw-away-cluster.mjs";

// Roles belong to a whole server, so these tests have one of their own.
const cluster = await startThrowAwayCluster();
afterAll(cluster.stop);
let made = 0;

/** A database as an administrator would hand it out: empty, owned by an account with these rights. */
async function handedOut(rights: string) {
  const name = `handed_out_${made++}`;
  await withClient(cluster.adminUrl, async (client) => {
    await client.query(`create role ${name} login password 'theirs' ${rights}`);
    await client.query(`create database ${name} owner ${name}`);
  });
  return urlWith(cluster.adminUrl, { role: name, password: "theirs", database: name });
}

const servesAs = (url: string) =>
  withClient(url, async (client) => {
    const { rows } = await client.query("select current_user as name, (select count(*)::int from plants) as plants");
    return rows[0];
  });

test("with one account that may not create roles, the one thing to do is said", async () => {
  const url = await handedOut("");
  await expect(openExternalDatabase(url, undefined)).rejects.toThrow(`create role ${appRole} login`);
});

test("with one account that may create roles, the serving role is made beside it, and again with the same password", async () => {
  const url = await handedOut("createrole");
  const { appUrl, ownerUrl } = await openExternalDatabase(url, undefined);
  expect(ownerUrl).toBe(url);
  expect(await servesAs(appUrl)).toEqual({ name: appRole, plants: 0 });
  expect((await openExternalDatabase(url, undefined)).appUrl).toBe(appUrl);
});

test("with an owner and a serving account, the owner migrates and the other serves in the serving role", async () => {
  const ownerUrl = await handedOut("createrole");
  const serving = await handedOut("");
  const appUrl = urlWith(ownerUrl, { role: new URL(serving).username, password: "theirs" });
  const opened = await openExternalDatabase(appUrl, ownerUrl);
  expect(opened).toMatchObject({ appUrl, ownerUrl });
  expect(await servesAs(appUrl)).toMatchObject({ plants: 0 });
  await expect(openExternalDatabase(appUrl, ownerUrl)).resolves.toMatchObject({ appUrl });
});

test("a serving account above row security is refused", async () => {
  const ownerUrl = await handedOut("createrole");
  await expect(
    openExternalDatabase(urlWith(cluster.adminUrl, { database: new URL(ownerUrl).pathname.slice(1) }), ownerUrl),
  ).rejects.toThrow("above row security");
});
