import { sql } from "drizzle-orm";
import { check, index, pgTable, primaryKey, text, uuid } from "drizzle-orm/pg-core";
import type { Role } from "@/lib/schemas/team";
import { createdAt, id, time } from "./columns";

export const users = pgTable(
  "users",
  {
    id: id(),
    email: text("email").notNull().unique(),
    name: text("name").notNull(),
    passwordHash: text("password_hash").notNull(),
    createdAt: createdAt(),
  },
  (table) => [
    check("users_email_is_lower_case", sql`${table.email} = lower(${table.email})`),
    check("users_email_length", sql`length(${table.email}) between 3 and 254`),
    check("users_name_length", sql`length(${table.name}) between 1 and 120`),
  ],
);

export const teams = pgTable("teams", { id: id(), name: text("name").notNull(), createdAt: createdAt() }, (table) => [
  check("teams_name_length", sql`length(${table.name}) between 1 and 120`),
]);

/** A removed member's row stays, so that authors of old revisions keep their name and every author once was a member. */
export const memberships = pgTable(
  "memberships",
  {
    teamId: uuid("team_id")
      .notNull()
      .references(() => teams.id),
    userId: uuid("user_id")
      .notNull()
      .references(() => users.id),
    role: text("role").$type<Role>().notNull(),
    createdAt: createdAt(),
    removedAt: time("removed_at"),
  },
  (table) => [
    primaryKey({ columns: [table.teamId, table.userId] }),
    index("memberships_user").on(table.userId),
    check("memberships_role", sql`${table.role} in ('lead', 'engineer', 'reviewer')`),
  ],
);
