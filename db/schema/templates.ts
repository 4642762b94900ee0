import { sql } from "drizzle-orm";
import { check, index, integer, jsonb, pgTable, text, uuid } from "drizzle-orm/pg-core";
import type { TemplateContent } from "@/lib/schemas/template";
import { authorOf } from "./author";
import { id, kept } from "./columns";
import { teams } from "./people";

export const templates = pgTable(
  "templates",
  {
    id: id(),
    teamId: uuid("team_id")
      .notNull()
      .references(() => teams.id),
    name: text("name").notNull(),
    description: text("description").notNull().default(""),
    content: jsonb("content").$type<TemplateContent>().notNull(),
    openParameterCount: integer("open_parameter_count")
      .notNull()
      .generatedAlwaysAs(sql`jsonb_array_length(content -> 'openParameters')`),
    stateCount: integer("state_count").notNull().generatedAlwaysAs(sql`jsonb_array_length(content -> 'plant' -> 'states')`),
    ...kept(),
  },
  (table) => [
    ...authorOf("templates", table),
    index("templates_by_name").on(table.teamId, table.name, table.id),
    check("templates_name_length", sql`length(${table.name}) between 1 and 120`),
    check("templates_description_length", sql`length(${table.description}) <= 2000`),
  ],
);
