import { randomUUID } from "node:crypto";
import { afterAll, inject } from "vitest";
import { appRole, ensureDatabase, ownerRole, urlWith, withClient } from "@/lib/commands/databases.mjs";

export type TestDatabase = {
  /** The role that serves: owns nothing, obeys row security. */
  readonly appUrl: string;
  /** The role that migrates. */
  readonly ownerUrl: string;
  /** The superuser, to look behind row security. */
  readonly adminUrl: string;
};

/**
 * A migrated database of this test file's own, dropped after it, and the environment that makes the application use it.
 * Call it at the top of the file: `const { ownerUrl } = await testDatabase();`
 */
export async function testDatabase(): Promise<TestDatabase> {
  const { adminUrl, template, passwords } = inject("cluster");
  const database = `test_${randomUUID().replaceAll("-", "")}`;
  await withClient(adminUrl, (client) => ensureDatabase(client, database, template));
  afterAll(() => withClient(adminUrl, (client) => client.query(`drop database ${database} with (force)`)));
  const appUrl = urlWith(adminUrl, { role: appRole, password: passwords.app, database });
  const ownerUrl = urlWith(adminUrl, { role: ownerRole, password: passwords.owner, database });
  Object.assign(process.env, {
    DATABASE_URL: appUrl,
    DATABASE_OWNER_URL: ownerUrl,
    NEXTAUTH_URL: "http://localhost:3000",
    NEXTAUTH_SECRET: "a-secret-for-tests-only-0123456789abcdef",
  });
  return { appUrl, ownerUrl, adminUrl: urlWith(adminUrl, { database }) };
}
