import "server-only";
import { z } from "zod";
import { DomainError } from "@/lib/errors";

/** What a list is ordered by: a text, a time in microseconds since 1970, or the number of a revision. */
export type CursorKind = "text" | "time" | "number";

// Whatever passes here is a value that the database can compare with: a cursor is the caller's word like everything else.
const VALUES: Readonly<Record<CursorKind, z.ZodType<string>>> = {
  text: z.string().max(200),
  time: z.string().regex(/^\d{1,16}$/),
  number: z.string().regex(/^\d{1,9}$/),
};

/** Opaque to callers: where the last page ended. */
export function toCursor(place: { value: string; id: string }): string {
  return Buffer.from(JSON.stringify([place.value, place.id])).toString("base64url");
}

/** @throws DomainError invalid, for a cursor that does not come from a list ordered like this one */
export function fromCursor(cursor: string | undefined, kind: CursorKind): { value: string; id: string } | null {
  if (cursor === undefined) return null;
  try {
    const place = z.tuple([VALUES[kind], z.uuid()]);
    const [value, id] = place.parse(JSON.parse(Buffer.from(cursor, "base64url").toString("utf8")));
    return { value, id };
  } catch {
    throw new DomainError("invalid", "The place to continue from is not one of ours", {}, [
      { pointer: "/cursor", detail: "Take nextCursor of the page before, unchanged" },
    ]);
  }
}

/** One row more than asked for was read: its presence says that there is a next page. */
export function toPage<Row, Item>(
  rows: readonly Row[],
  limit: number,
  place: (row: Row) => { value: string; id: string },
  item: (row: Row) => Item,
) {
  const shown = rows.slice(0, limit);
  const last = shown.at(-1);
  return { items: shown.map(item), nextCursor: rows.length > limit && last !== undefined ? toCursor(place(last)) : null };
}
