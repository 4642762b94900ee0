import { route } from "@/lib/api/route";

import { ComparisonQuery } from "@/lib/schemas/addresses";
import { page } from "@/lib/schemas/common";
import { Comparison, SaveComparison } from "@/lib/schemas/comparison";
import { listComparisons } from "@/lib/services/comparisons/list";
import { saveComparison } from "@/lib/services/comparisons/save";

export const GET = route(
  {
    summary: "List saved comparisons, of one plant or of all",
    query: ComparisonQuery,
    reply: page(Comparison),
    right: "comparison:read",
  },
  async ({ ctx, query }) => ({ body: await listComparisons(ctx, query) }),
);

export const POST = route(
  {
    summary: "Save a comparison of two to six design revisions of one plant",
    body: SaveComparison,
    reply: Comparison,
    right: "comparison:write",
    idempotent: true,
    status: 201,
  },
  async ({ ctx, body }) => {
    const comparison = await saveComparison(ctx, body);
    return { body: comparison, version: comparison.version, location: `/api/v1/comparisons/${comparison.id}` };
  },
);
