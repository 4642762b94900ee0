import type { PlantModel } from "@/control/plant/model";
import { formatComplex } from "@/control/words/format-complex";
import { formatNumber, formatSeconds } from "@/control/words/format-number";
import type { DesignRevision } from "@/lib/schemas/design";
import type { Summary } from "@/lib/schemas/evidence";
import { planeUnit, poleFigureText, slowFirst } from "../designs/evidence/evidence-words";
import { computed, type PolesReply } from "../designs/evidence/figures-reply";
import { percentText } from "../designs/percent-text";
import type { Fact } from "./compared-rows";

type Part = DesignRevision["evidence"]["gains" | "poles" | "observer" | "reference" | "responses"];
type Figure = Omit<Fact, "section" | "exact">;

/** A refused part is said, not left empty. */
function refused(section: string, part: Part): Fact[] {
  if (part.state !== "refused") return [];
  const text = `${part.title}. ${part.sentence}`;
  return [{ section, key: "refused", label: "not computed", text, exact: text, prose: true }];
}

/** Poles by the axis they mostly move, slow ones first: an order that designs of one machine share. */
export function poleFacts(section: string, poles: PolesReply, model: PlantModel): Fact[] {
  const unit = planeUnit(model.timeBase);
  const counts = new Map<string, number>();
  return slowFirst(poles)
    .map((report) => {
      const state = report.mainState === null ? null : model.states[report.mainState];
      const axis = state?.axis ?? null;
      return { report, state, axis, group: axis === null ? "of no axis" : (model.axes[axis]?.name ?? "") };
    })
    .toSorted((a, b) => (a.axis ?? model.axes.length) - (b.axis ?? model.axes.length))
    .map(({ report, state, axis, group }) => {
      const place = (counts.get(group) ?? 0) + 1;
      counts.set(group, place);
      const value = formatComplex(report.pole);
      const text = unit ? `${value} ${unit}` : value;
      const words = [...(state ? [`mostly ${state.name}`] : []), poleFigureText(report)].join(" · ");
      const label = place === 1 ? `${group}, slowest` : `${group}, ${place}`;
      return { section, key: `${group} ${place}`, label, axis, text, exact: text, note: words };
    });
}

function crossFigure({ worstCrossPeak }: Summary, { commanded }: PlantModel): Figure[] {
  if (!worstCrossPeak) return [];
  const { source, signal, peak } = worstCrossPeak;
  const [moved, asked] = [commanded[signal], commanded[source]];
  const size = peak * (Math.abs(moved.amplitude) || 1);
  return [
    {
      key: "cross",
      label: "cross-axis peak",
      text: `${formatNumber(size)} ${moved.unit}`,
      note: `${moved.name} as ${asked.name} is commanded, ${percentText(100 * peak)} of its own step`,
      size: peak,
    },
  ];
}

function effortFigures({ peakEffort }: Summary, { inputs }: PlantModel): Figure[] {
  return inputs.flatMap(({ name, unit, axis }, index) => {
    if (!peakEffort[index]) return [];
    const { peak, overLimit } = peakEffort[index];
    return {
      key: `effort ${name}`,
      label: `peak effort, ${name}`,
      axis,
      text: `${formatNumber(peak)} ${unit}`,
      note: overLimit === null ? "no limit given" : `${percentText(100 * overLimit)} of its limit`,
      size: peak,
      ...(overLimit !== null && overLimit > 1 ? { mark: { kind: "unmet", word: "Beyond its limit: " } as const } : {}),
    };
  });
}

/** Computed figures count as equal when they agree in every digit shown. */
function summaryFacts(section: string, summary: Summary, model: PlantModel): Fact[] {
  const timed = (key: string, label: string, value: number | null): Figure[] =>
    value === null ? [] : [{ key, label, text: formatSeconds(value), size: value }];
  const { worstSettling, worstRise, worstOvershoot } = summary;
  const figures: Figure[] = [
    ...timed("settling", "settling, 2 %", worstSettling),
    ...timed("rise", "rise, 10–90 %", worstRise),
    ...(worstOvershoot === null
      ? []
      : [{ key: "overshoot", label: "overshoot", text: percentText(worstOvershoot), size: worstOvershoot }]),
    ...crossFigure(summary, model),
    ...effortFigures(summary, model),
  ];
  return figures.map((figure) => ({ ...figure, section, exact: `${figure.text} ${figure.note ?? ""}`.trim() }));
}

function setPointFacts({ evidence: { reference }, model }: DesignRevision): Fact[] {
  const section = "Set points";
  const value = computed(reference);
  if (!value) return refused(section, reference);
  return model.commanded.map(({ name, axis }, index) => {
    const reached = value.reached[index];
    const text = reached ? "reached" : "not reached";
    const mark = reached ? ({ kind: "met", word: "Met: " } as const) : ({ kind: "caution", word: "Caution: " } as const);
    return { section, key: `set point ${name}`, label: name, axis, text, exact: text, mark };
  });
}

/** What was computed about a design, in the order it is read. */
export function evidenceFacts(revision: DesignRevision): Fact[] {
  const { evidence, model } = revision;
  const [loop, estimate] = ["Closed-loop poles", "Observer poles"];
  const poles = computed(evidence.poles);
  const observer = computed(evidence.observer);
  const responses = computed(evidence.responses);
  const stepped = responses !== null && responses.figures.length > 0;
  const { fullState, observer: observed } = responses?.summary ?? {};
  return [
    ...(poles ? poleFacts(loop, poles, model) : refused(loop, evidence.poles)),
    ...(observer ? poleFacts(estimate, observer.poles, model) : refused(estimate, evidence.observer)),
    ...(stepped && fullState
      ? summaryFacts("Figures with the full state, worst over everything commanded", fullState, model)
      : []),
    ...(stepped && observed ? summaryFacts("Figures with the observer, worst over everything commanded", observed, model) : []),
    ...refused("Responses", evidence.responses),
    ...setPointFacts(revision),
  ];
}
