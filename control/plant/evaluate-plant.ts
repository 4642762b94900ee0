import { NumericalError } from "../errors";
import { evaluateExpression } from "../expression/evaluate-expression";
import { parsePlainNumber } from "../expression/plain-number";
import type { PlantContent } from "./content";
import { commandedOf, MATRIX_NAMES, type MatrixName, matricesOf } from "./content-shape";
import { expressionMessage } from "./expression-message";
import type { PlantModel } from "./model";
import { parameterValues } from "./parameter-values";
import { error, type PlantProblem } from "./plant-problem";
import { signalProblems } from "./signal-problems";

export type PlantEvaluation = {
  /** Null while any error stands. */
  readonly model: PlantModel | null;
  readonly problems: readonly PlantProblem[];
  /** Evaluated entries by matrix, null where an entry has no value. */
  readonly values: Readonly<Record<MatrixName, (number | null)[][]>>;
  readonly parameters: ReadonlyMap<string, number>;
};

function evaluateMatrix(
  name: MatrixName,
  content: PlantContent,
  parameters: ReadonlyMap<string, number>,
  problems: PlantProblem[],
) {
  const { entries, rows, columns } = matricesOf(content)[name];
  const declared = new Set(content.parameters.map((parameter) => parameter.name));
  const derived = content.commanded === null && (name === "H" || name === "J");
  const report = (pointer: string, message: string) => derived || problems.push(error(pointer, message));
  if (entries.length !== rows) report(`/${name}`, `${name} needs ${rows} rows; it has ${entries.length}`);
  return entries.map((row, i) => {
    if (row.length !== columns) report(`/${name}/${i}`, `Row ${i + 1} of ${name} needs ${columns} entries; it has ${row.length}`);
    return row.map((text, j) => {
      const plain = parsePlainNumber(text);
      if (plain !== null) return plain;
      try {
        return evaluateExpression(text, parameters);
      } catch (cause) {
        if (!(cause instanceof NumericalError)) throw cause;
        report(`/${name}/${i}/${j}`, expressionMessage(cause, declared));
        return null;
      }
    });
  });
}

/**
 * Turns a plant as typed into the doubles that everything is computed from, or says at each field what is in the way.
 *
 * Shapes    as `PlantModel`; D and J default to zeros, commanded quantities to the outputs, the operating point to zero
 * Units     entries keep the units of their signals; none is converted
 * Throws    nothing: every defect is a `PlantProblem` with its place
 * Accuracy  same doubles on server and in the browser: one walk over the expression, ECMAScript arithmetic
 */
export function evaluatePlant(content: PlantContent): PlantEvaluation {
  const { values: parameters, problems } = parameterValues(content.parameters);
  problems.push(...signalProblems(content));
  const values = Object.fromEntries(
    MATRIX_NAMES.map((name) => [name, evaluateMatrix(name, content, parameters, problems)]),
  ) as Record<MatrixName, (number | null)[][]>;
  problems.push(...idleSignals(content, values));
  const blocked = problems.some(({ severity }) => severity === "error");
  return { model: blocked ? null : assemble(content, values as Record<MatrixName, number[][]>), problems, values, parameters };
}

function idleSignals(content: PlantContent, values: Record<MatrixName, (number | null)[][]>): PlantProblem[] {
  const found: PlantProblem[] = [];
  content.inputs.forEach(({ name }, j) => {
    const column = [...values.B, ...values.D].map((row) => row[j]);
    if (column.length > 0 && column.every((entry) => entry === 0)) {
      found.push({ pointer: `/B/0/${j}`, severity: "caution", message: `Input ${name} moves nothing: its whole column is zero` });
    }
  });
  content.outputs.forEach(({ name }, i) => {
    const row = [...(values.C[i] ?? []), ...(values.D[i] ?? [])];
    if (row.length > 0 && row.every((entry) => entry === 0)) {
      found.push({ pointer: `/C/${i}/0`, severity: "caution", message: `Output ${name} reads nothing: its whole row is zero` });
    }
  });
  return found;
}

function assemble(content: PlantContent, matrices: Record<MatrixName, number[][]>): PlantModel {
  const { timeBase, axes, states, outputs, disturbances } = content;
  const rest = (signals: readonly unknown[]) => signals.map(() => 0);
  const given = content.operatingPoint ?? { states: rest(states), inputs: rest(content.inputs), outputs: rest(outputs) };
  const operatingPoint = {
    states: given.states.map(unsignedZero),
    inputs: given.inputs.map(unsignedZero),
    outputs: given.outputs.map(unsignedZero),
  };
  const inputs = content.inputs.map((input) => ({ ...input, lower: limit(input.lower), upper: limit(input.upper) }));
  const commanded = commandedOf(content).map((each) => ({ ...each, amplitude: unsignedZero(each.amplitude) }));
  return { timeBase, axes, states, inputs, outputs, disturbances, commanded, ...matrices, operatingPoint };
}

/** JSON writes -0 as 0, and a plant is to have the same bits before it is stored and after. */
const unsignedZero = (x: number) => x + 0;
const limit = (x: number | null) => (x === null ? null : unsignedZero(x));
