import { route } from "@/lib/api/route";

import { CheckPlant } from "@/lib/schemas/design";
import { ChecksReply } from "@/lib/schemas/evidence";
import { checkContent } from "@/lib/services/computations/check-plant";

export const POST = route(
  { summary: "Check a plant that need not be saved", body: CheckPlant, reply: ChecksReply, right: "compute:use", cost: "check" },
  async ({ ctx, body, signal }) => ({ body: await checkContent(ctx, body.content, signal) }),
);
