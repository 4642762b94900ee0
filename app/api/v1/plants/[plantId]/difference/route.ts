import { route } from "@/lib/api/route";

import { PlantAddress, RevisionRange } from "@/lib/schemas/addresses";
import { PlantDifference } from "@/lib/schemas/plant";
import { comparePlantRevisions } from "@/lib/services/plants/compare-revisions";

export const GET = route(
  {
    summary: "Tell what differs between two revisions, and which designs the later one outdates",
    params: PlantAddress,
    query: RevisionRange,
    reply: PlantDifference,
    right: "plant:read",
  },
  async ({ ctx, params, query }) => ({ body: await comparePlantRevisions(ctx, params.plantId, query) }),
);
