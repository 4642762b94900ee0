import { bundle } from "./bundle.mjs";

/**
 * Brings a database to this release, under a lock that lets several processes try at once.
 * @param {string} ownerUrl
 */
export async function migrateDatabase(ownerUrl) {
  await bundle();
  const bundled = new URL("../../dist/migrate.mjs", import.meta.url);
  const { migrate } = await import(bundled.href);
  await migrate(ownerUrl);
}
