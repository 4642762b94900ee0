import "server-only";
import { AsyncLocalStorage } from "node:async_hooks";
import { sql } from "drizzle-orm";
import { drizzle, type NodePgDatabase, type NodePgQueryResultHKT } from "drizzle-orm/node-postgres";
import type { PgDatabase } from "drizzle-orm/pg-core";
import pg from "pg";
import { env } from "@/lib/env";
import { withRetries } from "./with-retries";

/** What a query takes: the transaction it runs in. */
export type Db = PgDatabase<NodePgQueryResultHKT, Record<string, never>>;

/** The settings that row security reads; see the migration `row-security`. Each ends with its transaction. */
export type Settings = {
  readonly team_id?: string;
  readonly user_id?: string;
  readonly email?: string;
  readonly secret_hash?: string;
  readonly outbox_id?: string;
  readonly outbox_open?: "on";
  readonly sweeping?: "on";
};

// One pool per process, also across the hot reloads of development, which evaluate this module anew.
const kept = globalThis as typeof globalThis & { gainwrightPool?: pg.Pool };

/** Made on first use, since a build imports every route without a database. */
export function pool(): pg.Pool {
  if (kept.gainwrightPool) return kept.gainwrightPool;
  const made = new pg.Pool({
    connectionString: env().DATABASE_URL,
    max: 20,
    connectionTimeoutMillis: 2_000,
    statement_timeout: 10_000,
    idle_in_transaction_session_timeout: 15_000,
    keepAlive: true,
  });
  // An idle connection that breaks (a restart of the database) is dropped by the pool; without a listener it ends the process.
  made.on("error", ignore);
  kept.gainwrightPool = made;
  return made;
}

export async function closePool(): Promise<void> {
  const open = kept.gainwrightPool;
  kept.gainwrightPool = undefined;
  await open?.end();
}

/** Adopts further settings inside a running transaction, once they are proved (a secret found its row, a password matched). */
export async function adopt(tx: Db, settings: Settings): Promise<void> {
  const parts = Object.entries(settings).map(([name, value]) => sql`set_config(${`app.${name}`}, ${value}, true)`);
  if (parts.length > 0) await tx.execute(sql`select ${sql.join(parts, sql`, `)}`);
}

export type Who = { readonly teamId: string; readonly userId: string };

/** Work for a team and a person: all of it or nothing, again only where PostgreSQL itself asks for it. */
export function inTransaction<T>(who: Who, work: (tx: Db) => Promise<T>): Promise<T> {
  const whole = wholes.getStore();
  if (whole?.teamId === who.teamId && whole.userId === who.userId) return whole.tx.transaction(work);
  return transact({ team_id: who.teamId, user_id: who.userId }, work);
}

const wholes = new AsyncLocalStorage<Who & { readonly tx: Db }>();

/**
 * Like `inTransaction`; whatever the same person does through `inTransaction` inside `work` becomes part of it, as a savepoint.
 * So a verb and what is remembered about it are stored together or not at all.
 */
export function inOneTransaction<T>(who: Who, work: (tx: Db) => Promise<T>): Promise<T> {
  const { teamId, userId } = who;
  return inTransaction(who, (tx) => wholes.run({ teamId, userId, tx }, () => work(tx)));
}

/** Work before anybody is known (sign-in, a link from a mail, a job): sees only what `settings` open, nothing by default. */
export function asVisitor<T>(work: (tx: Db) => Promise<T>, settings: Settings = {}): Promise<T> {
  return transact(settings, work);
}

function transact<T>(settings: Settings, work: (tx: Db) => Promise<T>): Promise<T> {
  return withRetries(() =>
    onConnection((database) =>
      database.transaction(async (tx) => {
        await adopt(tx, settings);
        return work(tx);
      }),
    ),
  );
}

/**
 * The connection is taken here and not by the query builder, which does not give one back when its BEGIN fails: twenty such
 * moments, as a restarting database causes them, would use up the pool for good.
 */
async function onConnection<T>(work: (database: NodePgDatabase) => Promise<T>): Promise<T> {
  const client = await pool().connect();
  // A server that goes away between two statements is told to this listener; without one it ends the process.
  client.on("error", ignore);
  let clean = false;
  try {
    const result = await work(drizzle(client));
    clean = true;
    return result;
  } catch (error) {
    clean = await client.query("rollback").then(
      () => true,
      () => false,
    );
    throw error;
  } finally {
    client.off("error", ignore);
    client.release(!clean);
  }
}

const ignore = () => undefined;
