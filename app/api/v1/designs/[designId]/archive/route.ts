import { route } from "@/lib/api/route";

import { DesignAddress } from "@/lib/schemas/addresses";
import { ArchiveDesign, DesignSummary } from "@/lib/schemas/design";
import { archiveDesign } from "@/lib/services/designs/archive";

export const POST = route(
  {
    summary: "Archive a design, or bring it back",
    params: DesignAddress,
    body: ArchiveDesign,
    reply: DesignSummary,
    right: "design:write",
    ifMatch: true,
  },
  async ({ ctx, params, body, version }) => {
    const design = await archiveDesign(ctx, params.designId, version, body.archived);
    return { body: design, version: design.version };
  },
);
