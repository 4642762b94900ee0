import type { PlantModel } from "../../plant/model";
import type { ModeReport, PlantChecks } from "../../plant/report";
import { describeMode } from "../describe-mode";
import { formatNumber } from "../format-number";
import { startSentence } from "../refusals/facts";
import { type Finding, findingOf, plural } from "./finding";

/** How the plant behaves with its inputs held. */
export function stabilityFinding({ modes }: PlantChecks, model: PlantModel): Finding {
  return findingOf("stability", model, modes, (all) => {
    const growing = all.filter(({ stable, marginal }) => !stable && !marginal);
    const resting = all.filter(({ marginal }) => marginal);
    if (growing.length > 0) {
      return {
        tone: "caution",
        headline: "Unstable without feedback",
        sentence: `${plural(growing.length, "mode")} of ${all.length} ${growing.length === 1 ? "grows" : "grow"} when the inputs are held: ${listed(growing, model)}. It stands only while the loop is closed.`,
      };
    }
    if (resting.length > 0) {
      return {
        tone: "caution",
        headline: "On the stability boundary without feedback",
        sentence: `Held inputs leave ${plural(resting.length, "mode")} of ${all.length} that neither ${resting.length === 1 ? "decays nor grows" : "decay nor grow"}: ${listed(resting, model)}.`,
      };
    }
    return { tone: "met", headline: "Stable without feedback", sentence: leastDamped(all, model) };
  });
}

function listed(modes: readonly ModeReport[], model: PlantModel): string {
  const shown = modes.slice(0, 3).map((mode) => describeMode(mode, model));
  return modes.length > 3 ? `${shown.join("; ")}; and ${modes.length - 3} more` : shown.join("; ");
}

function leastDamped(modes: readonly ModeReport[], model: PlantModel): string {
  const oscillations = modes.filter(({ damping, pole }) => damping !== null && pole.im !== 0);
  const slowest = modes[0];
  if (oscillations.length === 0) return `All ${modes.length} modes decay. Slowest: ${describeMode(slowest, model)}.`;
  const least = oscillations.reduce((best, mode) => ((mode.damping ?? 1) < (best.damping ?? 1) ? mode : best));
  return startSentence(
    `${modes.length === 1 ? "the only mode decays" : `all ${modes.length} modes decay`}. Least damped: ${describeMode(least, model)}, damping ratio ${formatNumber(least.damping ?? 0, 3)}.`,
  );
}
