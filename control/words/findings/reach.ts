import type { PlantModel } from "../../plant/model";
import type { ModeReport, Part, PlantChecks, RankReport } from "../../plant/report";
import { describeMode } from "../describe-mode";
import { formatNumber, formatPercent } from "../format-number";
import { joinNames, leadingNames } from "../join-names";
import { startSentence } from "../refusals/facts";
import { type Finding, findingOf, plural, type Tone } from "./finding";

/** No machine's model is known to more than four digits: a verdict that a smaller change would overturn is a weak one. */
const WEAK = 1e-4;

/** Steering and sight are one check seen from two ends; these are the words of each end. */
type Side = {
  readonly key: string;
  readonly rank: (checks: PlantChecks) => Part<RankReport>;
  readonly whole: (checks: PlantChecks) => Part<boolean>;
  readonly hidden: (mode: ModeReport) => boolean;
  readonly distance: (mode: ModeReport) => number;
  readonly through: (mode: ModeReport, model: PlantModel) => string;
  readonly all: string;
  readonly some: (count: number) => string;
  readonly cut: string;
  readonly hardest: string;
  readonly lost: string;
  readonly decaying: string;
};

const STEERING: Side = {
  key: "steering",
  rank: ({ controllability }) => controllability,
  whole: ({ stabilizable }) => stabilizable,
  hidden: ({ controllable }) => !controllable,
  distance: ({ controlDistance }) => controlDistance,
  through: ({ inputShare }, model) => through("reached through", leadingNames(inputShare, model.inputs)),
  all: "Every mode can be steered",
  some: (count) => `${plural(count, "mode")} cannot be steered`,
  cut: "cut it off from the inputs",
  hardest: "Hardest to move",
  lost: "No state feedback can stabilise this plant: add an input that acts there, or look for a missing entry in A and B.",
  decaying: "What is left alone decays by itself, so the plant can be stabilised, but no design changes that part.",
};

const SIGHT: Side = {
  key: "sight",
  rank: ({ observability }) => observability,
  whole: ({ detectable }) => detectable,
  hidden: ({ observable }) => !observable,
  distance: ({ observeDistance }) => observeDistance,
  through: ({ outputShare }, model) => through("seen by", leadingNames(outputShare, model.outputs)),
  all: "Every mode can be seen",
  some: (count) => `${plural(count, "mode")} cannot be seen`,
  cut: "hide it from the outputs",
  hardest: "Hardest to tell",
  lost: "No observer on these outputs can follow this plant: add a sensor that sees it, or look for a missing entry in A and C.",
  decaying:
    "What is not seen decays by itself, so an observer still works, but its estimate of that part is no better than the model.",
};

export function steeringFinding(checks: PlantChecks, model: PlantModel): Finding {
  return reachFinding(STEERING, checks, model);
}

export function sightFinding(checks: PlantChecks, model: PlantModel): Finding {
  if (model.outputs.length === 0) {
    return {
      key: SIGHT.key,
      tone: "caution",
      headline: "Nothing is measured",
      sentence: "The plant has no outputs, so only designs on the full state are possible.",
    };
  }
  return reachFinding(SIGHT, checks, model);
}

function reachFinding(side: Side, checks: PlantChecks, model: PlantModel): Finding {
  return findingOf(side.key, model, side.rank(checks), (report) => {
    const modes = checks.modes.state === "computed" ? checks.modes.value : [];
    const hidden = modes.filter(side.hidden);
    if (hidden.length === 0 && report.rank === report.full) return weakestWords(side, modes, report, model);
    const whole = side.whole(checks);
    const lost = whole.state === "computed" && !whole.value;
    const named = hidden.slice(0, 3).map((mode) => describeMode(mode, model));
    const more = hidden.length > 3 ? `; and ${hidden.length - 3} more` : "";
    return {
      tone: lost ? "not-met" : "caution",
      headline: side.some(Math.max(1, hidden.length)),
      sentence: `${named.length > 0 ? `${startSentence(named.join("; "))}${more}. ` : ""}${lost ? side.lost : side.decaying} ${rankWords(report)}`,
    };
  });
}

function weakestWords(side: Side, modes: readonly ModeReport[], report: RankReport, model: PlantModel): Omit<Finding, "key"> {
  const weak = report.weakestValue < WEAK;
  const tone: Tone = weak ? "caution" : "met";
  const direction = leadingNames(report.weakestDirection, model.states);
  const hardest = direction.length === 0 ? "" : ` ${side.hardest}: ${joinNames(direction)}.`;
  if (modes.length === 0) return { tone, headline: side.all, sentence: `${rankWords(report)}${hardest}` };
  const weakest = modes.reduce((best, mode) => (side.distance(mode) < side.distance(best) ? mode : best));
  const effort = `a change of ${formatPercent(side.distance(weakest))} of the scaled model would ${side.cut}`;
  return {
    tone,
    headline: weak ? `${side.all}, one only weakly` : side.all,
    sentence: `Weakest: ${describeMode(weakest, model)}${side.through(weakest, model)}; ${effort}.${hardest}`,
  };
}

function rankWords({ rank, full, singularValues, tolerance }: RankReport): string {
  const nearest = singularValues[singularValues.length - 1];
  const held =
    nearest === undefined
      ? ""
      : `; smallest singular value ${formatNumber(nearest, 2)} against a tolerance of ${formatNumber(tolerance, 2)}`;
  return `Rank ${rank} of ${full}${held}.`;
}

function through(verb: string, names: readonly string[]): string {
  return names.length === 0 ? "" : `, ${verb} ${joinNames(names)}`;
}
