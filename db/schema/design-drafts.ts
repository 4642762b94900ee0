import { sql } from "drizzle-orm";
import { check, foreignKey, index, integer, jsonb, pgTable, primaryKey, uuid } from "drizzle-orm/pg-core";
import { createdAt, time } from "./columns";
import { designRevisions, designs } from "./designs";
import { memberships } from "./people";
import { plantRevisions, plants } from "./plants";

/**
 * What one person has on the bench and not saved: at most one for each subject, which is a design, an older revision of it that is
 * edited on its own, or a new design of a plant. `mark` is chosen by the page with every write, so that no page writes over
 * what another one wrote since.
 */
export const designDrafts = pgTable(
  "design_drafts",
  {
    teamId: uuid("team_id").notNull(),
    userId: uuid("user_id").notNull(),
    subjectId: uuid("subject_id").notNull(),
    plantId: uuid("plant_id").notNull(),
    designId: uuid("design_id"),
    designRevisionId: uuid("design_revision_id"),
    plantRevisionId: uuid("plant_revision_id").notNull(),
    baseRevisionId: uuid("base_revision_id"),
    baseVersion: integer("base_version"),
    form: jsonb("form").$type<Record<string, unknown>>().notNull(),
    mark: uuid("mark").notNull(),
    createdAt: createdAt(),
    updatedAt: time("updated_at").notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.teamId, table.userId, table.subjectId] }),
    foreignKey({
      name: "design_drafts_member",
      columns: [table.teamId, table.userId],
      foreignColumns: [memberships.teamId, memberships.userId],
    }),
    foreignKey({
      name: "design_drafts_plant",
      columns: [table.teamId, table.plantId],
      foreignColumns: [plants.teamId, plants.id],
    }),
    foreignKey({
      name: "design_drafts_design",
      columns: [table.teamId, table.plantId, table.designId],
      foreignColumns: [designs.teamId, designs.plantId, designs.id],
    }),
    foreignKey({
      name: "design_drafts_design_revision",
      columns: [table.teamId, table.designRevisionId],
      foreignColumns: [designRevisions.teamId, designRevisions.id],
    }),
    foreignKey({
      name: "design_drafts_plant_revision",
      columns: [table.teamId, table.plantId, table.plantRevisionId],
      foreignColumns: [plantRevisions.teamId, plantRevisions.plantId, plantRevisions.id],
    }),
    foreignKey({
      name: "design_drafts_base_revision",
      columns: [table.teamId, table.baseRevisionId],
      foreignColumns: [designRevisions.teamId, designRevisions.id],
    }),
    index("design_drafts_design_index").on(table.teamId, table.plantId, table.designId),
    index("design_drafts_design_revision_index").on(table.teamId, table.designRevisionId),
    index("design_drafts_plant_revision_index").on(table.teamId, table.plantId, table.plantRevisionId),
    index("design_drafts_base_revision_index").on(table.teamId, table.baseRevisionId),
    index("design_drafts_age").on(table.updatedAt),
    check(
      "design_drafts_subject",
      sql`${table.subjectId} = coalesce(${table.designRevisionId}, ${table.designId}, ${table.plantId})`,
    ),
    check("design_drafts_base", sql`(${table.baseRevisionId} is null) = (${table.baseVersion} is null)`),
    check("design_drafts_form", sql`jsonb_typeof(${table.form}) = 'object' and octet_length(${table.form}::text) <= 1048576`),
  ],
);
