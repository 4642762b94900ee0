import type {
  Evidence,
  GainEvidence,
  ObserverEvidence,
  PoleReport,
  ReferenceEvidence,
  ResponseEvidence,
} from "../design/evidence";
import type { NumericalErrorCode } from "../errors";
import type { PlantModel } from "../plant/model";
import type { Part } from "../plant/report";
import { explainRefusal } from "./explain-refusal";
import type { RefusalWords } from "./refusals/types";

/** A refused part with its reason in the plant's own signal names. */
export type RefusedInWords = RefusalWords & {
  readonly state: "refused";
  readonly code: string;
  readonly data: Record<string, unknown>;
};
export type PartInWords<T> = { readonly state: "computed"; readonly value: T } | RefusedInWords;
type Absent = { readonly state: "absent" };

/** The figures of the responses without their curves, which travel apart. */
export type ResponseSummary = Omit<ResponseEvidence, "records">;

/** The evidence as it is shown: refusals in words, curves apart. */
export type EvidenceInWords = {
  readonly methodVersion: string;
  readonly gains: PartInWords<GainEvidence>;
  readonly poles: PartInWords<readonly PoleReport[]>;
  readonly reference: PartInWords<ReferenceEvidence> | Absent;
  readonly observer: PartInWords<ObserverEvidence> | Absent;
  readonly responses: PartInWords<ResponseSummary>;
};

export function inWords(refused: { code: string; data: Readonly<Record<string, unknown>> }, model: PlantModel): RefusedInWords {
  const { code, data } = refused;
  return { state: "refused", code, data: { ...data }, ...explainRefusal(code as NumericalErrorCode, data, model) };
}

/** Same part, a refusal put into the plant's own signal names. */
export function partInWords<T>(part: Part<T>, model: PlantModel): PartInWords<T> {
  return part.state === "computed" ? part : inWords(part, model);
}

export function withoutCurves({ horizon, figures, summary }: ResponseEvidence): ResponseSummary {
  return { horizon, figures, summary };
}

/** All parts of the evidence, refusals in the plant's own signal names. */
export function evidenceInWords(evidence: Evidence, model: PlantModel): EvidenceInWords {
  const { methodVersion, gains, poles, reference, observer, responses } = evidence;
  return {
    methodVersion,
    gains: partInWords(gains, model),
    poles: partInWords(poles, model),
    reference: reference.state === "absent" ? reference : partInWords(reference, model),
    observer: observer.state === "absent" ? observer : partInWords(observer, model),
    responses:
      responses.state === "computed"
        ? { state: "computed", value: withoutCurves(responses.value) }
        : partInWords(responses, model),
  };
}
