import { joinNames } from "@/control/words/join-names";
import type { Loop } from "./overlay-pictures";
import { type Change, crossChange, effortChanges, overshootChange, riseChange, settlingChange } from "./trade-changes";
import type { TradeFigures, TradeSide } from "./trade-side";

/** The loop that both have; with the observer only where both have one. */
function commonLoop(from: TradeSide, to: TradeSide): Loop {
  return from.figures.observer && to.figures.observer ? "observer" : "full-state";
}

const changesOf = (from: TradeFigures, to: TradeFigures): Change[] => [
  settlingChange(from, to),
  riseChange(from, to),
  overshootChange(from, to),
  crossChange(from, to),
  ...effortChanges(from, to),
];

const texts = (changes: readonly Change[], wanted: "gain" | "cost") =>
  changes.flatMap((change) => (change.kind === wanted ? [change.text] : []));

function mainClause(from: TradeSide, to: TradeSide, changes: readonly Change[]): string {
  const [gains, costs] = [texts(changes, "gain"), texts(changes, "cost")];
  if (gains.length === 0 && costs.length === 0) {
    return changes.some(({ kind }) => kind === "equal")
      ? `${to.label} and ${from.label} agree in every figure that both have`
      : `${to.label} and ${from.label} have no figure in common`;
  }
  const start = `Against ${from.label}, ${to.label}`;
  if (gains.length === 0) return `${start} gains nothing in these figures and costs ${joinNames(costs)}`;
  if (costs.length === 0) return `${start} ${joinNames(gains)}, and no figure that both have gets worse`;
  return `${start} ${joinNames(gains)} for ${joinNames(costs)}`;
}

/** What could not be held against each other, and on what ground the rest was. */
function reservations(from: TradeSide, to: TradeSide, loop: Loop, changes: readonly Change[]): string[] {
  const missing = (side: "from" | "to", { label }: TradeSide) => {
    const names = changes.flatMap((change) => (change.kind === "unmatched" && change.missing === side ? [change.what] : []));
    return names.length === 0 ? [] : [`${joinNames(names)} cannot be compared, since ${label} has no such figure`];
  };
  const observed = [from, to].filter(({ figures }) => figures.observer !== null);
  const bare = [from, to].filter(({ figures }) => figures.observer === null);
  const ground =
    observed.length === 1
      ? [`both with the full state, since ${bare[0].label} has no observer in its loop`]
      : loop === "observer" && from.observer !== to.observer
        ? [`each with its own observer, ${from.label} ${from.observer} and ${to.label} ${to.observer}`]
        : [];
  const plants =
    from.plantRevision === to.plantRevision
      ? []
      : [`on plant revisions ${from.plantRevision} and ${to.plantRevision}, which may differ too`];
  return [...missing("from", from), ...missing("to", to), ...ground, ...plants];
}

function silence({ label, silent }: TradeSide): string[] {
  if (silent === null) return [];
  return [
    silent === "refused" ? `the responses of ${label} were refused` : `${label} follows no reference, so nothing is stepped`,
  ];
}

/** One sentence that says what `to` gains over `from` and what it costs, from their figures alone. */
export function tradeWords(from: TradeSide, to: TradeSide): string {
  const loop = commonLoop(from, to);
  const [before, after] = [from.figures[loop], to.figures[loop]];
  if (!before || !after) {
    return `${to.label} cannot be held against ${from.label}: ${[from, to].flatMap(silence).join("; ")}.`;
  }
  const changes = changesOf(before, after);
  return `${[mainClause(from, to, changes), ...reservations(from, to, loop, changes)].join("; ")}.`;
}
