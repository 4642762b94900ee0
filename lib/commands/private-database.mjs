import { startPrivateCluster } from "./cluster.mjs";
import { prepareDatabase } from "./databases.mjs";
import { migrateDatabase } from "./migrations.mjs";

/**
 * The database of `npm start` and `npm run dev` on a cluster of its own, started, migrated and ready.
 * @param {string} state
 * @param {import("./secrets.mjs").Secrets} keys
 */
export async function openPrivateDatabase(state, keys) {
  const cluster = await startPrivateCluster(state, keys.admin);
  const urls = await prepareDatabase(cluster.adminUrl, "gainwright", { owner: keys.owner, app: keys.app });
  await migrateDatabase(urls.ownerUrl);
  return { ...urls, child: cluster.child };
}
