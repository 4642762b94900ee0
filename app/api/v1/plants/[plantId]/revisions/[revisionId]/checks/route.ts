import { route } from "@/lib/api/route";

import { PlantRevisionAddress } from "@/lib/schemas/addresses";
import { ChecksReply } from "@/lib/schemas/evidence";
import { checkPlantRevision } from "@/lib/services/computations/check-plant";

export const GET = route(
  {
    summary: "Check a plant revision: modes, controllability, observability, zeros, coupling, scaling",
    params: PlantRevisionAddress,
    reply: ChecksReply,
    right: "plant:read",
    cost: "check",
  },
  async ({ ctx, params, signal }) => ({ body: await checkPlantRevision(ctx, params.plantId, params.revisionId, signal) }),
);
