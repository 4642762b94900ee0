import { execFileSync } from "node:child_process";
import { cpSync, mkdtempSync, readdirSync, rmSync, symlinkSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { expect, test } from "vitest";
import { TABLE_GRANTS } from "@/db/grants";
import { migrate } from "@/db/migrate";
import { withClient } from "@/lib/commands/databases.mjs";
import { testDatabase } from "../helpers/test-database";

const { ownerUrl, adminUrl } = await testDatabase();

const tables = () =>
  withClient(adminUrl, async (client) => {
    const { rows } = await client.query<{ name: string }>(
      "select table_name as name from information_schema.tables where table_schema = 'public' order by 1",
    );
    return rows.map((row) => row.name);
  });

test("every table of the migrated database has a line in the list of rights, and no line speaks of a missing table", async () => {
  expect(await tables()).toEqual(Object.keys(TABLE_GRANTS).sort());
});

test("migrating a migrated database again, twice at once, changes nothing and fails nowhere", async () => {
  const before = await tables();
  await Promise.all([migrate(ownerUrl), migrate(ownerUrl)]);
  expect(await tables()).toEqual(before);
});

test("the stored migrations are all there is to generate from the schema", () => {
  const root = process.cwd();
  const copy = mkdtempSync(join(tmpdir(), "gainwright-migrations-"));
  try {
    for (const name of ["db", "drizzle", "drizzle.config.ts", "package.json", "tsconfig.json"]) {
      cpSync(join(root, name), join(copy, name), { recursive: true });
    }
    for (const name of ["node_modules", "lib", "control"]) symlinkSync(join(root, name), join(copy, name));
    const before = readdirSync(join(copy, "drizzle"));
    const said = execFileSync(join(root, "node_modules/.bin/drizzle-kit"), ["generate"], { cwd: copy, encoding: "utf8" });
    expect(said).toContain("No schema changes");
    expect(readdirSync(join(copy, "drizzle"))).toEqual(before);
  } finally {
    rmSync(copy, { recursive: true, force: true });
  }
});
