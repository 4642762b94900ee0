import { sql } from "drizzle-orm";
import { check, index, integer, pgTable, text, uuid } from "drizzle-orm/pg-core";
import { createdAt, id, time } from "./columns";
import { teams } from "./people";

/** Mail written with the change that causes it, sent later by a job. `teamId` is null for mail to a person as such. */
export const outbox = pgTable(
  "outbox",
  {
    id: id(),
    teamId: uuid("team_id").references(() => teams.id),
    recipient: text("recipient").notNull(),
    subject: text("subject").notNull(),
    text: text("text").notNull(),
    html: text("html").notNull(),
    createdAt: createdAt(),
    sentAt: time("sent_at"),
    attempts: integer("attempts").notNull().default(0),
    lastError: text("last_error"),
  },
  (table) => [
    index("outbox_by_time").on(table.teamId, table.createdAt, table.id),
    index("outbox_recipient").on(table.recipient),
    check("outbox_one_line_headers", sql`${table.recipient} !~ '[[:cntrl:]]' and ${table.subject} !~ '[[:cntrl:]]'`),
  ],
);
