import { fileReply } from "@/lib/api/file-reply";
import { route } from "@/lib/api/route";
import { GAIN_CSV, GAIN_JSON } from "@/lib/files/gain-export";
import { DesignRevisionAddress, GainFile } from "@/lib/schemas/addresses";
import { exportGains } from "@/lib/services/designs/export-gains";

export const GET = route(
  {
    summary: "Download the gain with signal names, order, units, sign, time base and cautions",
    params: DesignRevisionAddress,
    query: GainFile,
    reply: fileReply(GAIN_CSV, GAIN_JSON),
    right: "design:read",
  },
  async ({ ctx, params, query }) => ({ file: await exportGains(ctx, params.revisionId, query.format) }),
);
