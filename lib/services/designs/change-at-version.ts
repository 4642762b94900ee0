import "server-only";
import { type Db, inTransaction } from "@/db/client";
import { type DesignKey, findDesign } from "@/db/queries/designs";
import { NotFound, StaleVersion } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { DesignSummary } from "@/lib/schemas/design";
import { recordEvent } from "../audit";
import type { Context } from "../context";
import { toDesignSummary } from "./to-design";

type Saved = { readonly currentRevision: number; readonly plantId: string } | undefined;

/** The frame of every change of a design: right, one versioned write, the reason when it did not take, audit. */
export async function changeDesignAt(
  ctx: Context,
  designId: string,
  version: number,
  kind: string,
  write: (tx: Db, key: DesignKey) => Promise<Saved>,
): Promise<DesignSummary> {
  allow(ctx, "design:write");
  return inTransaction(ctx, async (tx) => {
    const key = { teamId: ctx.teamId, designId };
    const saved = await write(tx, key);
    const current = await findDesign(tx, key);
    if (!current) throw new NotFound("Design");
    if (!saved) throw new StaleVersion(version, current.version);
    await recordEvent(tx, ctx, kind, { type: "design", id: designId, revision: saved.currentRevision });
    return toDesignSummary(current);
  });
}
