import { route } from "@/lib/api/route";
import { DraftAddress } from "@/lib/schemas/addresses";
import { DRAFT_LIMIT, DraftMarks, FoundDraft, KeepDraft, KeptDraft } from "@/lib/schemas/draft";
import { keepDraft } from "@/lib/services/drafts/keep";
import { readDraft } from "@/lib/services/drafts/read";
import { removeDraft } from "@/lib/services/drafts/remove";

export const GET = route(
  {
    summary: "Read your own unsaved draft of a design, of an older revision, or of a new design of the plant",
    params: DraftAddress,
    reply: FoundDraft,
    right: "design:write",
  },
  async ({ ctx, params }) => ({ body: { draft: await readDraft(ctx, params) } }),
);

export const PUT = route(
  {
    summary: "Keep your unsaved draft in place of one that you know of by its mark",
    params: DraftAddress,
    body: KeepDraft,
    reply: KeptDraft,
    right: "design:write",
    bodyLimit: DRAFT_LIMIT,
    cost: "draft",
  },
  async ({ ctx, params, body }) => ({ body: await keepDraft(ctx, params, body) }),
);

export const DELETE = route(
  {
    summary: "Remove your unsaved draft that has one of these marks",
    params: DraftAddress,
    query: DraftMarks,
    reply: null,
    right: "design:write",
    cost: "draft",
  },
  async ({ ctx, params, query }) => {
    await removeDraft(ctx, params, query.marks);
    return null;
  },
);
