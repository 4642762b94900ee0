import "server-only";
import type { PlantModel } from "@/control/plant/model";
import type { PlantChecks } from "@/control/plant/report";
import { describeChecks } from "@/control/words/describe-checks";
import { describeMode } from "@/control/words/describe-mode";
import { partInWords } from "@/control/words/evidence-in-words";
import type { ChecksReply } from "@/lib/schemas/evidence";

/** Checks as numbers and, beside them, in plain words. The reply schema checks every field on its way out. */
export function checksReply(checks: PlantChecks, model: PlantModel): ChecksReply {
  const { modes, controllability, observability, stabilizable, detectable, zeros, coupling, scaling, timeBaseSuspicion } = checks;
  const reply = {
    modes: partInWords(modes, model),
    controllability: partInWords(controllability, model),
    observability: partInWords(observability, model),
    stabilizable: partInWords(stabilizable, model),
    detectable: partInWords(detectable, model),
    zeros: partInWords(zeros, model),
    coupling: partInWords(coupling, model),
    scaling,
    timeBaseSuspicion,
    findings: describeChecks(checks, model),
    modeLabels: modes.state === "computed" ? modes.value.map((mode) => describeMode(mode, model)) : [],
  };
  return reply as unknown as ChecksReply;
}
