import { route } from "@/lib/api/route";

import { DesignAddress } from "@/lib/schemas/addresses";
import { DesignSummary, DuplicateDesign } from "@/lib/schemas/design";
import { duplicateDesign } from "@/lib/services/designs/duplicate";

export const POST = route(
  {
    summary: "Make a design of its own with the newest recipe of this one",
    params: DesignAddress,
    body: DuplicateDesign,
    reply: DesignSummary,
    right: "design:write",
    idempotent: true,
    cost: "solve",
    status: 201,
  },
  async ({ ctx, params, body, signal }) => {
    const design = await duplicateDesign(ctx, params.designId, body.name, signal);
    return { body: design, version: design.version, location: `/api/v1/designs/${design.id}` };
  },
);
