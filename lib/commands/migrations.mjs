import { existsSync } from "node:fs";
import pg from "pg";
import { bundle } from "./bundle.mjs";
import { runChild } from "./children.mjs";
import { withClient } from "./databases.mjs";
import { Stop } from "./stop.mjs";

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

const mark = "Gainwright demo data loaded";

/**
 * Loads the demo data, once in the life of a database: a team removed later does not come back.
 * @param {string} ownerUrl
 * @param {NodeJS.ProcessEnv} env the settings of the service
 */
export async function seedOnce(ownerUrl, env) {
  const remark = "select shobj_description(oid, 'pg_database') as remark from pg_database where datname = current_database()";
  const { rows } = await withClient(ownerUrl, (client) => client.query(remark));
  if (rows[0]?.remark === mark) return;
  if (!existsSync("dist/seed.mjs")) return;
  console.log("Loading the demo data …");
  const call = 'import { seedDemoData } from "./dist/seed.mjs"; await seedDemoData(); process.exit(0);';
  const { code } = await runChild(process.execPath, ["--input-type=module", "-e", call], {
    name: "Loading the demo data",
    env,
    seconds: 300,
  });
  if (code !== 0) throw new Stop("The demo data could not be loaded.");
  await withClient(ownerUrl, async (client) => {
    const { rows: names } = await client.query("select current_database() as name");
    await client.query(`comment on database ${pg.escapeIdentifier(names[0].name)} is ${pg.escapeLiteral(mark)}`);
  });
}
