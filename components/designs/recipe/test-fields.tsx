"use client";

import { Disclosure } from "../../ui/disclosure";
import { Segmented } from "../../ui/radio-group";
import { useOnceTrue } from "../use-once-true";
import { ReasonField } from "./reason-field";
import { useRecipe } from "./recipe-context";
import type { RecipeForm } from "./recipe-form";
import { RecipeNumber, withAt } from "./recipe-number";
import { SignalFigures } from "./signal-figures";

type Test = RecipeForm["test"];

export function ReferenceFields() {
  const { form, model, change } = useRecipe();
  if (model.commanded.length === 0)
    return <p className="text-sm text-soft">The plant has no commanded quantities, so there is no reference.</p>;
  return (
    <div className="flex flex-col gap-2">
      <Segmented
        legend="Reference"
        value={form.reference}
        onChange={(reference) => change(null, (now) => ({ ...now, reference }))}
        choices={[
          { value: "feed-through", label: "Feed-through" },
          { value: "none", label: "None" },
        ]}
        hint={
          form.reference === "feed-through"
            ? "F leads the commanded quantities to their set points where the plant allows it."
            : "The loop only holds its operating point; no steps are shown."
        }
      />
      <ReasonField of="reference" about="the reference" />
    </div>
  );
}

const writing = (now: RecipeForm, test: Partial<Test>): RecipeForm => ({ ...now, test: { ...now.test, ...test } });
const writeInitial = (now: RecipeForm, index: number, value: number | null) =>
  writing(now, { initialState: withAt(now.test.initialState, index, value) });
const writeDisturbance = (now: RecipeForm, index: number, value: number | null) =>
  writing(now, { inputDisturbance: withAt(now.test.inputDisturbance, index, value) });

/** What the responses are tried with. */
export function TestFields() {
  const { form, model, problemAt } = useRecipe();
  const opened = useOnceTrue(problemAt("/test") !== undefined);
  const { horizon, initialState, inputDisturbance } = form.test;
  return (
    <Disclosure summary="Test: length, initial state, disturbance" open={opened || undefined}>
      <div className="flex flex-col gap-4">
        <RecipeNumber
          label="Length of the responses"
          optional
          pointer="/test/horizon"
          unit="s"
          value={horizon}
          hint="Left empty, it is chosen from the slowest settling."
          write={(now, value) => writing(now, { horizon: value })}
        />
        <SignalFigures
          legend="Initial state, as deviations"
          what="Initial deviation of"
          signals={model.states}
          values={initialState}
          pointer="/test/initialState"
          write={writeInitial}
        />
        <SignalFigures
          legend="Step disturbance on each input"
          what="Disturbance of"
          signals={model.inputs}
          values={inputDisturbance}
          pointer="/test/inputDisturbance"
          write={writeDisturbance}
        />
        <ReasonField of="test" about="the test" />
      </div>
    </Disclosure>
  );
}
