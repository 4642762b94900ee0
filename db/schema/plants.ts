import { sql } from "drizzle-orm";
import { check, foreignKey, index, integer, jsonb, pgTable, text, unique, uuid } from "drizzle-orm/pg-core";
import type { Criterion } from "@/control/design/criteria";
import type { PlantModel } from "@/control/plant/model";
import type { PlantContent } from "@/lib/schemas/plant";
import { authorOf } from "./author";
import { id, kept, remarked } from "./columns";
import { teams } from "./people";

export const plants = pgTable(
  "plants",
  {
    id: id(),
    teamId: uuid("team_id")
      .notNull()
      .references(() => teams.id),
    name: text("name").notNull(),
    currentRevision: integer("current_revision").notNull().default(1),
    /** Of the plant, not of a revision: a limit that is drawn tighter holds for every design there is. */
    criteria: jsonb("criteria").$type<Criterion[]>().notNull().default([]),
    ...kept(),
  },
  (table) => [
    unique("plants_team_id").on(table.teamId, table.id),
    ...authorOf("plants", table),
    index("plants_by_update").on(table.teamId, table.updatedAt, table.id),
    index("plants_by_name").on(table.teamId, table.name, table.id),
    check("plants_name_length", sql`length(${table.name}) between 1 and 120`),
    check("plants_criteria_list", sql`jsonb_typeof(${table.criteria}) = 'array'`),
    check("plants_version", sql`${table.version} >= 1 and ${table.currentRevision} >= 1`),
  ],
);

/**
 * Immutable: what was typed, and the doubles it was evaluated to, which are the plant. The generated columns are what lists
 * show: taking it out of a large document costs milliseconds a row.
 */
export const plantRevisions = pgTable(
  "plant_revisions",
  {
    id: id(),
    teamId: uuid("team_id").notNull(),
    plantId: uuid("plant_id").notNull(),
    number: integer("number").notNull(),
    content: jsonb("content").$type<PlantContent>().notNull(),
    model: jsonb("model").$type<PlantModel>().notNull(),
    axes: jsonb("axes").$type<PlantModel["axes"]>().notNull().generatedAlwaysAs(sql`model -> 'axes'`),
    timeBase: jsonb("time_base").$type<PlantModel["timeBase"]>().notNull().generatedAlwaysAs(sql`model -> 'timeBase'`),
    stateCount: integer("state_count").notNull().generatedAlwaysAs(sql`jsonb_array_length(model -> 'states')`),
    inputCount: integer("input_count").notNull().generatedAlwaysAs(sql`jsonb_array_length(model -> 'inputs')`),
    outputCount: integer("output_count").notNull().generatedAlwaysAs(sql`jsonb_array_length(model -> 'outputs')`),
    ...remarked(),
  },
  (table) => [
    unique("plant_revisions_number").on(table.plantId, table.number),
    unique("plant_revisions_team_id").on(table.teamId, table.plantId, table.id),
    foreignKey({
      name: "plant_revisions_plant",
      columns: [table.teamId, table.plantId],
      foreignColumns: [plants.teamId, plants.id],
    }),
    ...authorOf("plant_revisions", table),
    check("plant_revisions_number_positive", sql`${table.number} >= 1`),
    check("plant_revisions_note_length", sql`length(${table.note}) <= 2000`),
  ],
);
