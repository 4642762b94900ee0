import { route } from "@/lib/api/route";

import { ComparisonAddress } from "@/lib/schemas/addresses";
import { Comparison } from "@/lib/schemas/comparison";
import { archiveComparison } from "@/lib/services/comparisons/archive";
import { readComparison } from "@/lib/services/comparisons/read";

export const GET = route(
  { summary: "Read a saved comparison", params: ComparisonAddress, reply: Comparison, right: "comparison:read" },
  async ({ ctx, params }) => {
    const comparison = await readComparison(ctx, params.comparisonId);
    return { body: comparison, version: comparison.version };
  },
);

export const DELETE = route(
  {
    summary: "Take a saved comparison off the lists",
    params: ComparisonAddress,
    reply: Comparison,
    right: "comparison:write",
    ifMatch: true,
  },
  async ({ ctx, params, version }) => {
    const comparison = await archiveComparison(ctx, params.comparisonId, version);
    return { body: comparison, version: comparison.version };
  },
);
