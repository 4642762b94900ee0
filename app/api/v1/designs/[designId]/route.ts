import { route } from "@/lib/api/route";

import { DesignAddress } from "@/lib/schemas/addresses";
import { DesignSummary, RenameDesign } from "@/lib/schemas/design";
import { readDesign } from "@/lib/services/designs/read";
import { renameDesign } from "@/lib/services/designs/rename";

export const GET = route(
  { summary: "Read a design", params: DesignAddress, reply: DesignSummary, right: "design:read" },
  async ({ ctx, params }) => {
    const design = await readDesign(ctx, params.designId);
    return { body: design, version: design.version };
  },
);

export const PATCH = route(
  {
    summary: "Rename a design",
    params: DesignAddress,
    body: RenameDesign,
    reply: DesignSummary,
    right: "design:write",
    ifMatch: true,
  },
  async ({ ctx, params, body, version }) => {
    const design = await renameDesign(ctx, params.designId, version, body.name);
    return { body: design, version: design.version };
  },
);
