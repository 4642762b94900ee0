import { customType, integer, timestamp, uuid } from "drizzle-orm/pg-core";

/** Spelled once, so that every table has the same key, the same kind of time and the same version. */
export const id = () => uuid("id").primaryKey().defaultRandom();
export const time = (name: string) => timestamp(name, { withTimezone: true, mode: "date" });
export const createdAt = () => time("created_at").notNull().defaultNow();
export const updatedAt = () => time("updated_at").notNull().defaultNow();
export const version = () => integer("version").notNull().default(1);

/** Little-endian Float64 columns, as bytes. */
export const bytes = customType<{ data: Buffer; driverData: Buffer }>({ dataType: () => "bytea" });
