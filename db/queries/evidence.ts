import "server-only";
import { and, asc, eq, inArray } from "drizzle-orm";
import type { ResponseRecord } from "@/control/design/evidence";
import type { Db } from "../client";
import { evidence, responseRecords } from "../schema/evidence";
import type { DesignRevisionKey } from "./design-revisions";

export type EvidenceRow = {
  readonly part: string;
  readonly state: "computed" | "refused" | "running";
  readonly content: unknown;
};

export async function insertEvidence(db: Db, { teamId, revisionId }: DesignRevisionKey, parts: readonly EvidenceRow[]) {
  await db.insert(evidence).values(parts.map((part) => ({ ...part, teamId, designRevisionId: revisionId })));
}

export async function findEvidence(db: Db, { teamId, revisionId }: DesignRevisionKey): Promise<EvidenceRow[]> {
  return db
    .select({ part: evidence.part, state: evidence.state, content: evidence.content })
    .from(evidence)
    .where(and(eq(evidence.teamId, teamId), eq(evidence.designRevisionId, revisionId)));
}

/** Of several revisions at once; each row names its own. */
export async function findEvidenceOf(db: Db, { teamId, revisionIds }: { teamId: string; revisionIds: readonly string[] }) {
  const { designRevisionId, part, state, content } = evidence;
  return db
    .select({ designRevisionId, part, state, content })
    .from(evidence)
    .where(and(eq(evidence.teamId, teamId), inArray(designRevisionId, [...revisionIds])));
}

// Float64Array keeps the order of the machine, and every machine we run on is little-endian.
const toBytes = (values: Float64Array) => Buffer.from(values.buffer, values.byteOffset, values.byteLength);
/** Copied, since a driver's buffer need not start on a multiple of eight. */
const fromBytes = (bytes: Buffer) => new Float64Array(Uint8Array.from(bytes).buffer);

/** The largest plant's curves are 17 MB: in portions, so that no single statement holds them all in memory at once. */
const PORTION_BYTES = 2 ** 21;

function portions(rows: readonly (typeof responseRecords.$inferInsert)[]) {
  const made: (typeof responseRecords.$inferInsert)[][] = [];
  let room = 0;
  for (const row of rows) {
    const last = made.at(-1);
    if (last && row.values.length <= room) last.push(row);
    else {
      made.push([row]);
      room = PORTION_BYTES;
    }
    room -= row.values.length;
  }
  return made;
}

export async function insertResponseRecords(
  db: Db,
  { teamId, revisionId }: DesignRevisionKey,
  records: readonly ResponseRecord[],
) {
  const rows = records.map(({ values, ...record }, position) => ({
    ...record,
    teamId,
    designRevisionId: revisionId,
    position,
    values: toBytes(values),
  }));
  for (const portion of portions(rows)) await db.insert(responseRecords).values(portion);
}

export async function findResponseRecords(
  db: Db,
  { teamId, revisionId }: DesignRevisionKey,
  which: {
    readonly kind: ResponseRecord["kind"];
    readonly loop: ResponseRecord["loop"] | "both";
    readonly source?: number | undefined;
  },
): Promise<ResponseRecord[]> {
  const { kind, loop, source, amplitude, samples, step, values } = responseRecords;
  const rows = await db
    .select({ kind, loop, source, amplitude, samples, step, values })
    .from(responseRecords)
    .where(
      and(
        eq(responseRecords.teamId, teamId),
        eq(responseRecords.designRevisionId, revisionId),
        eq(kind, which.kind),
        which.loop === "both" ? undefined : eq(loop, which.loop),
        which.source === undefined ? undefined : eq(source, which.source),
      ),
    )
    .orderBy(asc(responseRecords.position));
  return rows.map((row) => ({ ...row, values: fromBytes(row.values) }));
}
