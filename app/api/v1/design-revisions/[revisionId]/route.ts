import { route } from "@/lib/api/route";

import { DesignRevisionAddress } from "@/lib/schemas/addresses";
import { DesignRevision } from "@/lib/schemas/design";
import { readDesignRevision } from "@/lib/services/designs/read-revision";

export const GET = route(
  {
    summary: "Read a design revision with its recipe and evidence",
    params: DesignRevisionAddress,
    reply: DesignRevision,
    right: "design:read",
  },
  async ({ ctx, params }) => ({ body: await readDesignRevision(ctx, params.revisionId) }),
);
