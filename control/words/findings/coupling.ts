import type { PlantModel, Rows } from "../../plant/model";
import type { PlantChecks } from "../../plant/report";
import { formatNumber, formatPercent } from "../format-number";
import { joinNames } from "../join-names";
import { type Finding, findingOf } from "./finding";

/** Which axis acts most on which other, and how inputs and commanded quantities pair up at rest. */
export function couplingFinding({ coupling }: PlantChecks, model: PlantModel): Finding {
  return findingOf("coupling", model, coupling, ({ blocks, relativeGain, relativeGainBasis }) => {
    const { headline, sentence } = betweenAxes(blocks, model);
    const pairs = relativeGain === null ? "" : pairing(relativeGain, model, relativeGainBasis === "limit");
    return { tone: "met", headline, sentence: `${sentence}${relativeGainBasis === "no-limit" ? UNPAIRED : pairs}` };
  });
}

const UNPAIRED =
  " Relative gains have no value at rest: towards low frequencies the inputs act on the commanded quantities alike, and no pairing of single loops stands out.";

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
    return model.axes.length > 1
      ? { headline: "No coupling between axes", sentence: "No state of one axis acts on another inside the plant." }
      : { headline: "One axis only", sentence: "There is no other axis that it could be coupled with." };
  }
  return {
    headline: `Coupling between axes: ${formatPercent(Math.sqrt(square))} of the plant`,
    sentence: `Strongest: ${names[strongest.column]} acts on ${names[strongest.row]}, ${formatPercent(strongest.share)} of the scaled plant matrix.`,
  };
}

/** Input and commanded quantity whose relative gain is nearest 1 first, then the best of what is left. */
function pairing(gain: Rows, model: PlantModel, limit: boolean): string {
  const size = gain.length;
  if (size < 2) return "";
  const candidates = gain.flatMap((row, quantity) => row.map((value, input) => ({ quantity, input, value })));
  candidates.sort((x, y) => Math.abs(x.value - 1) - Math.abs(y.value - 1) || x.quantity - y.quantity || x.input - y.input);
  const pairs: typeof candidates = [];
  for (const one of candidates) {
    if (!pairs.some(({ quantity, input }) => quantity === one.quantity || input === one.input)) pairs.push(one);
  }
  const words = pairs
    .sort((x, y) => x.quantity - y.quantity)
    .map(({ quantity, input, value }) => {
      const commanded = model.commanded[quantity]?.name ?? `quantity ${quantity + 1}`;
      return `${commanded} with ${model.inputs[input]?.name ?? `input ${input + 1}`} (${formatNumber(value, 3)})`;
    });
  return ` By relative gain ${limit ? "towards low frequencies" : "at rest"}, ${joinNames(words)} pair best; the farther from 1, the more single loops would disturb each other.`;
}
