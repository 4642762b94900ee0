import "server-only";
import { z } from "zod";
import { DomainError } from "@/lib/errors";

const Place = z.tuple([z.string().max(200), z.uuid()]);

/** Opaque to callers: where the last page ended. */
export function toCursor(place: { value: string; id: string }): string {
  return Buffer.from(JSON.stringify([place.value, place.id])).toString("base64url");
}

/** @throws DomainError invalid, for a cursor this service did not make */
export function fromCursor(cursor: string | undefined): { value: string; id: string } | null {
  if (cursor === undefined) return null;
  try {
    const [value, id] = Place.parse(JSON.parse(Buffer.from(cursor, "base64url").toString("utf8")));
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
