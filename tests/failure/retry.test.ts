import { sql } from "drizzle-orm";
import { afterAll, describe, expect, test } from "vitest";
import { asVisitor, closePool, inTransaction, pool } from "@/db/client";
import { withRetries } from "@/db/with-retries";
import { withClient } from "@/lib/commands/databases.mjs";
import { newTeam } from "../helpers/people";
import { testDatabase } from "../helpers/test-database";

const { adminUrl } = await testDatabase();
afterAll(closePool);

const failing = (code: string, times: number) => {
  let calls = 0;
  const work = async () => {
    calls += 1;
    // As the query layer throws it: the driver's error is the cause of another.
    if (calls <= times) throw new Error("Failed query", { cause: Object.assign(new Error("refused"), { code }) });
    return "stored";
  };
  return { work, calls: () => calls };
};

describe("a transaction is tried again", () => {
  test.each(["40001", "40P01"])("after %s, up to four times in all", async (code) => {
    const mended = failing(code, 3);
    expect(await withRetries(mended.work)).toBe("stored");
    expect(mended.calls()).toBe(4);
    const hopeless = failing(code, 9);
    await expect(withRetries(hopeless.work)).rejects.toThrow("Failed query");
    expect(hopeless.calls()).toBe(4);
  });

  test.each(["23505", "57014", "57P01", "08006", "08003", "53300", "55P03", "25P03", "ECONNRESET", "40002", "40003"])(
    "never after %s, which may have stored something or will not pass",
    async (code) => {
      const work = failing(code, 1);
      await expect(withRetries(work.work)).rejects.toThrow("Failed query");
      expect(work.calls()).toBe(1);
    },
  );

  test("after a real deadlock, so that both come through", async () => {
    const [one, two] = [await newTeam(), await newTeam()];
    let tellBoth = () => {};
    const bothLocked = new Promise<void>((resolve) => {
      tellBoth = resolve;
    });
    let locked = 0;
    let runs = 0;
    const crossing = (own: string, other: string) =>
      asVisitor(async (tx) => {
        runs += 1;
        const lock = (id: string) => tx.execute(sql`select pg_advisory_xact_lock(hashtext(${id}))`);
        await lock(own);
        locked += 1;
        if (locked === 2) tellBoth();
        await bothLocked;
        await lock(other);
        return own;
      });
    const done = await Promise.all([crossing(one.teamId, two.teamId), crossing(two.teamId, one.teamId)]);
    expect(done).toEqual([one.teamId, two.teamId]);
    expect(runs).toBe(3);
  });
});

describe("the pool", () => {
  test("outlives the server's end of its connections, idle and in use, and none is lost", async () => {
    const team = await newTeam();
    const cut = () =>
      withClient(adminUrl, (client) =>
        client.query(
          "select pg_terminate_backend(pid) from pg_stat_activity where datname = current_database() and usename = 'gainwright_app'",
        ),
      );
    await Promise.all(Array.from({ length: 8 }, () => inTransaction(team, (tx) => tx.execute(sql`select pg_sleep(0.05)`))));
    /** The ends arrive as events of their own, a moment later. */
    const noticed = () => expect.poll(() => pool().totalCount, { timeout: 5_000 }).toBe(0);
    await cut();
    await noticed();
    const inUse = inTransaction(team, async (tx) => {
      await cut();
      await new Promise((resolve) => setTimeout(resolve, 50));
      return tx.execute(sql`select 1`);
    });
    await expect(inUse).rejects.toThrow();
    await noticed();
    for (let round = 0; round < 30; round++) await inTransaction(team, (tx) => tx.execute(sql`select 1`));
    expect(pool().totalCount - pool().idleCount).toBe(0);
  });

  test("keeps to its limits: a statement of ten seconds, fifteen idle in a transaction, two of waiting for a connection", async () => {
    const { rows } = await asVisitor((tx) =>
      tx.execute<{ statement: string; idle: string }>(
        sql`select current_setting('statement_timeout') as statement, current_setting('idle_in_transaction_session_timeout') as idle`,
      ),
    );
    expect(rows).toEqual([{ statement: "10s", idle: "15s" }]);
    const held = await Promise.all(Array.from({ length: 20 }, () => pool().connect()));
    const began = performance.now();
    await expect(asVisitor(async () => "never")).rejects.toThrow("timeout exceeded when trying to connect");
    expect(performance.now() - began).toBeLessThan(4_000);
    for (const client of held) client.release();
  });
});
