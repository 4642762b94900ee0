import "server-only";
import { type SQL, sql } from "drizzle-orm";
import type { PgColumn } from "drizzle-orm/pg-core";

/** Where a page ended: the sort value, a time in microseconds since 1970, and the key that breaks ties. */
export type Keyset = { readonly value: string; readonly id: string };

export type Order = {
  readonly by: PgColumn;
  readonly id: PgColumn;
  readonly type: "timestamptz" | "text";
  readonly descending: boolean;
};

export const sortValue = ({ by, type }: Order) =>
  type === "text" ? sql<string>`${by}` : sql<string>`(extract(epoch from ${by}) * 1000000)::bigint::text`;

export function after({ by, id, type, descending }: Order, place: Keyset | null): SQL | undefined {
  if (!place) return undefined;
  const value =
    type === "text" ? sql`${place.value}::text` : sql`timestamptz 'epoch' + ${place.value}::bigint * interval '1 microsecond'`;
  const from = sql`(${value}, ${place.id}::uuid)`;
  return descending ? sql`(${by}, ${id}) < ${from}` : sql`(${by}, ${id}) > ${from}`;
}

export function ordered({ by, id, descending }: Order): SQL[] {
  return descending ? [sql`${by} desc`, sql`${id} desc`] : [sql`${by} asc`, sql`${id} asc`];
}

/** A typed % or _ must look for itself. */
export const literalLike = (text: string) => `%${text.replace(/[\\%_]/g, (sign) => `\\${sign}`)}%`;
