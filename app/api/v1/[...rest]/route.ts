import { z } from "zod";
import { publicRoute } from "@/lib/api/route";
import { NotFound } from "@/lib/errors";

/** Addresses under /api/v1 that name nothing are answered like any other refusal, not with a page. */
const nothingHere = publicRoute({ summary: "Nothing is here", query: z.looseObject({}), reply: null }, async () => {
  throw new NotFound("What this address names");
});

export { nothingHere as DELETE, nothingHere as GET, nothingHere as PATCH, nothingHere as POST, nothingHere as PUT };
