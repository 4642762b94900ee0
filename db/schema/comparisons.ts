import { sql } from "drizzle-orm";
import { check, foreignKey, index, pgTable, text, uuid } from "drizzle-orm/pg-core";
import { createdAt, id, time, updatedAt, version } from "./columns";
import { memberships } from "./people";
import { plants } from "./plants";

/** A trigger holds `designRevisionIds` to two to six different revisions of this team's plant. */
export const comparisons = pgTable(
  "comparisons",
  {
    id: id(),
    teamId: uuid("team_id").notNull(),
    plantId: uuid("plant_id").notNull(),
    title: text("title").notNull(),
    note: text("note").notNull().default(""),
    designRevisionIds: uuid("design_revision_ids").array().notNull(),
    version: version(),
    archivedAt: time("archived_at"),
    createdBy: uuid("created_by").notNull(),
    createdAt: createdAt(),
    updatedAt: updatedAt(),
  },
  (table) => [
    foreignKey({
      name: "comparisons_plant",
      columns: [table.teamId, table.plantId],
      foreignColumns: [plants.teamId, plants.id],
    }),
    foreignKey({
      name: "comparisons_author",
      columns: [table.teamId, table.createdBy],
      foreignColumns: [memberships.teamId, memberships.userId],
    }),
    index("comparisons_by_time").on(table.teamId, table.plantId, table.createdAt, table.id),
    index("comparisons_of_team_by_time").on(table.teamId, table.createdAt, table.id),
    index("comparisons_author_index").on(table.teamId, table.createdBy),
    check("comparisons_title_length", sql`length(${table.title}) between 1 and 120`),
    check("comparisons_note_length", sql`length(${table.note}) <= 2000`),
    check("comparisons_two_to_six", sql`cardinality(${table.designRevisionIds}) between 2 and 6`),
  ],
);
