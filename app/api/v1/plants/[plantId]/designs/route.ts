import { route } from "@/lib/api/route";

import { PlantAddress } from "@/lib/schemas/addresses";
import { page } from "@/lib/schemas/common";
import { CreateDesign, DesignQuery, DesignSummary } from "@/lib/schemas/design";
import { createDesign } from "@/lib/services/designs/create";
import { listDesigns } from "@/lib/services/designs/list";

export const GET = route(
  {
    summary: "List a plant's designs",
    params: PlantAddress,
    query: DesignQuery,
    reply: page(DesignSummary),
    right: "design:read",
  },
  async ({ ctx, params, query }) => ({ body: await listDesigns(ctx, params.plantId, query) }),
);

export const POST = route(
  {
    summary: "Solve a recipe on a plant revision and store it as a design with its evidence",
    params: PlantAddress,
    body: CreateDesign,
    reply: DesignSummary,
    right: "design:write",
    idempotent: true,
    cost: "solve",
    status: 201,
  },
  async ({ ctx, params, body, signal }) => {
    const design = await createDesign(ctx, params.plantId, body, signal);
    return { body: design, version: design.version, location: `/api/v1/designs/${design.id}` };
  },
);
