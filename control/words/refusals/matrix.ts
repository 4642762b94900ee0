import type { PlantModel } from "../../plant/model";
import { formatNumber } from "../format-number";
import { numberOf, signalName, sizeOf, startSentence, textOf } from "./facts";
import type { Explainers, Facts, RefusalWords } from "./types";

const NAMES: Readonly<Record<string, string>> = {
  A: "the plant matrix A",
  B: "the input matrix B",
  C: "the output matrix C",
  D: "the feed-through matrix D",
  E: "the disturbance matrix E",
  H: "the commanded matrix H",
  J: "the commanded feed-through J",
  Q: "the state weight",
  R: "the input weight",
  S: "the cross weight",
  "[Q S; S' R]": "the whole of state, cross and input weight",
  K: "the gain",
  L: "the observer gain",
  F: "the reference gain",
  "process noise": "the process noise",
  "measurement noise": "the measurement noise",
  poles: "the list of poles",
};

/** What grew too large; names that only the core knows are not shown. */
const RESULTS: Readonly<Record<string, string>> = {
  eigenvalue: "A mode of the plant",
  response: "A response",
  entry: "A rate of the loop times the length of the response",
  gain: "A gain",
  "closed loop": "The closed loop",
  "gain at rest": "The gain at rest",
  "reference gain": "The reference gain",
  weights: "A weight",
  spread: "The ratio between the entries of the plant and of its weights",
  states: "The number of states",
  inputs: "The number of inputs",
  outputs: "The number of outputs",
};

/** The signals along one side of a matrix. */
function signalsOf(matrix: string, side: "row" | "column", model: PlantModel): readonly { readonly name: string }[] {
  const byState = side === "row" ? ["A", "B", "E", "Q", "S", "L"] : ["A", "C", "H", "Q", "K"];
  const byInput = side === "row" ? ["R", "K", "F"] : ["B", "D", "J", "R", "S"];
  if (byState.includes(matrix) || matrix === "process noise") return model.states;
  if (byInput.includes(matrix)) return model.inputs;
  if (matrix === "[Q S; S' R]") return [...model.states, ...model.inputs];
  if (matrix === "E") return model.disturbances;
  if (["H", "J", "F"].includes(matrix)) return model.commanded;
  return ["C", "D", "L", "measurement noise"].includes(matrix) ? model.outputs : [];
}

function matrixName(data: Facts): string {
  const name = textOf(data, "matrix");
  return name !== null && Object.hasOwn(NAMES, name) ? NAMES[name] : "an inner equation";
}

function place(data: Facts, model: PlantModel): string {
  const matrix = textOf(data, "matrix") ?? "A";
  const row = signalName(signalsOf(matrix, "row", model), numberOf(data, "row"), "row");
  const column = signalName(signalsOf(matrix, "column", model), numberOf(data, "column"), "column");
  if (row === null && column === null) return "";
  if (column === null) return ` (row ${row})`;
  return row === null ? ` (column ${column})` : ` (row ${row}, column ${column})`;
}

function alongDiagonal(data: Facts, model: PlantModel): string {
  const signal = signalName(signalsOf(textOf(data, "matrix") ?? "Q", "row", model), numberOf(data, "index"), "entry");
  return signal === null ? "" : `, first seen at ${signal}`;
}

function shapeMismatch(data: Facts): RefusalWords {
  const expected = sizeOf(data, "expected");
  const given = sizeOf(data, "given");
  const sizes = expected !== null && given !== null ? ` It should be ${expected} and is ${given}.` : "";
  return {
    title: "Sizes do not fit",
    sentence: `${startSentence(matrixName(data))} does not have one row and one column for each of its signals.${sizes}`,
    nextStep: "Compare its rows and columns with the lists of states, inputs and outputs.",
  };
}

function tooLarge(data: Facts): RefusalWords {
  const what = textOf(data, "what");
  const limit = numberOf(data, "limit");
  const name = what !== null && Object.hasOwn(RESULTS, what) ? RESULTS[what] : "A number on the way to the result";
  return {
    title: "Numbers too large",
    sentence: `${name} goes beyond ${limit === null ? "the limit" : `the limit of ${formatNumber(limit)}`}.`,
    nextStep:
      what === "entry"
        ? "Choose a shorter length of the response."
        : "Choose units in which the entries lie nearer to 1, or make the problem smaller.",
  };
}

function notPositiveDefinite(data: Facts, model: PlantModel): RefusalWords {
  const noise = (textOf(data, "matrix") ?? "").endsWith("noise");
  const demand = noise ? "must leave every signal with some noise" : "must cost something in every direction";
  return {
    title: noise ? "Noise not positive" : "Weight not positive",
    sentence: `${startSentence(matrixName(data))} ${demand}, and there is one ${noise ? "combination that has none" : "that costs nothing or less"}${alongDiagonal(data, model)}.`,
    nextStep: "Make its diagonal entries larger than zero, and large enough against the entries beside them.",
  };
}

function notPositiveSemidefinite(data: Facts, model: PlantModel): RefusalWords {
  const noise = (textOf(data, "matrix") ?? "").endsWith("noise");
  const least = numberOf(data, "eigenvalue");
  const found = least === null ? "" : ` (smallest eigenvalue ${formatNumber(least)})`;
  return {
    title: noise ? "Noise below zero" : "Weight rewards motion",
    sentence: `${startSentence(matrixName(data))} is negative in one direction${alongDiagonal(data, model)}${found}${noise ? ", which no noise can be" : ", so that motion would lower the cost"}.`,
    nextStep: noise
      ? "Make the diagonal larger, or the entries beside it smaller."
      : "Make the diagonal larger, or the entries beside it smaller; with a cross weight, the state weight must outweigh it.",
  };
}

function singular(data: Facts, model: PlantModel): RefusalWords {
  return {
    title: "No unique solution",
    sentence: `${startSentence(matrixName(data))} has no inverse within rounding: one of its rows follows from the others${place(data, model)}.`,
    nextStep: "Look for two signals that say the same thing, or for a row that was left at zero.",
  };
}

/** Refusals about a matrix as such. */
export const explainMatrix: Pick<
  Explainers,
  | "shape-mismatch"
  | "not-finite"
  | "too-large"
  | "no-convergence"
  | "singular"
  | "not-symmetric"
  | "not-positive-definite"
  | "not-positive-semidefinite"
> = {
  "shape-mismatch": shapeMismatch,
  "not-finite": (data, model) => ({
    title: "An entry is not a number",
    sentence: `${startSentence(matrixName(data))} has no finite number${place(data, model)}.`,
    nextStep: "Enter a number there, or check the expression for a division by zero.",
  }),
  "too-large": tooLarge,
  "no-convergence": () => ({
    title: "The computation did not settle",
    sentence: "An iteration reached its limit before its result stood still, so nothing is shown rather than a doubtful figure.",
    nextStep:
      "Choose units in which the entries of the plant lie nearer to each other; declared deviations per signal do that for you.",
  }),
  singular,
  "not-symmetric": (data, model) => ({
    title: "Not symmetric",
    sentence: `${startSentence(matrixName(data))} differs from its mirror image${place(data, model)}.`,
    nextStep: "Give both entries of the pair the same value.",
  }),
  "not-positive-definite": notPositiveDefinite,
  "not-positive-semidefinite": notPositiveSemidefinite,
};
