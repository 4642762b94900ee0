import { route } from "@/lib/api/route";

import { PlantAddress } from "@/lib/schemas/addresses";
import { Plant, RenamePlant } from "@/lib/schemas/plant";
import { readPlant } from "@/lib/services/plants/read";
import { renamePlant } from "@/lib/services/plants/rename";

export const GET = route(
  { summary: "Read a plant", params: PlantAddress, reply: Plant, right: "plant:read" },
  async ({ ctx, params }) => {
    const plant = await readPlant(ctx, params.plantId);
    return { body: plant, version: plant.version };
  },
);

export const PATCH = route(
  {
    summary: "Rename a plant",
    params: PlantAddress,
    body: RenamePlant,
    reply: Plant,
    right: "plant:write",
    ifMatch: true,
  },
  async ({ ctx, params, body, version }) => {
    const plant = await renamePlant(ctx, params.plantId, version, body.name);
    return { body: plant, version: plant.version };
  },
);
