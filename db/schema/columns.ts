import { customType, integer, text, timestamp, uuid } from "drizzle-orm/pg-core";

/** Spelled once, so that every table has the same key, the same kind of time and the same version. */
export const id = () => uuid("id").primaryKey().defaultRandom();
export const time = (name: string) => timestamp(name, { withTimezone: true, mode: "date" });
export const createdAt = () => time("created_at").notNull().defaultNow();
const updatedAt = () => time("updated_at").notNull().defaultNow();
const version = () => integer("version").notNull().default(1);
const createdBy = () => uuid("created_by").notNull();

/** Of what a team keeps: changed from a version, archived and never deleted. */
export const kept = () => ({
  version: version(),
  archivedAt: time("archived_at"),
  createdBy: createdBy(),
  createdAt: createdAt(),
  updatedAt: updatedAt(),
});

/** Of an immutable revision: what its author said of it. */
export const remarked = () => ({ note: text("note").notNull().default(""), createdBy: createdBy(), createdAt: createdAt() });

/** Little-endian Float64 columns, as bytes. */
export const bytes = customType<{ data: Buffer; driverData: Buffer }>({ dataType: () => "bytea" });
