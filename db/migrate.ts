import "server-only";
import { join } from "node:path";
import { drizzle } from "drizzle-orm/node-postgres";
import { migrate as applyMigrations } from "drizzle-orm/node-postgres/migrator";
import { runMigrations as migrateQueue } from "graphile-worker";
import pg from "pg";
import { APP_ROLE, grantStatements } from "./grants";

/** Any number that nothing else locks: one migrator at a time, whoever starts first. */
const MIGRATION_LOCK = 727_460_011;

/**
 * Brings the database of `ownerUrl` to this release: tables, job queue, rights of the app role. Safe to run again and at once
 * by several processes. The owner must be able to create schemas; a missing app role is created without a sign-in. The rights
 * are this release's: a folder that stops earlier lacks what some of them speak of, and brings its own.
 */
export async function migrate(
  ownerUrl: string,
  folder = join(process.cwd(), "drizzle"),
  rights: readonly string[] = grantStatements(),
): Promise<void> {
  const client = new pg.Client({ connectionString: ownerUrl });
  client.on("error", () => undefined); // a lost connection also rejects the query that waits on it
  await client.connect();
  try {
    await client.query("SET lock_timeout = '60s'");
    await client.query("SELECT pg_advisory_lock($1)", [MIGRATION_LOCK]);
    await client.query("SET lock_timeout = '5s'");
    await applyMigrations(drizzle(client), { migrationsFolder: folder });
    await migrateQueue({ connectionString: ownerUrl });
    await grantRights(client, rights);
  } finally {
    await client.end();
  }
}

async function grantRights(client: pg.Client, rights: readonly string[]): Promise<void> {
  const known = await client.query("SELECT 1 FROM pg_roles WHERE rolname = $1", [APP_ROLE]);
  if (known.rowCount === 0) await client.query(`CREATE ROLE ${APP_ROLE} NOLOGIN NOBYPASSRLS`);
  await client.query("BEGIN");
  for (const statement of rights) await client.query(statement);
  await client.query("COMMIT");
}
