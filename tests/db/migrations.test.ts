import { execFileSync } from "node:child_process";
import { randomUUID } from "node:crypto";
import { cpSync, mkdtempSync, readdirSync, readFileSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, describe, expect, test } from "vitest";
import { TABLE_GRANTS } from "@/db/grants";
import { migrate } from "@/db/migrate";
import { ensureDatabase, urlWith, withClient } from "@/lib/commands/databases.mjs";
import { fillTeam } from "../helpers/filled-team";
import { testDatabase } from "../helpers/test-database";

const { ownerUrl, adminUrl } = await testDatabase();

const tables = (url = adminUrl) =>
  withClient(url, async (client) => {
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

type Journal = { readonly entries: readonly { readonly tag: string }[] };
const journal: Journal = JSON.parse(readFileSync("drizzle/meta/_journal.json", "utf8"));
const folders: string[] = [];
afterAll(() => {
  for (const folder of folders) rmSync(folder, { recursive: true, force: true });
});

/** An empty database brought as far as the first `count` migrations go. */
async function databaseAt(count: number) {
  const database = `test_${randomUUID().replaceAll("-", "")}`;
  await withClient(adminUrl, (client) => ensureDatabase(client, database));
  const folder = mkdtempSync(join(tmpdir(), "gainwright-earlier-"));
  folders.push(folder);
  cpSync("drizzle", folder, { recursive: true });
  writeFileSync(join(folder, "meta/_journal.json"), JSON.stringify({ ...journal, entries: journal.entries.slice(0, count) }));
  const urls = { owner: urlWith(ownerUrl, { database }), admin: urlWith(adminUrl, { database }) };
  await migrate(urls.owner, folder, []);
  const drop = () => withClient(adminUrl, (client) => client.query(`drop database ${database} with (force)`));
  return { ...urls, drop };
}

type Contents = Readonly<Record<string, { readonly columns: readonly string[]; readonly sum: string | null }>>;

/** A checksum of every table over the columns that it had before, or has now. */
function contents(url: string, before?: Contents): Promise<Contents> {
  return withClient(url, async (client) => {
    const found: Record<string, Contents[string]> = {};
    for (const table of before ? Object.keys(before) : await tables(url)) {
      const { rows } = await client.query<{ name: string }>(
        "select column_name as name from information_schema.columns where table_schema = 'public' and table_name = $1 order by 1",
        [table],
      );
      const columns = before?.[table]?.columns ?? rows.map(({ name }) => name);
      const row = `row(${columns.join(", ")})::text`;
      const { rows: sums } = await client.query<{ sum: string | null }>(
        `select md5(string_agg(${row}, '|' order by ${row})) as sum from ${table}`,
      );
      found[table] = { columns, sum: sums[0].sum };
    }
    return found;
  });
}

describe("a database with data", () => {
  // The first two make the tables and who may see them; nothing could be stored before.
  const earlier = journal.entries.slice(2).map(({ tag }, index) => [tag, index + 2] as const);

  test.each(earlier)("from before %s comes to this release with every row as it was, and takes new ones", async (_, count) => {
    const { owner, admin, drop } = await databaseAt(count);
    await withClient(admin, fillTeam);
    const before = await contents(admin);
    await migrate(owner);
    expect(await contents(admin, before)).toEqual(before);
    expect(Object.values(before).filter(({ sum }) => sum !== null).length).toBeGreaterThan(15);
    await withClient(admin, fillTeam);
    await drop();
  });

  test("that somebody reads for long is not held up: the migration gives up after five seconds and comes through later", async () => {
    const { owner, admin, drop } = await databaseAt(2);
    const schema = (client: { query: (text: string) => Promise<{ rows: unknown[] }> }) =>
      client.query("select tablename, policyname from pg_policies order by 1, 2");
    await withClient(admin, async (reader) => {
      await reader.query("begin");
      for (const table of await tables(admin)) await reader.query(`select 1 from ${table} limit 1`);
      const { rows: before } = await schema(reader);
      const began = performance.now();
      await expect(migrate(owner)).rejects.toMatchObject({ cause: { code: "55P03" } });
      expect(performance.now() - began).toBeLessThan(10_000);
      // Nobody waits behind it meanwhile or afterwards.
      await reader.query("commit");
      expect((await schema(reader)).rows).toEqual(before);
      await migrate(owner);
      expect((await schema(reader)).rows.length).toBeGreaterThan(before.length);
    });
    await drop();
  });
});

test("nothing but the stored migrations ever changes a schema, and no build does", () => {
  const { scripts } = JSON.parse(readFileSync("package.json", "utf8"));
  const commands = readdirSync("lib/commands", { recursive: true, encoding: "utf8" })
    .filter((file) => /\.(mjs|ts)$/.test(file))
    .map((file) => [file, readFileSync(join("lib/commands", file), "utf8")] as const);
  const said = [...Object.values(scripts), ...commands.map(([, text]) => text)].join("\n");
  expect(said).not.toMatch(/drizzle-kit (push|migrate)|db push|drizzle-kit["', ]+push/);
  const build = commands.find(([file]) => file === "build.mjs")?.[1] ?? "";
  expect(build).toContain("next");
  expect(build).not.toMatch(/migrat/i);
});
