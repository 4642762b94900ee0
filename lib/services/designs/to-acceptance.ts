import "server-only";
import { type Criterion, judgeCriteria } from "@/control/design/criteria";
import type { PlantModel } from "@/control/plant/model";
import { verdictSentence } from "@/control/words/describe-criterion";
import type { Acceptance } from "@/lib/schemas/criteria";
import type { EvidenceReply } from "@/lib/schemas/evidence";

type Judged = { readonly evidence: Pick<EvidenceReply, "responses">; readonly model: PlantModel };

/** Each criterion met or not met, with its number and in words. */
export function toAcceptance(
  criteria: readonly Criterion[],
  judgedBy: Acceptance["judgedBy"],
  { evidence: { responses }, model }: Judged,
): Acceptance {
  const verdicts = judgeCriteria(criteria, responses.state === "computed" ? responses.value : null, model);
  return {
    judgedBy,
    met: verdicts.filter(({ met }) => met).length,
    of: verdicts.length,
    verdicts: verdicts.map((verdict) => ({
      ...verdict,
      criterion: { ...verdict.criterion },
      sentence: verdictSentence(verdict),
    })),
  };
}
