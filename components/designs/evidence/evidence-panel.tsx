import { memo } from "react";
import { Notice } from "../../ui/notice";
import { StateMark } from "../../ui/state-mark";
import type { BenchStart, Solved } from "../bench/bench-types";
import { TWO_COLUMNS } from "../two-columns";
import { AcceptancePart } from "./acceptance-part";
import { EvidencePart } from "./evidence-part";
import { methodText, referenceText } from "./evidence-words";
import { computed } from "./figures-reply";
import { DesignPlane, PoleFigures } from "./pole-figures";
import { RefusedPart } from "./refused-part";
import { SolvedFacts, Verified } from "./solved-facts";
import { StepFigures } from "./step-figures";

type EvidencePanelProps = Readonly<{ plant: BenchStart["plant"]; solved: Solved }>;

/** The right column of the page: what is met, then everything computed, each part by itself, refused parts with their reason. */
export const EvidencePanel = memo(function EvidencePanel({ plant, solved }: EvidencePanelProps) {
  const { evidence, ground } = solved;
  const { model } = ground;
  const poles = computed(evidence.poles);
  return (
    <div className={`flex flex-col gap-6 ${TWO_COLUMNS}`}>
      <AcceptancePart plant={plant} solved={solved} />
      <StepPart solved={solved} />
      <ReferencePart solved={solved} />
      {poles ? (
        <EvidencePart title="Loop">
          <DesignPlane title="Closed-loop poles" kind="closed" poles={poles} model={model} />
          <PoleFigures title="Closed-loop poles" poles={poles} model={model} />
        </EvidencePart>
      ) : null}
      {evidence.poles.state === "refused" && evidence.gains.state !== "refused" ? <RefusedPart refusal={evidence.poles} /> : null}
      <ObserverPart solved={solved} />
      <EvidencePart title="Solved by">
        {evidence.gains.state === "refused" ? (
          <RefusedPart refusal={evidence.gains} />
        ) : (
          <SolvedFacts gains={evidence.gains.value} />
        )}
        <p className="text-sm text-soft">Methods of version {evidence.methodVersion}.</p>
      </EvidencePart>
    </div>
  );
});

function StepPart({ solved: { evidence, ground } }: Readonly<{ solved: Solved }>) {
  const { responses } = evidence;
  const { model } = ground;
  if (responses.state === "refused") {
    return (
      <EvidencePart title="Responses">
        <RefusedPart refusal={responses} />
      </EvidencePart>
    );
  }
  const { figures } = responses.value;
  if (figures.length === 0) return null;
  return (
    <EvidencePart title="Steps, over all time">
      <div className="flex flex-col gap-4">
        {model.commanded.map(({ name }, source) => (
          <StepFigures key={name} {...{ figures, source, model }} />
        ))}
      </div>
    </EvidencePart>
  );
}

function ReferencePart({ solved: { evidence, ground } }: Readonly<{ solved: Solved }>) {
  const { reference } = evidence;
  if (reference.state === "absent") return null;
  if (reference.state === "refused") {
    return (
      <EvidencePart title="Set points">
        <RefusedPart refusal={reference} />
      </EvidencePart>
    );
  }
  const all = reference.value.reached.every(Boolean);
  const names = ground.model.commanded.map(({ name }) => name);
  return (
    <EvidencePart title="Set points">
      {all ? (
        <p className="flex items-baseline gap-1.5 text-table">
          <StateMark kind="met" word="Met: " />
          {referenceText(reference.value, names)}
        </p>
      ) : (
        <Notice kind="caution" title="Not every set point is reached.">
          <span className="text-table">{referenceText(reference.value, names)}</span>
        </Notice>
      )}
    </EvidencePart>
  );
}

function ObserverPart({ solved: { evidence, ground } }: Readonly<{ solved: Solved }>) {
  const { observer } = evidence;
  if (observer.state === "absent") return null;
  if (observer.state === "refused") {
    return (
      <EvidencePart title="Observer">
        <RefusedPart refusal={observer} />
      </EvidencePart>
    );
  }
  const { kind, poles, method, residual, bound } = observer.value;
  return (
    <EvidencePart title={kind === "full" ? "Observer" : `Observer of order ${observer.value.order}`}>
      {poles.length > 0 ? <DesignPlane title="Observer poles" kind="observer" poles={poles} model={ground.model} /> : null}
      <PoleFigures title="Observer poles" poles={poles} model={ground.model} />
      <div className="text-table">
        <p>{methodText(method)}.</p>
        <Verified {...{ residual, bound }} />
      </div>
    </EvidencePart>
  );
}
