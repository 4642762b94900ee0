import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { z } from "zod";
import { closePool } from "@/db/client";
import type { DeclaredRoute } from "@/lib/api/route";
import { withClient } from "@/lib/commands/databases.mjs";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import type { PlantRevision, PlantSummary } from "@/lib/schemas/plant";
import { everyRoute, type Served, send } from "../helpers/every-route";
import { checksum } from "../helpers/fault-injection";
import { twoCarriages } from "../helpers/plant-content";
import { type Stock, stockedTeam } from "../helpers/stocked-team";
import { testDatabase } from "../helpers/test-database";

const { adminUrl } = await testDatabase();
let stock: Stock;
beforeAll(async () => {
  stock = await stockedTeam(adminUrl);
});
const freshLimits = () => withClient(adminUrl, (client) => client.query("delete from rate_limits"));
beforeEach(freshLimits);
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});

const PAYLOADS = [
  "'",
  "''",
  "' or '1'='1",
  "'); drop table plants; --",
  "1; select pg_sleep(5)",
  "x' union select id, name, email, password_hash from users --",
  '"; delete from plants; --',
  "\\'; select 1; --",
  "$1",
  "$$; select 1; $$",
  "%' and 1=cast((select version()) as int) and '%'='",
  "name desc; drop table plants",
  "{}'::jsonb",
  "a->>'b'",
  "E'\\x27'",
];

/** What reads may change: when somebody was last seen. */
const settled = async () => (await checksum(adminUrl)).replace(/^public\.(sessions|access_tokens) .*$/gm, "");

const reads = (await everyRoute()).filter(({ method, address }) => method === "GET" && /^\/api\/v1\/[a-z]/.test(address));
/** What a route reads from the query, and one name that none does. */
function namesOf({ handler }: Served): string[] {
  const query = "declaration" in handler ? (handler as DeclaredRoute).declaration.query : undefined;
  return [...(query instanceof z.ZodObject ? Object.keys(query.shape) : []), "other"];
}

describe("in a query or an address, a statement is text that finds nothing and changes nothing", () => {
  test.each(reads)("$name", async (route) => {
    const before = await settled();
    for (const payload of PAYLOADS) {
      await freshLimits();
      for (const name of namesOf(route)) {
        const query = `?${name}=${encodeURIComponent(payload)}`;
        const response = await send(route, stock, stock.api.headers, { query });
        const at = `${query} was answered ${response.status}`;
        expect(response.status, at).toBeLessThan(500);
        if (response.status < 300) expect(name, at).toBe("search");
      }
      if (!route.address.includes("{")) continue;
      const ids = Object.fromEntries(Object.keys(stock.idsIn(route.address)).map((name) => [name, payload]));
      expect((await send(route, stock, stock.api.headers, { ids })).status, payload).toBe(404);
    }
    expect(await settled()).toBe(before);
  });
});

test("a search for a statement finds the plant that is called so, and no other", async () => {
  for (const name of PAYLOADS.filter((payload) => payload.length > 3)) {
    const plant = await stock.api.post<PlantSummary>("/api/v1/plants", { name, content: twoCarriages() });
    const path = `/api/v1/plants?search=${encodeURIComponent(name)}`;
    const { items } = await stock.api.get<{ items: PlantSummary[] }>(path);
    expect(items.map(({ id, name }) => [id, name])).toEqual([[plant.id, name]]);
  }
});

test("statements in every text of a plant are stored and given back letter by letter", async () => {
  const [one, two, three] = ["x'); drop table plants;--", "'||(select 1)||'", '";delete from users;'];
  const typed = twoCarriages();
  const content = {
    ...typed,
    source: PAYLOADS.join("\n"),
    axes: [{ name: one, tag: "';--" }, typed.axes[1]],
    states: [{ ...typed.states[0], name: two, unit: "'; --" }, ...typed.states.slice(1)],
    parameters: typed.parameters.map((parameter) => ({ ...parameter, note: three })),
  };
  const plant = await stock.api.post<PlantSummary>("/api/v1/plants", { name: "Texts", content, note: PAYLOADS.join(" ") });
  const path = `/api/v1/plants/${plant.id}/revisions/${plant.currentRevision.id}`;
  const stored = await stock.api.get<PlantRevision>(path);
  expect(stored.content).toEqual(content);
  expect(stored.note).toBe(PAYLOADS.join(" "));
});

test("no statement in the sources is put together from text", () => {
  const root = process.cwd();
  const sources = ["db", "lib/services", "lib/jobs", "lib/mail"].flatMap((folder) =>
    readdirSync(join(root, folder), { recursive: true, encoding: "utf8" })
      .filter((file) => file.endsWith(".ts") && file !== "migrate.ts") // the owner's, and nothing of a request reaches it
      .map((file) => join(root, folder, file)),
  );
  expect(sources.length).toBeGreaterThan(50);
  for (const file of sources) expect(readFileSync(file, "utf8"), file).not.toMatch(/sql\.raw|\.query\(\s*`[^`]*\$\{/);
});
