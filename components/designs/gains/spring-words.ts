import type { VirtualSprings } from "@/control/design/virtual-springs";
import { formatNumber } from "@/control/words/format-number";

const DAMPERS = {
  always: "The dampers take energy out of every motion.",
  some: "The dampers take energy out of some motions and feed it into others.",
  never: "The dampers take energy out of no motion.",
} as const;
const SPRINGS = {
  always: "The springs pull back in every direction.",
  some: "The springs pull back in some directions and push away in others.",
  never: "The springs pull back in no direction.",
} as const;

/** What the feedback does with energy, in sentences. */
export function springWords({ energy, others }: VirtualSprings, states: readonly { readonly name: string }[]): string[] {
  const left = others.map((index) => states[index].name);
  const rest = left.length === 0 ? [] : [`Not read as a spring or a damper: the gains of ${left.join(", ")}.`];
  if (!energy) return ["The inputs do not push along these positions one for one, so nothing is said about energy.", ...rest];
  const cycle =
    energy.unsymmetric > 0.001
      ? [
          `${formatNumber(100 * energy.unsymmetric, 2)} % of the stiffness is unsymmetric: round a cycle that part can feed energy in or take it out.`,
        ]
      : [];
  return [DAMPERS[energy.dissipates], SPRINGS[energy.restores], ...cycle, ...rest];
}
