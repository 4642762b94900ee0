import { route } from "@/lib/api/route";

import { PlantRevisionAddress } from "@/lib/schemas/addresses";
import { PlantRevision } from "@/lib/schemas/plant";
import { readPlantRevision } from "@/lib/services/plants/read-revision";

export const GET = route(
  {
    summary: "Read a plant revision: as typed, and the doubles it was evaluated to",
    params: PlantRevisionAddress,
    reply: PlantRevision,
    right: "plant:read",
  },
  async ({ ctx, params }) => ({ body: await readPlantRevision(ctx, params.plantId, params.revisionId) }),
);
