"use client";

import { useState } from "react";
import { Button } from "../../ui/button";
import { Disclosure } from "../../ui/disclosure";
import { Notice } from "../../ui/notice";
import { Select } from "../../ui/select";
import { useRecipe } from "../recipe/recipe-context";
import type { Swept } from "./sweep-form";
import { TradePicture } from "./trade-picture";
import { effortScale } from "./trade-points";
import { type SweepState, useSweep } from "./use-sweep";

const EFFORT = "effort";

function sweptOf(choice: string): Swept {
  const [of, index] = choice.split(":");
  return of === EFFORT ? { of: EFFORT } : { of: of === "state" ? "state" : "input", index: Number(index) };
}

/** What speed costs: the recipe swept over the cost of control, or over one weight, as a curve to choose from. */
export function TradeSection() {
  const { form, model, change } = useRecipe();
  const { state, start, stop } = useSweep(model);
  const [choice, setChoice] = useState(EFFORT);
  const { states, inputs } = form.weights;
  const weighted = (of: "state" | "input", names: readonly { readonly name: string }[], values: readonly (number | null)[]) =>
    names.flatMap(({ name }, index) =>
      values[index] === null ? [] : [{ value: `${of}:${index}`, label: `the figure of ${name}` }],
    );
  const options = [
    { value: EFFORT, label: "all efforts together" },
    ...weighted("state", model.states, states),
    ...weighted("input", model.inputs, inputs),
  ];
  const choose = (place: number) => state.kind === "done" && change(null, () => state.forms[place]);
  return (
    <Disclosure summary="What speed costs: sweep the recipe">
      <div className="no-print mb-2 flex flex-wrap items-end gap-3">
        <Select
          label="Turn, from a tenth to ten times"
          value={choice}
          onChange={({ target }) => setChoice(target.value)}
          options={options}
        />
        {state.kind === "running" ? (
          <>
            <Button onClick={stop}>Stop</Button>
            <progress aria-label="Sweep" value={state.done} max={state.of} className="h-9 w-40 accent-ink" />
          </>
        ) : (
          <Button onClick={() => void start(form, sweptOf(choice))}>Sweep</Button>
        )}
      </div>
      <SweepResult state={state} onChoose={choose} />
    </Disclosure>
  );
}

function SweepResult({ state, onChoose }: Readonly<{ state: SweepState; onChoose: (place: number) => void }>) {
  const { model } = useRecipe();
  if (state.kind === "failed") return <Notice kind="caution" role="status" title={state.why} />;
  if (state.kind !== "done") return null;
  const { label, ofLimit } = effortScale(model);
  return (
    <>
      <TradePicture points={state.points} effortLabel={label} limit={ofLimit ? 100 : null} onChoose={onChoose} />
      <Disclosure summary="The same in words">
        <ul className="list-disc pl-5">
          {state.points.map(({ place, words }) => (
            <li key={place}>{words}</li>
          ))}
        </ul>
      </Disclosure>
    </>
  );
}
