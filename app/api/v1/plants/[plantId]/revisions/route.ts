import { route } from "@/lib/api/route";

import { PlantAddress } from "@/lib/schemas/addresses";
import { PageQuery, page } from "@/lib/schemas/common";
import { AddPlantRevision, Plant, PlantRevisionEntry } from "@/lib/schemas/plant";
import { addPlantRevision } from "@/lib/services/plants/add-revision";
import { EXPRESSIONS_HERE } from "@/lib/services/plants/evaluate-or-refuse";
import { listPlantRevisions } from "@/lib/services/plants/list-revisions";

export const GET = route(
  {
    summary: "List a plant's revisions, newest first",
    params: PlantAddress,
    query: PageQuery,
    reply: page(PlantRevisionEntry),
    right: "plant:read",
  },
  async ({ ctx, params, query }) => ({ body: await listPlantRevisions(ctx, params.plantId, query) }),
);

/** No key is needed: the version in `If-Match` already lets a repeated request take effect only once. */
export const POST = route(
  {
    summary: "Add a revision to a plant",
    params: PlantAddress,
    body: AddPlantRevision,
    reply: Plant,
    right: "plant:write",
    ifMatch: true,
    inTurnAbove: EXPRESSIONS_HERE,
    status: 201,
  },
  async ({ ctx, params, body, version, signal }) => {
    const plant = await addPlantRevision(ctx, params.plantId, version, body, signal);
    return { body: plant, version: plant.version };
  },
);
