"use client";

import { Checkbox } from "../../ui/checkbox";
import { Segmented } from "../../ui/radio-group";
import { ReasonField } from "./reason-field";
import { useRecipe } from "./recipe-context";
import { fieldId } from "./recipe-fields";
import { matricesOf, type RecipeForm, zeroEntries } from "./recipe-form";
import { RecipeNumber, withAt } from "./recipe-number";
import { SignalFigures } from "./signal-figures";

type Weights = RecipeForm["weights"];

/** As matrices the weights start from what the deviations stand for, until somebody types into them. */
function inForm(weights: Weights, form: Weights["form"]): Weights {
  const follow = form === "matrices" && !weights.ownMatrices && weights.inputs.every((effort) => effort !== null);
  return { ...weights, form, ...(follow ? matricesOf(weights.states, weights.inputs) : {}) };
}

export function WeightsFields() {
  const { form, model, change } = useRecipe();
  const { weights } = form;
  const rewrite = (update: (weights: Weights) => Weights) => (now: RecipeForm) => ({ ...now, weights: update(now.weights) });
  return (
    <div className="flex flex-col gap-4">
      <Segmented
        legend="Weights are given as"
        value={weights.form}
        onChange={(next) =>
          change(
            null,
            rewrite((now) => inForm(now, next)),
          )
        }
        choices={[
          { value: "deviations", label: "Deviations" },
          { value: "matrices", label: "Full matrices" },
        ]}
      />
      {weights.form === "deviations" ? <Deviations /> : <MatrixLinks />}
      <ReasonField of="weights" about="the state weights" />
      <ReasonField of="inputs" about="the input weights" />
      <Checkbox
        label="Cross weight between states and inputs"
        checked={form.cross !== null}
        onChange={({ target }) =>
          change(null, (now) => ({
            ...now,
            cross: target.checked ? zeroEntries(model.states.length, model.inputs.length) : null,
          }))
        }
        hint={form.cross ? "Its matrix stands below the responses." : undefined}
      />
      {form.cross ? <ReasonField of="cross" about="the cross weight" /> : null}
      <RecipeNumber
        label="Degree of stability"
        optional
        pointer="/degreeOfStability"
        unit="1/s"
        value={form.degreeOfStability}
        write={(now, degreeOfStability) => ({ ...now, degreeOfStability })}
        hint={
          model.timeBase.kind === "continuous"
            ? "Every pole decays at least this fast."
            : "Every pole decays at least as fast as exp(−value · t)."
        }
      />
      {form.degreeOfStability === null ? null : <ReasonField of="stability" about="the degree of stability" />}
    </div>
  );
}

const writeState = (now: RecipeForm, index: number, value: number | null): RecipeForm => ({
  ...now,
  weights: { ...now.weights, states: withAt(now.weights.states, index, value) },
});
const writeInput = (now: RecipeForm, index: number, value: number | null): RecipeForm => ({
  ...now,
  weights: { ...now.weights, inputs: withAt(now.weights.inputs, index, value) },
});

function Deviations() {
  const { form, model, start } = useRecipe();
  const { states, inputs } = form.weights;
  return (
    <>
      <SignalFigures
        legend="Largest deviation you would accept"
        what="Largest deviation of"
        hint="Left empty, a state is not weighted. Beneath each: what twice its weight, its figure divided by 1.41, is predicted to change."
        signals={model.states}
        values={states}
        starts={start.weights.states}
        pointer="/weights/states"
        reasonOf="state"
        write={writeState}
      />
      <SignalFigures
        legend="Effort you would spend"
        what="Accepted effort of"
        signals={model.inputs}
        values={inputs}
        starts={start.weights.inputs}
        pointer="/weights/inputs"
        reasonOf="input"
        write={writeInput}
      />
    </>
  );
}

function MatrixLinks() {
  return (
    <p className="text-table">
      Below the responses stand the <a href={`#${fieldId("/weights/state")}`}>state weight</a> and the{" "}
      <a href={`#${fieldId("/weights/input")}`}>input weight</a>, symmetric: an entry off the diagonal is mirrored.
    </p>
  );
}
