"use client";

import { memo, useState } from "react";
import { AxisBar } from "../../plots/axis-bar";
import { Button } from "../../ui/button";
import { NumberField } from "../../ui/number-field";
import { FigureSlider } from "./figure-slider";
import { ReasonField } from "./reason-field";
import { useRecipe, useRecipeActions } from "./recipe-context";
import { fieldId } from "./recipe-fields";
import type { RecipeForm } from "./recipe-form";

type Signal = { readonly name: string; readonly unit: string; readonly axis: number | null; readonly scale?: number | null };

type SignalFiguresProps = Readonly<{
  legend: string;
  /** Read out with each field: "Largest deviation of". */
  what: string;
  hint?: string;
  signals: readonly Signal[];
  values: readonly (number | null)[];
  /** Of the list in the recipe. */
  pointer: string;
  /** The same function from one drawing to the next, so that only the figure that changed is drawn again. */
  write: (form: RecipeForm, index: number, value: number | null) => RecipeForm;
  unit?: (signal: Signal) => string;
  /** Key of the reason beside a signal, without its place; none where a reason per signal makes no sense. */
  reasonOf?: "state" | "input";
  /** What the page started from: with it every figure has a slider beneath. */
  starts?: readonly (number | null)[];
  /** Where a signal's own figure lies deeper than its place: the diagonal of a matrix. */
  place?: (index: number) => string;
}>;

/** One figure per signal, each with its axis, its unit and, where wanted, its reason. */
export function SignalFigures({
  legend,
  what,
  hint,
  signals,
  values,
  pointer,
  write,
  unit,
  reasonOf,
  starts,
  place = String,
}: SignalFiguresProps) {
  const { form, weightLines, problemAt } = useRecipe();
  return (
    <fieldset className="min-w-0">
      <legend className="text-table font-semibold">{legend}</legend>
      {hint ? <p className="text-sm text-soft">{hint}</p> : null}
      <ul className="mt-1 divide-y divide-rule border-y border-rule">
        {signals.map((signal, index) => {
          const reason = reasonOf && `${reasonOf}:${index}`;
          const at = `${pointer}/${place(index)}`;
          return (
            <li key={signal.name} className="py-1">
              <SignalFigure
                {...{ signal, index, what, reason, write }}
                value={values[index] ?? null}
                start={starts && (starts[index] ?? null)}
                pointer={at}
                problem={problemAt(at)}
                unit={unit ? unit(signal) : signal.unit}
                reasoned={reason !== undefined && Boolean(form.reasons[reason])}
                line={reason && weightLines.get(reason)}
              />
            </li>
          );
        })}
      </ul>
    </fieldset>
  );
}

type SignalFigureProps = Readonly<{
  signal: Signal;
  index: number;
  what: string;
  value: number | null;
  start: number | null | undefined;
  pointer: string;
  problem: string | undefined;
  unit: string;
  /** Key of its reason; undefined where it has none. */
  reason: string | undefined;
  /** Whether one is written. */
  reasoned: boolean;
  line: string | undefined;
  write: SignalFiguresProps["write"];
}>;

const SignalFigure = memo(function SignalFigure(props: SignalFigureProps) {
  const { signal, index, what, value, start, pointer, problem, unit, reason, reasoned, line, write } = props;
  const { change, setUsable } = useRecipeActions();
  const [asked, setAsked] = useState(false);
  const open = asked || reasoned;
  const put = (next: number | null) => change(pointer, (form) => write(form, index, next));
  return (
    <>
      <div className="grid grid-cols-[minmax(2.5rem,1fr)_7.25rem_4.5rem_2.25rem] items-start gap-x-2">
        <span className="flex min-h-9 min-w-0 items-center gap-2 text-table [overflow-wrap:anywhere]">
          <AxisBar axis={signal.axis} />
          {signal.name}
        </span>
        <NumberField
          id={fieldId(pointer)}
          label={`${what} ${signal.name}, ${unit}`}
          hideLabel
          {...{ value, problem }}
          onUsable={(usable) => setUsable(pointer, usable)}
          onChange={put}
        />
        <span aria-hidden="true" className="flex min-h-9 items-center text-table text-soft">
          {unit}
        </span>
        {reason ? (
          <Button
            size="small"
            tone="quiet"
            className="mt-1 font-normal text-soft"
            aria-expanded={open}
            aria-label={`why: reason for ${signal.name}`}
            onClick={() => setAsked(true)}
          >
            why
          </Button>
        ) : null}
        {start === undefined ? null : (
          <FigureSlider
            label={`${what} ${signal.name}`}
            {...{ unit, value, start }}
            middle={start ?? signal.scale ?? 1}
            onChange={put}
          />
        )}
        {line ? <p className="col-span-full text-xs text-soft">{line}</p> : null}
      </div>
      {open && reason ? (
        <div className="pb-1">
          <ReasonField of={reason} about={signal.name} startOpen />
        </div>
      ) : null}
    </>
  );
});
