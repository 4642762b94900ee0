import { sql } from "drizzle-orm";
import { bigint, check, foreignKey, index, integer, jsonb, pgTable, primaryKey, text, uuid, varchar } from "drizzle-orm/pg-core";
import { createdAt } from "./columns";
import { memberships } from "./people";

/** `status` is null while the first request with this key is still running. */
export const idempotencyKeys = pgTable(
  "idempotency_keys",
  {
    teamId: uuid("team_id").notNull(),
    userId: uuid("user_id").notNull(),
    route: text("route").notNull(),
    key: text("key").notNull(),
    bodyHash: text("body_hash").notNull(),
    status: integer("status"),
    reply: jsonb("reply").$type<unknown>(),
    createdAt: createdAt(),
  },
  (table) => [
    primaryKey({ columns: [table.teamId, table.userId, table.route, table.key] }),
    foreignKey({
      name: "idempotency_keys_member",
      columns: [table.teamId, table.userId],
      foreignColumns: [memberships.teamId, memberships.userId],
    }),
    index("idempotency_keys_age").on(table.createdAt),
    check("idempotency_keys_key_length", sql`length(${table.key}) between 1 and 255`),
  ],
);

/** Shape fixed by the rate limiter. Keys are hashed before they come here, so no address or mail stands in it. */
export const rateLimits = pgTable(
  "rate_limits",
  {
    key: varchar("key", { length: 255 }).primaryKey(),
    points: integer("points").notNull().default(0),
    expire: bigint("expire", { mode: "number" }),
  },
  (table) => [index("rate_limits_expire").on(table.expire)],
);
