import { comparisonSource } from "@/components/side-by-side/comparison-file";
import { fileReply } from "@/lib/api/file-reply";
import { route } from "@/lib/api/route";
import { COMPARISON_CSV, comparisonAsCsv } from "@/lib/files/comparison-export";
import { ComparisonFile, PlantAddress } from "@/lib/schemas/addresses";
import { readDesignRevisions } from "@/lib/services/designs/read-revisions";

export const GET = route(
  {
    summary: "Download two to six designs side by side: recipes with reasons, poles, figures, efforts, gains, cautions",
    params: PlantAddress,
    query: ComparisonFile,
    reply: fileReply(COMPARISON_CSV),
    right: "design:read",
  },
  async ({ ctx, params, query }) => {
    const revisions = await readDesignRevisions(ctx, params.plantId, query.designs);
    return { file: comparisonAsCsv(comparisonSource(revisions)) };
  },
);
