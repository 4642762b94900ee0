import { route } from "@/lib/api/route";

import { page } from "@/lib/schemas/common";
import { CreatePlant, Plant, PlantQuery, PlantSummary } from "@/lib/schemas/plant";
import { createPlant } from "@/lib/services/plants/create";
import { EXPRESSIONS_HERE } from "@/lib/services/plants/evaluate-or-refuse";
import { listPlants } from "@/lib/services/plants/list";

export const GET = route(
  { summary: "List the team's plants", query: PlantQuery, reply: page(PlantSummary), right: "plant:read" },
  async ({ ctx, query }) => ({ body: await listPlants(ctx, query) }),
);

export const POST = route(
  {
    summary: "Create a plant with its first revision",
    body: CreatePlant,
    reply: Plant,
    right: "plant:write",
    idempotent: true,
    inTurnAbove: EXPRESSIONS_HERE,
    status: 201,
  },
  async ({ ctx, body, signal }) => {
    const plant = await createPlant(ctx, body, signal);
    return { body: plant, version: plant.version, location: `/api/v1/plants/${plant.id}` };
  },
);
