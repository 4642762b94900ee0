"use client";

import type { ObserverRecipe } from "@/control/design/recipe";
import type { Complex, TimeBase } from "@/control/plant/model";
import { resolvePoles } from "@/control/poles/resolve-poles";
import { Button } from "../../ui/button";
import { parseNumber } from "../../ui/parse-number";
import { RadioGroup } from "../../ui/radio-group";
import { noiseUnit } from "../unit-text";
import { DefectiveChoice } from "./defective-choice";
import { entryOf, type PoleDraft } from "./pole-drafts";
import { PoleList } from "./pole-list";
import { ReasonField } from "./reason-field";
import { useRecipe } from "./recipe-context";
import { fieldId } from "./recipe-fields";
import { draftsOf, type Entries, type RecipeForm } from "./recipe-form";
import { SignalFigures } from "./signal-figures";
import { usePoleProposals } from "./use-proposals";

type Kind = ObserverRecipe["kind"];
type Observer = RecipeForm["observer"];

const CHOICES: readonly { readonly value: Kind; readonly label: string; readonly hint: string }[] = [
  { value: "none", label: "None", hint: "Every state is measured." },
  { value: "poles", label: "By poles", hint: "All states are estimated; the estimate's error dies out with these poles." },
  { value: "noise", label: "From noise", hint: "Steady-state Kalman: the best balance of model and measurement." },
  { value: "reduced", label: "Reduced order", hint: "Only what the outputs do not show is estimated." },
];

export function ObserverFields({ loopPoles }: Readonly<{ loopPoles: readonly Complex[] | null }>) {
  const { form, model, change, problemAt } = useRecipe();
  const { kind } = form.observer;
  const measured = model.outputs.length > 0;
  const choose = (next: Kind) => change(null, (now) => ({ ...now, observer: { ...now.observer, kind: next } }));
  return (
    <div className="flex flex-col gap-4">
      <RadioGroup
        legend="Observer"
        id={fieldId("/observer")}
        value={kind}
        onChange={choose}
        problem={problemAt("/observer/kind")}
        hint={measured ? undefined : "The plant has no measured outputs, so nothing could be estimated from them."}
        choices={CHOICES.map((choice) => ({ ...choice, disabled: !measured && choice.value !== "none" }))}
      />
      {kind === "noise" ? <NoiseFields /> : null}
      {kind === "poles" || kind === "reduced" ? (
        <>
          <ObserverPoles kind={kind} loopPoles={loopPoles} />
          <DefectiveChoice of="observer" held="outputs" />
        </>
      ) : null}
      {kind === "none" ? null : <ReasonField of="observer" about="the observer" />}
    </div>
  );
}

const diagonalOf = (entries: Entries) =>
  entries.map((row, i) => {
    const reading = parseNumber(row[i] ?? "");
    return reading.kind === "number" ? reading.value : null;
  });

const withDiagonal = (entries: Entries, index: number, value: number | null): Entries =>
  entries.map((row, i) => (i === index ? row.map((text, j) => (j === index ? String(value ?? 0) : text)) : row));

const writeNoise =
  (which: "process" | "measurement") =>
  (now: RecipeForm, index: number, value: number | null): RecipeForm => ({
    ...now,
    observer: { ...now.observer, [which]: withDiagonal(now.observer[which], index, value) },
  });
const writeProcess = writeNoise("process");
const writeMeasurement = writeNoise("measurement");

function NoiseFields() {
  const { form, model } = useRecipe();
  const sampled = model.timeBase.kind === "sampled";
  const place = (index: number) => `${index}/${index}`;
  return (
    <>
      <SignalFigures
        legend={sampled ? "Noise on the states, variance per sample" : "Noise on the states, spectral density"}
        what="Noise on"
        signals={model.states}
        values={diagonalOf(form.observer.process)}
        pointer="/observer/process"
        place={place}
        unit={({ unit }) => noiseUnit(unit, unit, "rate", sampled)}
        write={writeProcess}
      />
      <SignalFigures
        legend={sampled ? "Noise of the measurement, variance per sample" : "Noise of the measurement, spectral density"}
        what="Noise of"
        hint="Covariances between signals stand in the matrices below the responses."
        signals={model.outputs}
        values={diagonalOf(form.observer.measurement)}
        pointer="/observer/measurement"
        place={place}
        unit={({ unit }) => noiseUnit(unit, unit, "value", sampled)}
        write={writeMeasurement}
      />
    </>
  );
}

/** The poles that a list of drafts stands for, as far as they can be read. */
function polesIn(drafts: readonly PoleDraft[], timeBase: TimeBase): Complex[] {
  const entries = drafts.flatMap((draft) => entryOf(draft) ?? []);
  try {
    return resolvePoles(entries, timeBase);
  } catch {
    return []; // an entry is out of range: there is nothing to go by yet
  }
}

type ObserverPolesProps = Readonly<{ kind: "poles" | "reduced"; loopPoles: readonly Complex[] | null }>;

function ObserverPoles({ kind, loopPoles }: ObserverPolesProps) {
  const { form, model, change } = useRecipe();
  const proposals = usePoleProposals(model, true);
  const list = kind === "reduced" ? "reduced" : "poles";
  const wanted = kind === "poles" ? model.states.length : (proposals?.hidden ?? null);
  const write = (now: RecipeForm, drafts: readonly PoleDraft[]): RecipeForm => ({
    ...now,
    observer: { ...now.observer, [list]: drafts } as Observer,
  });
  const propose = () => {
    if (!proposals || wanted === null) return;
    const typed = form.method === "poles" ? polesIn(form.poles, model.timeBase) : [];
    const loop = typed.length > 0 ? typed : (loopPoles ?? polesIn(draftsOf(proposals.fromPlant()), model.timeBase));
    change(null, (now) => write(now, draftsOf(proposals.forObserver(loop, wanted))));
  };
  return (
    <PoleList
      legend="Observer poles"
      pointer="/observer/poles"
      drafts={form.observer[list]}
      wanted={wanted}
      per={kind === "poles" ? `${model.states.length} states` : "the states that the outputs do not show"}
      write={write}
      proposals={
        <Button size="small" disabled={wanted === null} onClick={propose}>
          Propose four times as fast as the loop
        </Button>
      }
    />
  );
}
