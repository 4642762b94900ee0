import { route } from "@/lib/api/route";

import { DesignRevisionAddress } from "@/lib/schemas/addresses";
import { ResponseList, ResponseQuery } from "@/lib/schemas/evidence";
import { readResponses } from "@/lib/services/designs/read-responses";

export const GET = route(
  {
    summary: "Read the stored curves of a design revision",
    params: DesignRevisionAddress,
    query: ResponseQuery,
    reply: ResponseList,
    right: "design:read",
  },
  async ({ ctx, params, query }) => ({ body: await readResponses(ctx, params.revisionId, query) }),
);
