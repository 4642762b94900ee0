import "server-only";
import { sql } from "drizzle-orm";
import { asVisitor } from "@/db/client";

const PATIENCE_MS = 4_000;

/** Whether one query comes back in time; a stalled database counts as away. */
export async function databaseAnswers(): Promise<boolean> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<false>((resolve) => {
    timer = setTimeout(() => resolve(false), PATIENCE_MS);
  });
  const answer = asVisitor((tx) => tx.execute(sql`select 1`)).then(
    () => true,
    () => false,
  );
  return Promise.race([answer, late]).finally(() => clearTimeout(timer));
}
