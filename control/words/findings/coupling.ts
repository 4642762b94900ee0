import type { PlantModel, Rows } from "../../plant/model";
import type { PlantChecks } from "../../plant/report";
import { formatNumber, formatPercent } from "../format-number";
import { type Finding, findingOf } from "./finding";

/** Which axis acts most on which other, and whether inputs and commanded quantities pair up at rest. */
export function couplingFinding({ coupling }: PlantChecks, model: PlantModel): Finding {
  return findingOf("coupling", model, coupling, ({ blocks, relativeGain }) => {
    const gain = relativeGain === null ? null : pairing(relativeGain, model);
    const between = betweenAxes(blocks, model);
    return {
      tone: gain?.reversed ? "caution" : "met",
      headline: between.headline,
      sentence: gain === null ? between.sentence : `${between.sentence} ${gain.sentence}`,
    };
  });
}

function betweenAxes(blocks: Rows, model: PlantModel): { headline: string; sentence: string } {
  const names = [...model.axes.map(({ name }) => name), "signals of no axis"];
  let strongest = { row: -1, column: -1, share: 0 };
  let square = 0;
  blocks.forEach((shares, row) => {
    shares.forEach((share, column) => {
      if (row === column) return;
      square += share * share;
      if (share > strongest.share) strongest = { row, column, share };
    });
  });
  if (strongest.share === 0) {
    const sentence = model.axes.length > 1 ? "No state of one axis acts on another inside the plant." : "There is one axis only.";
    return { headline: "No coupling between axes", sentence };
  }
  return {
    headline: `Coupling between axes: ${formatPercent(Math.sqrt(square))} of the plant`,
    sentence: `Strongest: ${names[strongest.column]} acts on ${names[strongest.row]}, ${formatPercent(strongest.share)} of the scaled plant matrix.`,
  };
}

/** Input with the same place as the commanded quantity is taken as its partner. */
function pairing(gain: Rows, model: PlantModel): { reversed: boolean; sentence: string } | null {
  if (gain.length < 2) return null;
  const own = gain.map((row, k) => row[k]);
  const worst = own.reduce((best, value, k) => (value < own[best] ? k : best), 0);
  const names = `${model.inputs[worst]?.name ?? `input ${worst + 1}`} and ${model.commanded[worst]?.name ?? `quantity ${worst + 1}`}`;
  const value = formatNumber(own[worst], 3);
  if (own[worst] < 0) {
    return {
      reversed: true,
      sentence: `At rest, closing the other loops turns the effect of ${names} around (relative gain ${value}): single loops paired like that fight each other.`,
    };
  }
  return {
    reversed: false,
    sentence: `At rest the relative gain of each input on the commanded quantity of the same place is at least ${value} (${names}); 1 means that the other loops do not matter.`,
  };
}
