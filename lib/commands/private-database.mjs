import pg from "pg";
import { startPrivateCluster } from "./cluster.mjs";
import { prepareDatabase, withClient } from "./databases.mjs";
import { migrateDatabase } from "./migrations.mjs";

/** @typedef {{ appUrl: string, ownerUrl: string }} Urls */

const name = "gainwright";
const unfinished = "gainwright_unfinished";

/**
 * Makes the database under another name and renames it when it is whole, so that an interrupted first start begins anew.
 * @param {string} adminUrl
 * @param {import("./secrets.mjs").Secrets} keys
 * @param {(urls: Urls) => Promise<void>} fill
 */
async function makeDatabase(adminUrl, keys, fill) {
  await withClient(adminUrl, (client) => client.query(`drop database if exists ${unfinished} with (force)`));
  const urls = await prepareDatabase(adminUrl, unfinished, keys);
  await migrateDatabase(urls.ownerUrl);
  await fill(urls);
  await withClient(adminUrl, (client) => client.query(`alter database ${unfinished} rename to ${pg.escapeIdentifier(name)}`));
}

/**
 * The database of `npm start` and `npm run dev` on a cluster of its own: made and filled the first time, migrated, ready.
 * @param {string} state
 * @param {import("./secrets.mjs").Secrets} keys
 * @param {(urls: Urls) => Promise<void>} fill
 */
export async function openPrivateDatabase(state, keys, fill) {
  const cluster = await startPrivateCluster(state, keys.admin);
  const { rowCount } = await withClient(cluster.adminUrl, (client) =>
    client.query("select 1 from pg_database where datname = $1", [name]),
  );
  if (!rowCount) await makeDatabase(cluster.adminUrl, keys, fill);
  const urls = await prepareDatabase(cluster.adminUrl, name, keys);
  if (rowCount) await migrateDatabase(urls.ownerUrl);
  return { ...urls, child: cluster.child };
}
