import type { PlantModel } from "@/control/plant/model";
import { formatComplex } from "@/control/words/format-complex";
import { formatNumber, formatSeconds } from "@/control/words/format-number";
import type { DesignRevision } from "@/lib/schemas/design";
import type { Summary } from "@/lib/schemas/evidence";
import { planeUnit, poleFigureText, slowFirst } from "../designs/evidence/evidence-words";
import { computed, type PolesReply } from "../designs/evidence/figures-reply";
import type { Measured } from "../designs/measured";
import { percentText } from "../designs/percent-text";
import type { Fact } from "./compared-rows";

type Part = DesignRevision["evidence"]["gains" | "poles" | "observer" | "reference" | "responses"];
type Figure = Omit<Fact, "section" | "exact">;
type Summed = { readonly summary: Summary; readonly model: PlantModel };
type Section = { readonly title: string; readonly loop: string; readonly words: string };

const FULL_STATE: Section = {
  title: "Figures with the full state, worst over everything commanded",
  loop: "full-state",
  words: "with the full state",
};
const OBSERVED: Section = {
  title: "Figures with the observer, worst over everything commanded",
  loop: "observer",
  words: "with the observer",
};

const listed = (parts: readonly (readonly [what: string, unit: string, value: number | null])[]): Measured[] =>
  parts.flatMap(([what, unit, value]) => (value === null ? [] : [{ what, unit, value }]));

/** A refused part is said, not left empty. */
function refused(section: string, part: Part): Fact[] {
  if (part.state !== "refused") return [];
  const text = `${part.title}. ${part.sentence}`;
  return [{ section, key: "refused", label: "not computed", text, exact: text, prose: true }];
}

const poleData = ({ pole, naturalFrequency, damping, timeConstant }: PolesReply[number], unit: string) =>
  listed([
    ["real part", unit, pole.re],
    ["imaginary part, plus and minus", unit, pole.im],
    ["natural frequency", "rad/s", naturalFrequency],
    ["damping", "1", damping],
    ["time constant", "s", timeConstant],
  ]);

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
      const data = poleData(report, unit ?? "1");
      return { section, key: `${group} ${place}`, label, axis, text, exact: text, note: words, data };
    });
}

function crossFigure({ summary: { worstCrossPeak }, model: { commanded } }: Summed): Figure[] {
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
      data: listed([
        [`of ${moved.name} as ${asked.name} is commanded`, moved.unit, size],
        ["over its own step", "1", peak],
      ]),
    },
  ];
}

function effortFigures({ summary: { peakEffort }, model: { inputs } }: Summed): Figure[] {
  return inputs.flatMap(({ name, unit, axis }, index) => {
    if (!peakEffort[index]) return [];
    const { peak, overLimit } = peakEffort[index];
    return {
      // Efforts in different units are no figure of one row.
      key: `effort ${name} ${unit}`,
      label: `peak effort, ${name}`,
      axis,
      text: `${formatNumber(peak)} ${unit}`,
      note: overLimit === null ? "no limit given" : `${percentText(100 * overLimit)} of its limit`,
      size: peak,
      data: listed([
        ["", unit, peak],
        ["over its limit", "1", overLimit],
      ]),
      ...(overLimit !== null && overLimit > 1 ? { mark: { kind: "unmet", word: "Beyond its limit: " } as const } : {}),
    };
  });
}

/** Computed figures count as equal when they agree in every digit shown. */
function summaryFacts({ title, loop, words }: Section, summed: Summed): Fact[] {
  const figure = (key: string, label: string, unit: string, text: (value: number) => string, value: number | null): Figure[] =>
    value === null ? [] : [{ key, label, text: text(value), size: value, data: [{ what: "", unit, value }] }];
  const { worstSettling, worstRise, worstOvershoot } = summed.summary;
  const figures: Figure[] = [
    ...figure("settling", "settling, 2 %", "s", formatSeconds, worstSettling),
    ...figure("rise", "rise, 10–90 %", "s", formatSeconds, worstRise),
    ...figure("overshoot", "overshoot", "%", percentText, worstOvershoot),
    ...crossFigure(summed),
    ...effortFigures(summed),
  ];
  return figures.map((one) => ({
    ...one,
    section: title,
    exact: `${one.text} ${one.note ?? ""}`.trim(),
    sort: { key: `${loop} ${one.key}`, words: `${one.label}, ${words}` },
  }));
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
    ...(stepped && fullState ? summaryFacts(FULL_STATE, { summary: fullState, model }) : []),
    ...(stepped && observed ? summaryFacts(OBSERVED, { summary: observed, model }) : []),
    ...refused("Responses", evidence.responses),
    ...setPointFacts(revision),
  ];
}
