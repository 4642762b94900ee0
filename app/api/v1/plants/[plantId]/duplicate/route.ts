import { route } from "@/lib/api/route";

import { PlantAddress } from "@/lib/schemas/addresses";
import { DuplicatePlant, Plant } from "@/lib/schemas/plant";
import { duplicatePlant } from "@/lib/services/plants/duplicate";

export const POST = route(
  {
    summary: "Make a plant of its own from a revision of this one",
    params: PlantAddress,
    body: DuplicatePlant,
    reply: Plant,
    right: "plant:write",
    idempotent: true,
    status: 201,
  },
  async ({ ctx, params, body }) => {
    const plant = await duplicatePlant(ctx, params.plantId, body);
    return { body: plant, version: plant.version, location: `/api/v1/plants/${plant.id}` };
  },
);
