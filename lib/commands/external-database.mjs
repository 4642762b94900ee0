import { createHmac } from "node:crypto";
import { appRole, ensureRole, urlWith, withClient } from "./databases.mjs";
import { migrateDatabase } from "./migrations.mjs";
import { Stop } from "./stop.mjs";

/**
 * A server that somebody else runs. Two accounts are best: DATABASE_URL serves, DATABASE_OWNER_URL owns and migrates.
 * With one account that may create roles, the serving role is made beside it, so that row security holds either way.
 * @param {string} url
 * @param {string | undefined} ownerUrl
 * @returns {Promise<{ appUrl: string, ownerUrl: string, child?: undefined }>}
 */
export async function openExternalDatabase(url, ownerUrl) {
  const accounts = ownerUrl ? { appUrl: url, ownerUrl } : { appUrl: await besideOwner(url), ownerUrl: url };
  await migrateDatabase(accounts.ownerUrl);
  await requireServingRights(accounts.appUrl, accounts.ownerUrl);
  return accounts;
}

/** @param {string} url */
async function besideOwner(url) {
  // Derived, so that every machine that is given this address arrives at the same password.
  const password = createHmac("sha256", decodeURIComponent(new URL(url).password))
    .update(appRole)
    .digest("hex");
  await withClient(url, async (client) => {
    const { rows } = await client.query("select rolsuper or rolcreaterole as may from pg_roles where rolname = current_user");
    if (!rows[0]?.may) {
      throw new Stop(
        "The account of DATABASE_URL may not create the second account that serves, which owns nothing and obeys row security.",
        `Do one thing: have an administrator run: create role ${appRole} login password '…'`,
        "Then set DATABASE_URL to that account, and DATABASE_OWNER_URL to the account that owns the database.",
      );
    }
    await ensureRole(client, appRole, password);
  });
  return urlWith(url, { role: appRole, password });
}

/** @param {string} url @param {string} ownerUrl */
async function requireServingRights(url, ownerUrl) {
  const account = await withClient(url, async (client) => {
    const { rows } = await client.query(
      "select current_user as name, pg_has_role(current_user, $1, 'member') as member, rolsuper or rolbypassrls as above from pg_roles where rolname = current_user",
      [appRole],
    );
    return rows[0];
  });
  if (account.above) {
    throw new Stop(
      `The account ${account.name} of DATABASE_URL stands above row security, so teams would not be kept apart by the database.`,
      `Do one thing: give an account that is neither superuser nor has BYPASSRLS, such as ${appRole}.`,
    );
  }
  if (account.member) return;
  const grant = `grant ${appRole} to "${account.name.replaceAll('"', '""')}"`;
  try {
    await withClient(ownerUrl, (client) => client.query(grant));
  } catch {
    throw new Stop(
      `The account ${account.name} of DATABASE_URL lacks the serving role.`,
      `Do one thing: have an administrator run: ${grant}`,
    );
  }
}
