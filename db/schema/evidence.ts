import { sql } from "drizzle-orm";
import {
  type AnyPgColumn,
  check,
  doublePrecision,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  text,
  unique,
  uuid,
} from "drizzle-orm/pg-core";
import type { ResponseEvidence, ResponseRecord } from "@/control/design/evidence";
import { bytes, createdAt, id } from "./columns";
import { designRevisions } from "./designs";

type OfRevision = { readonly teamId: AnyPgColumn; readonly designRevisionId: AnyPgColumn };

const revisionOf = (name: string, { teamId, designRevisionId }: OfRevision) => [
  foreignKey({
    name: `${name}_design_revision`,
    columns: [teamId, designRevisionId],
    foreignColumns: [designRevisions.teamId, designRevisions.id],
  }),
  index(`${name}_design_revision_index`).on(teamId, designRevisionId),
];

/** One row per part, so that later parts are added without touching earlier ones. Immutable. */
export const evidence = pgTable(
  "evidence",
  {
    id: id(),
    teamId: uuid("team_id").notNull(),
    designRevisionId: uuid("design_revision_id").notNull(),
    part: text("part").notNull(),
    state: text("state").$type<"computed" | "running" | "refused">().notNull(),
    content: jsonb("content").$type<unknown>().notNull(),
    summary: jsonb("summary")
      .$type<ResponseEvidence["summary"]>()
      .generatedAlwaysAs(sql`case when part = 'responses' and state = 'computed' then content -> 'summary' end`),
    createdAt: createdAt(),
  },
  (table) => [
    unique("evidence_part").on(table.designRevisionId, table.part),
    ...revisionOf("evidence", table),
    check("evidence_state", sql`${table.state} in ('computed', 'running', 'refused')`),
    check("evidence_part_name", sql`${table.part} ~ '^[a-z][a-z-]{0,39}$'`),
  ],
);

const finite = (column: unknown) => sql`${column} > '-Infinity' and ${column} < 'Infinity'`;

/** The curves, as they left the core: row-major Float64, little-endian. Immutable. */
export const responseRecords = pgTable(
  "response_records",
  {
    id: id(),
    teamId: uuid("team_id").notNull(),
    designRevisionId: uuid("design_revision_id").notNull(),
    position: integer("position").notNull(),
    kind: text("kind").$type<ResponseRecord["kind"]>().notNull(),
    loop: text("loop").$type<ResponseRecord["loop"]>().notNull(),
    source: integer("source").notNull(),
    amplitude: doublePrecision("amplitude").notNull(),
    samples: integer("samples").notNull(),
    step: doublePrecision("step").notNull(),
    values: bytes("values").notNull(),
  },
  (table) => [
    unique("response_records_position").on(table.designRevisionId, table.position),
    ...revisionOf("response_records", table),
    check("response_records_kind", sql`${table.kind} in ('step', 'initial', 'disturbance')`),
    check("response_records_loop", sql`${table.loop} in ('full-state', 'observer')`),
    check("response_records_counts", sql`${table.position} >= 0 and ${table.source} >= 0 and ${table.samples} >= 1`),
    check("response_records_finite", sql`${finite(table.amplitude)} and ${finite(table.step)} and ${table.step} > 0`),
    check("response_records_whole", sql`octet_length(${table.values}) % (8 * ${table.samples}) = 0`),
  ],
);
