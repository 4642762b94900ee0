import { route } from "@/lib/api/route";

import { PlantAddress } from "@/lib/schemas/addresses";
import { ArchivePlant, Plant } from "@/lib/schemas/plant";
import { archivePlant } from "@/lib/services/plants/archive";

export const POST = route(
  {
    summary: "Archive a plant, or bring it back",
    params: PlantAddress,
    body: ArchivePlant,
    reply: Plant,
    right: "plant:write",
    ifMatch: true,
  },
  async ({ ctx, params, body, version }) => {
    const plant = await archivePlant(ctx, params.plantId, version, body.archived);
    return { body: plant, version: plant.version };
  },
);
