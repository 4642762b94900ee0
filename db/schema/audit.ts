import { sql } from "drizzle-orm";
import { check, foreignKey, index, integer, jsonb, pgTable, text, uuid } from "drizzle-orm/pg-core";
import { id, time } from "./columns";
import { memberships, teams } from "./people";

/** Who did what, when, to which revision, in which request. The app role may insert and read, nothing else. */
export const auditEvents = pgTable(
  "audit_events",
  {
    id: id(),
    teamId: uuid("team_id")
      .notNull()
      .references(() => teams.id),
    actorId: uuid("actor_id"),
    kind: text("kind").notNull(),
    subjectType: text("subject_type").notNull(),
    subjectId: uuid("subject_id"),
    revision: integer("revision"),
    requestId: text("request_id").notNull(),
    data: jsonb("data").$type<Record<string, unknown>>().notNull().default({}),
    at: time("at").notNull().default(sql`clock_timestamp()`),
  },
  (table) => [
    foreignKey({
      name: "audit_events_actor",
      columns: [table.teamId, table.actorId],
      foreignColumns: [memberships.teamId, memberships.userId],
    }),
    index("audit_events_by_time").on(table.teamId, table.at, table.id),
    index("audit_events_actor_index").on(table.teamId, table.actorId),
    check("audit_events_kind", sql`${table.kind} ~ '^[a-z][a-z-]*[.][a-z-]+$'`),
  ],
);
