import type { PlantModel, Rows } from "../plant/model";
import type { ObserverRecipe, PoleEntry, Recipe, WeightsRecipe } from "./recipe";

/** `pointer` is a JSON pointer into the recipe. */
export type RecipeProblem = { readonly pointer: string; readonly message: string };

/** How many poles an entry stands for. */
export const polesOf = (entry: PoleEntry): number => (entry.kind === "pair" || entry.kind === "damping" ? 2 : 1);
export const poleCount = (entries: readonly PoleEntry[]): number => entries.reduce((sum, entry) => sum + polesOf(entry), 0);

function shapeProblem(pointer: string, what: string, matrix: Rows, rows: number, columns: number): RecipeProblem[] {
  if (matrix.length !== rows || matrix.some((row) => row.length !== columns)) {
    return [{ pointer, message: `${what} needs ${rows} rows of ${columns} entries, in the order of the plant's signals` }];
  }
  return [];
}

function symmetricProblem(
  pointer: string,
  what: string,
  matrix: Rows,
  names: readonly { readonly name: string }[],
): RecipeProblem[] {
  const found = shapeProblem(pointer, what, matrix, names.length, names.length);
  if (found.length > 0) return found;
  for (let i = 0; i < names.length; i++) {
    for (let j = 0; j < i; j++) {
      if (matrix[i][j] !== matrix[j][i]) {
        const message = `${what} must be symmetric: ${names[i].name}, ${names[j].name} and ${names[j].name}, ${names[i].name} differ`;
        return [{ pointer: `${pointer}/${i}/${j}`, message }];
      }
    }
  }
  return [];
}

function lengthProblem(pointer: string, what: string, given: number, wanted: number): RecipeProblem[] {
  return given === wanted ? [] : [{ pointer, message: `${what} needs ${wanted} values; it has ${given}` }];
}

function weightsProblems(recipe: WeightsRecipe, { states, inputs }: PlantModel): RecipeProblem[] {
  const { weights, crossWeight } = recipe;
  const own =
    weights.form === "deviations"
      ? [
          ...lengthProblem("/weights/states", "The list of accepted deviations", weights.states.length, states.length),
          ...lengthProblem("/weights/inputs", "The list of accepted efforts", weights.inputs.length, inputs.length),
        ]
      : [
          ...symmetricProblem("/weights/state", "The state weight", weights.state, states),
          ...symmetricProblem("/weights/input", "The input weight", weights.input, inputs),
        ];
  const cross = crossWeight ? shapeProblem("/crossWeight", "The cross weight", crossWeight, states.length, inputs.length) : [];
  return [...own, ...cross];
}

function countProblem(pointer: string, entries: readonly PoleEntry[], wanted: number): RecipeProblem[] {
  const given = poleCount(entries);
  return given === wanted
    ? []
    : [{ pointer, message: `${wanted} poles are needed, one for each state; ${given} are given (a pair counts as two)` }];
}

function observerProblems(observer: ObserverRecipe, { states, outputs }: PlantModel): RecipeProblem[] {
  if (observer.kind === "none") return [];
  if (outputs.length === 0) return [{ pointer: "/observer/kind", message: "An observer needs at least one measured output" }];
  if (observer.kind === "poles") return countProblem("/observer/poles", observer.poles, states.length);
  if (observer.kind === "noise") {
    return [
      ...symmetricProblem("/observer/process", "The process noise", observer.process, states),
      ...symmetricProblem("/observer/measurement", "The measurement noise", observer.measurement, outputs),
    ];
  }
  const most = states.length - 1;
  const given = poleCount(observer.poles);
  if (given <= most) return [];
  return [{ pointer: "/observer/poles", message: `A reduced-order observer has at most ${most} poles here; ${given} are given` }];
}

/**
 * Whether a recipe fits the plant it is for: lengths, shapes, symmetry, numbers of poles. What depends on the numbers
 * (definite weights, modes that cannot be moved) is for the solvers to say.
 *
 * Shapes    any recipe beside any plant
 * Units     none
 * Throws    nothing
 * Accuracy  exact: lengths are counted and entries compared as they are
 * Source    the shapes stated beside `Recipe`
 */
export function recipeProblems(recipe: Recipe, model: PlantModel): RecipeProblem[] {
  const { test } = recipe;
  return [
    ...(recipe.method === "weights" ? weightsProblems(recipe, model) : countProblem("/poles", recipe.poles, model.states.length)),
    ...observerProblems(recipe.observer, model),
    ...lengthProblem("/test/initialState", "The initial state", test.initialState.length, model.states.length),
    ...lengthProblem(
      "/test/inputDisturbance",
      "The list of input disturbances",
      test.inputDisturbance.length,
      model.inputs.length,
    ),
  ];
}
