import pg from "pg";
import { runChild } from "./children.mjs";
import { withClient } from "./databases.mjs";
import { root } from "./paths.mjs";
import { Stop } from "./stop.mjs";

/**
 * Loads the demo team into a migrated database that holds none.
 * @param {NodeJS.ProcessEnv} env the settings of the service
 */
export async function loadDemoData(env) {
  console.log("Loading the demo data …");
  const call = 'import { seedDemoData } from "./dist/seed.mjs"; await seedDemoData(); process.exit(0);';
  const options = { name: "Loading the demo data", cwd: root, env: { ...env, LOG_LEVEL: "error" }, seconds: 300 };
  const { code } = await runChild(process.execPath, ["--input-type=module", "-e", call], options);
  if (code !== 0) throw new Stop("The demo data could not be loaded.");
}

const mark = "Gainwright demo data loaded";

/**
 * Loads it into somebody's database, once in its life: a remark on the database says that it was, so that a demo team
 * removed later does not come back.
 * @param {string} ownerUrl
 * @param {NodeJS.ProcessEnv} env
 */
export async function loadDemoDataOnce(ownerUrl, env) {
  const remark =
    "select shobj_description(oid, 'pg_database') as remark, datname as name from pg_database where datname = current_database()";
  const { rows } = await withClient(ownerUrl, (client) => client.query(remark));
  if (rows[0].remark === mark) return;
  await loadDemoData(env);
  const comment = `comment on database ${pg.escapeIdentifier(rows[0].name)} is ${pg.escapeLiteral(mark)}`;
  await withClient(ownerUrl, (client) => client.query(comment));
}
