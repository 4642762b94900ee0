import { route } from "@/lib/api/route";

import { Computation, Compute } from "@/lib/schemas/design";
import { compute } from "@/lib/services/computations/compute";
import { twoTanks } from "./example";

export const POST = route(
  {
    summary: "Compute checks, gains, poles, residuals, responses and acceptance of a plant and a recipe without storing anything",
    body: Compute,
    example: twoTanks,
    reply: Computation,
    right: "compute:use",
    cost: "solve",
  },
  async ({ ctx, body, signal }) => ({ body: await compute(ctx, body, signal) }),
);
