import { sql } from "drizzle-orm";
import { check, foreignKey, index, integer, jsonb, pgTable, text, unique, uuid } from "drizzle-orm/pg-core";
import type { ObserverRecipe, Recipe } from "@/control/design/recipe";
import { authorOf } from "./author";
import { id, kept, remarked } from "./columns";
import { plantRevisions, plants } from "./plants";

export const designs = pgTable(
  "designs",
  {
    id: id(),
    teamId: uuid("team_id").notNull(),
    plantId: uuid("plant_id").notNull(),
    name: text("name").notNull(),
    currentRevision: integer("current_revision").notNull().default(1),
    ...kept(),
  },
  (table) => [
    unique("designs_team_id").on(table.teamId, table.plantId, table.id),
    foreignKey({
      name: "designs_plant",
      columns: [table.teamId, table.plantId],
      foreignColumns: [plants.teamId, plants.id],
    }),
    ...authorOf("designs", table),
    index("designs_by_update").on(table.teamId, table.plantId, table.updatedAt, table.id),
    check("designs_name_length", sql`length(${table.name}) between 1 and 120`),
    check("designs_version", sql`${table.version} >= 1 and ${table.currentRevision} >= 1`),
  ],
);

/** Immutable. `plantId` stands here too, so that the pinned plant revision can only be one of the design's own plant. */
export const designRevisions = pgTable(
  "design_revisions",
  {
    id: id(),
    teamId: uuid("team_id").notNull(),
    plantId: uuid("plant_id").notNull(),
    designId: uuid("design_id").notNull(),
    number: integer("number").notNull(),
    plantRevisionId: uuid("plant_revision_id").notNull(),
    recipe: jsonb("recipe").$type<Recipe>().notNull(),
    method: text("method").$type<Recipe["method"]>().notNull().generatedAlwaysAs(sql`recipe ->> 'method'`),
    observerKind: text("observer_kind")
      .$type<ObserverRecipe["kind"]>()
      .notNull()
      .generatedAlwaysAs(sql`recipe -> 'observer' ->> 'kind'`),
    methodVersion: text("method_version").notNull(),
    ...remarked(),
  },
  (table) => [
    unique("design_revisions_number").on(table.designId, table.number),
    unique("design_revisions_team_id").on(table.teamId, table.id),
    foreignKey({
      name: "design_revisions_design",
      columns: [table.teamId, table.plantId, table.designId],
      foreignColumns: [designs.teamId, designs.plantId, designs.id],
    }),
    foreignKey({
      name: "design_revisions_plant_revision",
      columns: [table.teamId, table.plantId, table.plantRevisionId],
      foreignColumns: [plantRevisions.teamId, plantRevisions.plantId, plantRevisions.id],
    }),
    ...authorOf("design_revisions", table),
    index("design_revisions_design_index").on(table.teamId, table.plantId, table.designId),
    index("design_revisions_plant_revision_index").on(table.teamId, table.plantId, table.plantRevisionId),
    check("design_revisions_number_positive", sql`${table.number} >= 1`),
    check("design_revisions_note_length", sql`length(${table.note}) <= 2000`),
  ],
);
