import { route } from "@/lib/api/route";
import { PlantAddress } from "@/lib/schemas/addresses";
import { SetCriteria } from "@/lib/schemas/criteria";
import { Plant } from "@/lib/schemas/plant";
import { setCriteria } from "@/lib/services/plants/set-criteria";

export const PUT = route(
  {
    summary: "Set the acceptance criteria that a plant's designs are held against",
    params: PlantAddress,
    body: SetCriteria,
    reply: Plant,
    right: "plant:write",
    ifMatch: true,
  },
  async ({ ctx, params, body, version }) => {
    const plant = await setCriteria(ctx, params.plantId, version, body.criteria);
    return { body: plant, version: plant.version };
  },
);
