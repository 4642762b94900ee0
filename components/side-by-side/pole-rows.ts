import type { Complex, PlantModel } from "@/control/plant/model";
import { formatComplex } from "@/control/words/format-complex";
import { poleFigureText } from "../designs/evidence/evidence-words";
import type { PolesReply } from "../designs/evidence/figures-reply";
import type { CompareCell, CompareRow } from "./compare-types";

type Report = PolesReply[number];
type Side = { readonly poles: PolesReply; readonly model: PlantModel };

const distance = (a: Complex, b: Complex) => {
  const size = Math.sqrt(a.re * a.re + a.im * a.im) + Math.sqrt(b.re * b.re + b.im * b.im);
  return size === 0 ? 0 : Math.sqrt((a.re - b.re) ** 2 + (a.im - b.im) ** 2) / size;
};

const stateOf = (report: Report, { states }: PlantModel) =>
  report.mainState === null ? null : (states[report.mainState] ?? null);

/** Poles that mostly move the same state belong together before others do; nearness decides between them. */
const strangeness = (a: Report, ofA: PlantModel, b: Report, ofB: PlantModel) =>
  distance(a.pole, b.pole) + (stateOf(a, ofA)?.name === stateOf(b, ofB)?.name ? 0 : 0.5);

const slowness = ({ timeConstant }: Report) => timeConstant ?? Number.POSITIVE_INFINITY;

type Group = { readonly lead: Report; readonly model: PlantModel; readonly members: (Report | null)[] };

/**
 * Poles of several designs put beside each other: the nearest pairs are joined first, each pole once; what finds no partner has a
 * row of its own. A heuristic for the eye: no number depends on it.
 */
export function matchPoles(
  sides: readonly (Side | null)[],
): { readonly label: Report; readonly model: PlantModel; readonly poles: readonly (Report | null)[] }[] {
  const groups: Group[] = [];
  sides.forEach((side, place) => {
    if (!side) return;
    const free = new Set(side.poles);
    const pairs = groups
      .flatMap((group) =>
        side.poles.map((report) => ({ group, report, cost: strangeness(group.lead, group.model, report, side.model) })),
      )
      .toSorted((a, b) => a.cost - b.cost);
    for (const { group, report } of pairs) {
      if (!free.has(report) || group.members[place]) continue;
      group.members[place] = report;
      free.delete(report);
    }
    for (const report of side.poles) {
      if (!free.has(report)) continue;
      const members: (Report | null)[] = sides.map(() => null);
      members[place] = report;
      groups.push({ lead: report, model: side.model, members });
    }
  });
  return groups
    .toSorted((a, b) => slowness(b.lead) - slowness(a.lead))
    .map(({ lead, model, members }) => ({ label: lead, model, poles: members }));
}

const cellOf = (report: Report | null): CompareCell | null =>
  report && {
    text: formatComplex(report.pole),
    exact: `${report.pole.re} ${report.pole.im}`,
    note: poleFigureText(report),
  };

export function poleRows(kind: string, sides: readonly (Side | null)[]): CompareRow[] {
  return matchPoles(sides).map(({ label, model, poles }, place) => {
    const state = stateOf(label, model);
    return {
      key: `${kind} ${place}`,
      label: state ? `mostly ${state.name}` : `pole ${place + 1}`,
      axis: state?.axis ?? null,
      cells: sides.map((_, index) => cellOf(poles[index] ?? null)),
    };
  });
}
