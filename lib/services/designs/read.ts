import "server-only";
import { inTransaction } from "@/db/client";
import { findDesign } from "@/db/queries/designs";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { DesignSummary } from "@/lib/schemas/design";
import type { Context } from "../context";
import { toDesignSummary } from "./to-design";

export async function readDesign(ctx: Context, designId: string): Promise<DesignSummary> {
  allow(ctx, "design:read");
  const found = await inTransaction(ctx, (tx) => findDesign(tx, { teamId: ctx.teamId, designId }));
  if (!found) throw new NotFound("Design");
  return toDesignSummary(found);
}
