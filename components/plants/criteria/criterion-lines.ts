import type { Criterion } from "@/control/design/criteria";
import type { PlantContent } from "@/control/plant/content";
import { commandedOf } from "@/control/plant/content-shape";
import { CRITERION_WORDS } from "@/control/words/describe-criterion";

/** A criterion as it is being written; `key` stays with it while others come and go. */
export type CriterionLine = Omit<Criterion, "limit"> & { readonly key: string; readonly limit: number | null };

export const KINDS = Object.keys(CRITERION_WORDS) as Criterion["kind"][];

/** `round`: another one makes fields anew, with nothing left of what was typed into them. */
export const linesOf = (criteria: readonly Criterion[], round: number): CriterionLine[] =>
  criteria.map((criterion, place) => ({ ...criterion, key: `${round} ${place}` }));

/** What is sent: an empty limit goes along, so that its refusal comes back to its field. */
export const sentOf = (lines: readonly CriterionLine[]): Criterion[] => lines.map(({ key: _, ...line }) => line as Criterion);

const plain = ({ kind, signal, limit }: Omit<Criterion, "limit"> & { readonly limit: number | null }) =>
  JSON.stringify([kind, signal, limit]);
export const saysTheSame = (
  a: readonly CriterionLine[] | readonly Criterion[],
  b: readonly CriterionLine[] | readonly Criterion[],
) => a.map(plain).join() === b.map(plain).join();

/** Signals that a kind can be about: commanded quantities, or the inputs that have a limit. */
export function signalsOf(kind: Criterion["kind"], content: PlantContent): string[] {
  const inputs = content.inputs.filter(({ lower, upper }) => lower !== null || upper !== null);
  const names = (kind === "effort" ? inputs : commandedOf(content)).map(({ name }) => name);
  // While a plant is being written, a name may be missing or stand there twice.
  return [...new Set(names)].filter((name) => name !== "");
}

/** The next line worth writing: a kind that nothing limits yet, else one that some signal is free for. */
export function nextLine(lines: readonly CriterionLine[], content: PlantContent, key: string): CriterionLine {
  const free = KINDS.flatMap((kind) =>
    [null, ...signalsOf(kind, content)]
      .filter((signal) => !lines.some((line) => line.kind === kind && line.signal === signal))
      .map((signal) => ({ kind, signal })),
  );
  const { kind, signal } = free.find((one) => lines.every((line) => line.kind !== one.kind)) ??
    free[0] ?? { kind: KINDS[0], signal: null };
  return { key, kind, signal, limit: null };
}

/** Another kind is about other signals: one that it cannot be about becomes the worst over all. */
export function withKind(line: CriterionLine, kind: Criterion["kind"], content: PlantContent): CriterionLine {
  const fits = line.signal === null || signalsOf(kind, content).includes(line.signal);
  return { ...line, kind, signal: fits ? line.signal : null };
}
