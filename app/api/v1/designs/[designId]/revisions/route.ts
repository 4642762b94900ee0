import { route } from "@/lib/api/route";

import { DesignAddress } from "@/lib/schemas/addresses";
import { PageQuery, page } from "@/lib/schemas/common";
import { AddDesignRevision, DesignRevisionEntry, DesignSummary } from "@/lib/schemas/design";
import { addDesignRevision } from "@/lib/services/designs/add-revision";
import { listDesignRevisions } from "@/lib/services/designs/list-revisions";

export const GET = route(
  {
    summary: "List a design's revisions, newest first",
    params: DesignAddress,
    query: PageQuery,
    reply: page(DesignRevisionEntry),
    right: "design:read",
  },
  async ({ ctx, params, query }) => ({ body: await listDesignRevisions(ctx, params.designId, query) }),
);

/** No key is needed: the version in `If-Match` already lets a repeated request take effect only once. */
export const POST = route(
  {
    summary: "Solve a changed recipe and store it as the design's next revision",
    params: DesignAddress,
    body: AddDesignRevision,
    reply: DesignSummary,
    right: "design:write",
    ifMatch: true,
    cost: "solve",
    status: 201,
  },
  async ({ ctx, params, body, version, signal }) => {
    const design = await addDesignRevision(ctx, params.designId, version, body, signal);
    return { body: design, version: design.version };
  },
);
