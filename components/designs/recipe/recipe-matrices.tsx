"use client";

import type { Header } from "../../matrix/header";
import { MatrixGrid } from "../../matrix/matrix-grid";
import { Disclosure } from "../../ui/disclosure";
import { SheetSection } from "../../ui/sheet-section";
import { headersOf } from "../signal-headers";
import { noiseUnit, weightUnit } from "../unit-text";
import { useOnceTrue } from "../use-once-true";
import { useRecipe } from "./recipe-context";
import { fieldId } from "./recipe-fields";
import type { Entries, RecipeForm } from "./recipe-form";

/** The matrices a recipe is written in, where there are any: too wide for the column beside the responses. */
export function RecipeMatrices() {
  const { form, model } = useRecipe();
  const weighted = form.method === "weights";
  const full = weighted && form.weights.form === "matrices";
  const cross = weighted ? form.cross : null;
  const noise = form.observer.kind === "noise";
  if (!full && !cross && !noise) return null;
  const [states, inputs] = [headersOf(model.states), headersOf(model.inputs)];
  const writeWeights = (which: "state" | "input") => (now: RecipeForm, entries: Entries) => ({
    ...now,
    weights: { ...now.weights, [which]: entries, ownMatrices: true },
  });
  return (
    <SheetSection title="Matrices of the recipe" note="paste from a spreadsheet; Ctrl+Z takes a step back" ruled>
      <div className="flex flex-wrap gap-x-10 gap-y-6">
        {full ? (
          <>
            <Grid
              pointer="/weights/state"
              name="State weight"
              caption="Q in x'Q x"
              rows={states}
              entries={form.weights.state}
              write={writeWeights("state")}
            />
            <Grid
              pointer="/weights/input"
              name="Input weight"
              caption="R in u'R u"
              rows={inputs}
              entries={form.weights.input}
              write={writeWeights("input")}
            />
          </>
        ) : null}
        {cross ? (
          <Grid
            pointer="/crossWeight"
            name="Cross weight"
            caption="S in 2 x'S u"
            rows={states}
            columns={inputs}
            entries={cross}
            write={(now, entries) => ({ ...now, cross: entries })}
          />
        ) : null}
      </div>
      {noise ? <NoiseMatrices states={states} /> : null}
    </SheetSection>
  );
}

const hasCovariance = (entries: Entries) => entries.some((row, i) => row.some((text, j) => i !== j && Number(text) !== 0));

function NoiseMatrices({ states }: Readonly<{ states: readonly Header[] }>) {
  const { form, model, problemAt } = useRecipe();
  const { process, measurement } = form.observer;
  const sampled = model.timeBase.kind === "sampled";
  const write = (which: "process" | "measurement") => (now: RecipeForm, entries: Entries) => ({
    ...now,
    observer: { ...now.observer, [which]: entries },
  });
  const opened = useOnceTrue(
    hasCovariance(process) ||
      hasCovariance(measurement) ||
      problemAt("/observer/process") !== undefined ||
      problemAt("/observer/measurement") !== undefined,
  );
  return (
    <Disclosure summary="Noise as full matrices, with covariances" open={opened || undefined}>
      <div className="flex flex-wrap gap-x-10 gap-y-6">
        <Grid
          pointer="/observer/process"
          name="Noise on the states"
          caption={sampled ? "variance per sample" : "spectral density"}
          rows={states}
          entries={process}
          write={write("process")}
          unit={(row, column) => noiseUnit(row, column, "rate", sampled)}
        />
        <Grid
          pointer="/observer/measurement"
          name="Noise of the measurement"
          caption={sampled ? "variance per sample" : "spectral density"}
          rows={headersOf(model.outputs)}
          entries={measurement}
          write={write("measurement")}
          unit={(row, column) => noiseUnit(row, column, "value", sampled)}
        />
      </div>
    </Disclosure>
  );
}

type GridProps = Readonly<{
  pointer: string;
  name: string;
  caption: string;
  rows: readonly Header[];
  /** Without them the matrix is symmetric in its rows. */
  columns?: readonly Header[];
  entries: Entries;
  write: (form: RecipeForm, entries: Entries) => RecipeForm;
  unit?: (row: string, column: string) => string;
}>;

function Grid({ pointer, name, caption, rows, columns, entries, write, unit = weightUnit }: GridProps) {
  const { change, undo, redo, cellProblems } = useRecipe();
  const across = columns ?? rows;
  return (
    <div id={fieldId(pointer)} tabIndex={-1} className="min-w-0 outline-none">
      <MatrixGrid
        name={name}
        caption={caption}
        rows={rows}
        columns={across}
        entries={entries}
        symmetric={columns === undefined}
        scaling="form"
        problems={cellProblems(pointer)}
        entryUnit={(r, c) => unit(rows[r]?.unit ?? "", across[c]?.unit ?? "")}
        history={{ undo, redo }}
        onChange={(next) => change(null, (form) => write(form, next))}
      />
    </div>
  );
}
