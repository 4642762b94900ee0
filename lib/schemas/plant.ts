import { z } from "zod";
import type { PlantContent as Content } from "@/control/plant/content";
import { SIZE_LIMITS } from "@/control/plant/model";
import {
  AxisTag,
  Finite,
  Id,
  inUnit,
  Name,
  OwnUnit,
  PageQuery,
  Positive,
  Remark,
  Rows,
  SignalName,
  Timestamp,
  Unit,
  Version,
} from "./common";
import { Criteria } from "./criteria";

export const TimeBase = z.discriminatedUnion("kind", [
  z.strictObject({ kind: z.literal("continuous") }),
  z.strictObject({ kind: z.literal("sampled"), period: inUnit(Positive, "in seconds") }),
]);

/** The length limit comes before any parsing: a deep expression must never reach the parser. */
const Entry = z.string().max(200, "An entry has at most 200 characters");
const entries = (rows: number, columns: number) => z.array(z.array(Entry).max(columns)).max(rows);

const AxisIndex = z.int().min(0).max(19).nullable();
const signal = { name: SignalName, unit: Unit, axis: AxisIndex };
const own = inUnit(Finite, OwnUnit);
const maybeOwn = inUnit(Finite.nullable(), OwnUnit);
const scaled = { ...signal, scale: inUnit(Positive.nullable(), OwnUnit) };
const { states, inputs, outputs, commanded, disturbances } = SIZE_LIMITS;

const OperatingPoint = z.strictObject({
  states: inUnit(z.array(Finite).max(states), "each in the unit of its state"),
  inputs: inUnit(z.array(Finite).max(inputs), "each in the unit of its input"),
  outputs: inUnit(z.array(Finite).max(outputs), "each in the unit of its output"),
});

/** Bounds and types only. Shapes, names, units and expressions are judged by `evaluatePlant`, alike in browser and server. */
export const PlantContent = z.strictObject({
  version: z.literal(1),
  timeBase: TimeBase,
  axes: z.array(z.strictObject({ name: SignalName, tag: AxisTag })).max(20),
  parameters: z
    .array(z.strictObject({ name: z.string().trim().max(40), expression: Entry, unit: Unit, note: z.string().trim().max(200) }))
    .max(64, "At most 64 parameters"),
  states: z.array(z.strictObject(scaled)).min(1, "A plant needs at least one state").max(states, `At most ${states} states`),
  inputs: z
    .array(z.strictObject({ ...scaled, lower: maybeOwn, upper: maybeOwn }))
    .min(1, "A plant needs at least one input")
    .max(inputs, `At most ${inputs} inputs`),
  outputs: z.array(z.strictObject(scaled)).max(outputs, `At most ${outputs} outputs`),
  disturbances: z.array(z.strictObject(scaled)).max(disturbances),
  commanded: z
    .array(z.strictObject({ ...signal, amplitude: own }))
    .max(commanded, `At most ${commanded} commanded quantities`)
    .nullable(),
  A: entries(states, states),
  B: entries(states, inputs),
  C: entries(outputs, states),
  D: entries(outputs, inputs).nullable(),
  E: entries(states, disturbances).nullable(),
  H: entries(commanded, states).nullable(),
  J: entries(commanded, inputs).nullable(),
  operatingPoint: OperatingPoint.nullable(),
  source: Remark,
}) satisfies z.ZodType<Content>;
export type PlantContent = z.infer<typeof PlantContent>;

const RATIOS = "unit of the row's signal over unit of the column's signal";
const RATES = `${RATIOS}, per second; of a sampled plant per step`;
const ModelSignal = z.strictObject(signal);
/** The evaluated doubles: they are the plant, everything is computed from them. */
export const PlantModel = z.strictObject({
  timeBase: TimeBase,
  axes: z.array(z.strictObject({ name: z.string(), tag: z.string() })),
  states: z.array(ModelSignal.extend({ scale: maybeOwn })),
  inputs: z.array(ModelSignal.extend({ scale: maybeOwn, lower: maybeOwn, upper: maybeOwn })),
  outputs: z.array(ModelSignal.extend({ scale: maybeOwn })),
  disturbances: z.array(ModelSignal.extend({ scale: maybeOwn })),
  commanded: z.array(ModelSignal.extend({ amplitude: own })),
  A: inUnit(Rows, RATES),
  B: inUnit(Rows, RATES),
  C: inUnit(Rows, RATIOS),
  D: inUnit(Rows, RATIOS),
  E: inUnit(Rows, RATES),
  H: inUnit(Rows, RATIOS),
  J: inUnit(Rows, RATIOS),
  operatingPoint: OperatingPoint,
});

export const PlantSummary = z.strictObject({
  id: Id,
  name: Name,
  version: Version,
  currentRevision: z.strictObject({ id: Id, number: Version }),
  axes: z.array(z.strictObject({ name: z.string(), tag: z.string() })),
  order: z.int(),
  inputCount: z.int(),
  outputCount: z.int(),
  timeBase: TimeBase,
  designCount: z.int(),
  archivedAt: Timestamp.nullable(),
  createdAt: Timestamp,
  updatedAt: Timestamp,
});
export type PlantSummary = z.infer<typeof PlantSummary>;

/** One plant by itself, with what its designs are held against. */
export const Plant = PlantSummary.extend({ criteria: Criteria });
export type Plant = z.infer<typeof Plant>;

export const PlantRevision = z.strictObject({
  id: Id,
  plantId: Id,
  plantName: Name,
  number: Version,
  content: PlantContent,
  model: PlantModel,
  note: Remark,
  createdBy: z.string().nullable(),
  createdAt: Timestamp,
});
export type PlantRevision = z.infer<typeof PlantRevision>;

export const PlantRevisionEntry = PlantRevision.omit({ content: true, model: true });
export type PlantRevisionEntry = z.infer<typeof PlantRevisionEntry>;

export const CreatePlant = z.strictObject({ name: Name, content: PlantContent, note: Remark.default("") });
export type CreatePlant = z.infer<typeof CreatePlant>;

export const RenamePlant = z.strictObject({ name: Name });
export const AddPlantRevision = z.strictObject({ content: PlantContent, note: Remark.default("") });
export type AddPlantRevision = z.infer<typeof AddPlantRevision>;
export const DuplicatePlant = z.strictObject({ name: Name, revisionId: Id.optional() });
export const ArchivePlant = z.strictObject({ archived: z.boolean() });

export const PlantQuery = PageQuery.extend({
  search: z.string().trim().max(120).default(""),
  sort: z.enum(["name", "-name", "updated", "-updated"]).default("-updated"),
  archived: z.enum(["no", "yes", "all"]).default("no"),
});
export type PlantQuery = z.infer<typeof PlantQuery>;

/** What differs between two revisions, one line each, at the place where it differs. */
export const PlantDifference = z.strictObject({
  from: PlantRevisionEntry,
  to: PlantRevisionEntry,
  changes: z.array(
    z.strictObject({ pointer: z.string(), place: z.string(), before: z.string().nullable(), after: z.string().nullable() }),
  ),
  /** Designs whose newest revision was computed on a plant revision older than the later of the two; the first hundred by name. */
  outdates: z.array(z.strictObject({ id: Id, name: Name, onRevision: Version })),
});
export type PlantDifference = z.infer<typeof PlantDifference>;
