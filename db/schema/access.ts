import { sql } from "drizzle-orm";
import { check, foreignKey, index, pgTable, text, uuid } from "drizzle-orm/pg-core";
import type { Role, Scope } from "@/lib/schemas/team";
import { createdAt, id, time } from "./columns";
import { memberships, teams, users } from "./people";

/** `teamId` is the team the person works in now; null while they belong to none. */
export const sessions = pgTable(
  "sessions",
  {
    id: id(),
    userId: uuid("user_id")
      .notNull()
      .references(() => users.id),
    teamId: uuid("team_id"),
    createdAt: createdAt(),
    lastSeenAt: time("last_seen_at").notNull().defaultNow(),
    expiresAt: time("expires_at").notNull(),
    revokedAt: time("revoked_at"),
  },
  (table) => [
    foreignKey({
      name: "sessions_member",
      columns: [table.teamId, table.userId],
      foreignColumns: [memberships.teamId, memberships.userId],
    }),
    index("sessions_user").on(table.userId),
    index("sessions_member_index").on(table.teamId, table.userId),
  ],
);

/** The secret itself goes out by mail and is stored nowhere: only its SHA-256, in hex. */
export const invitations = pgTable(
  "invitations",
  {
    id: id(),
    teamId: uuid("team_id")
      .notNull()
      .references(() => teams.id),
    invitedBy: uuid("invited_by").notNull(),
    email: text("email").notNull(),
    role: text("role").$type<Role>().notNull(),
    tokenHash: text("token_hash").notNull().unique(),
    createdAt: createdAt(),
    expiresAt: time("expires_at").notNull(),
    acceptedAt: time("accepted_at"),
    withdrawnAt: time("withdrawn_at"),
  },
  (table) => [
    foreignKey({
      name: "invitations_inviter",
      columns: [table.teamId, table.invitedBy],
      foreignColumns: [memberships.teamId, memberships.userId],
    }),
    index("invitations_team").on(table.teamId, table.createdAt, table.id),
    index("invitations_inviter_index").on(table.teamId, table.invitedBy),
    check("invitations_email_is_lower_case", sql`${table.email} = lower(${table.email})`),
    check("invitations_role", sql`${table.role} in ('lead', 'engineer', 'reviewer')`),
    check("invitations_token_hash", sql`${table.tokenHash} ~ '^[0-9a-f]{64}$'`),
  ],
);

export const passwordResets = pgTable(
  "password_resets",
  {
    id: id(),
    userId: uuid("user_id")
      .notNull()
      .references(() => users.id),
    tokenHash: text("token_hash").notNull().unique(),
    createdAt: createdAt(),
    expiresAt: time("expires_at").notNull(),
    usedAt: time("used_at"),
  },
  (table) => [
    index("password_resets_user").on(table.userId),
    check("password_resets_token_hash", sql`${table.tokenHash} ~ '^[0-9a-f]{64}$'`),
    check("password_resets_one_hour", sql`${table.expiresAt} <= ${table.createdAt} + interval '60 minutes'`),
  ],
);

export const accessTokens = pgTable(
  "access_tokens",
  {
    id: id(),
    teamId: uuid("team_id").notNull(),
    userId: uuid("user_id").notNull(),
    name: text("name").notNull(),
    tokenHash: text("token_hash").notNull().unique(),
    scope: text("scope").$type<Scope>().notNull(),
    createdAt: createdAt(),
    expiresAt: time("expires_at").notNull(),
    lastUsedAt: time("last_used_at"),
    revokedAt: time("revoked_at"),
  },
  (table) => [
    foreignKey({
      name: "access_tokens_member",
      columns: [table.teamId, table.userId],
      foreignColumns: [memberships.teamId, memberships.userId],
    }),
    index("access_tokens_member_index").on(table.teamId, table.userId),
    check("access_tokens_scope", sql`${table.scope} in ('read', 'write')`),
    check("access_tokens_name_length", sql`length(${table.name}) between 1 and 120`),
    check("access_tokens_token_hash", sql`${table.tokenHash} ~ '^[0-9a-f]{64}$'`),
  ],
);
