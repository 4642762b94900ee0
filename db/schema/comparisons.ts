import { sql } from "drizzle-orm";
import { check, foreignKey, index, pgTable, text, uuid } from "drizzle-orm/pg-core";
import { authorOf } from "./author";
import { id, kept } from "./columns";
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
    ...kept(),
  },
  (table) => [
    foreignKey({
      name: "comparisons_plant",
      columns: [table.teamId, table.plantId],
      foreignColumns: [plants.teamId, plants.id],
    }),
    ...authorOf("comparisons", table),
    index("comparisons_by_time").on(table.teamId, table.plantId, table.createdAt, table.id),
    index("comparisons_of_team_by_time").on(table.teamId, table.createdAt, table.id),
    check("comparisons_title_length", sql`length(${table.title}) between 1 and 120`),
    check("comparisons_note_length", sql`length(${table.note}) <= 2000`),
    check("comparisons_two_to_six", sql`cardinality(${table.designRevisionIds}) between 2 and 6`),
  ],
);
