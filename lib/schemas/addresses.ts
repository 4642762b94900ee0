import { z } from "zod";
import { Id, PageQuery } from "./common";
import { MOST } from "./compared-count";
import { ComparedRevisions } from "./comparison";

/** What stands in the addresses of the API. */
export const PlantAddress = z.strictObject({ plantId: Id });
export const PlantRevisionAddress = z.strictObject({ plantId: Id, revisionId: Id });
export const DesignAddress = z.strictObject({ designId: Id });
/** `subjectId`: a design, an older revision of one, or for a new design the plant itself. */
export const DraftAddress = z.strictObject({ plantId: Id, subjectId: Id });
export const DesignRevisionAddress = z.strictObject({ revisionId: Id });
export const ComparisonAddress = z.strictObject({ comparisonId: Id });
export const TemplateAddress = z.strictObject({ templateId: Id });

export const RevisionRange = z.strictObject({ from: Id, to: Id });
export const ComparisonQuery = PageQuery.extend({ plantId: Id.optional() });
export const GainFile = z.strictObject({ format: z.enum(["csv", "json"]).default("csv") });

const ID_LENGTH = 36;
/** `designs` as in the address of the page: two to six design revision ids of the plant with commas between, in their order. */
export const ComparisonFile = z.strictObject({
  designs: z
    .string()
    .max(2 * MOST * (ID_LENGTH + 1))
    .transform((text) => text.toLowerCase().split(","))
    .pipe(ComparedRevisions),
  format: z.enum(["csv"]).default("csv"),
});

export const MemberAddress = z.strictObject({ userId: Id });
export const InvitationAddress = z.strictObject({ invitationId: Id });
export const AccessTokenAddress = z.strictObject({ tokenId: Id });
