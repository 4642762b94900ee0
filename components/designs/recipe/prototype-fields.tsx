"use client";

import { useState } from "react";
import type { PoleEntry } from "@/control/design/recipe";
import { HIGHEST_PROTOTYPE_ORDER, type PrototypeSet, prototypePoles } from "@/control/poles/prototype-poles";
import { Button } from "../../ui/button";
import { Disclosure } from "../../ui/disclosure";
import { NumberField } from "../../ui/number-field";
import { Segmented } from "../../ui/radio-group";
import { Select } from "../../ui/select";
import { rounded } from "./pole-drafts";
import { useRecipe } from "./recipe-context";
import { draftsOf } from "./recipe-form";

const SETS: readonly { readonly value: PrototypeSet; readonly label: string }[] = [
  { value: "bessel", label: "Bessel: hardly any overshoot" },
  { value: "itae", label: "ITAE, recomputed" },
  { value: "itae-1953", label: "ITAE, as published in 1953" },
  { value: "butterworth", label: "Butterworth" },
];

const readable = (entry: PoleEntry): PoleEntry => {
  if (entry.kind === "time-constant") return { ...entry, seconds: rounded(entry.seconds) };
  return entry.kind === "damping" ? { ...entry, frequency: rounded(entry.frequency), damping: rounded(entry.damping) } : entry;
};

/** Published sets of poles as a start: one for the whole loop, or one for each axis by the number of its states. */
export function PrototypeFields() {
  const { model, form, change } = useRecipe();
  const [set, setSet] = useState<PrototypeSet>("bessel");
  const [spread, setSpread] = useState<"axis" | "whole">(model.axes.length > 1 ? "axis" : "whole");
  const groups = groupsOf(model, spread);
  const [frequencies, setFrequencies] = useState<Readonly<Record<string, number | null>>>({});
  const frequencyOf = (name: string) => frequencies[`${spread} ${name}`] ?? null;
  const tooLong = groups.find(({ order }) => order > HIGHEST_PROTOTYPE_ORDER);
  const usable = !tooLong && groups.every(({ name }) => (frequencyOf(name) ?? 0) > 0);
  const take = () => {
    const entries = groups.flatMap(({ name, order }) => prototypePoles(set, order, frequencyOf(name) ?? 1).map(readable));
    const said = groups.map(({ name, order }) => `${name}: order ${order} at ${frequencyOf(name)} rad/s`).join("; ");
    const label = SETS.find(({ value }) => value === set)?.label.split(":")[0] ?? set;
    const reasons = form.reasons.poles ? form.reasons : { ...form.reasons, poles: `${label}, ${said}` };
    change(null, (now) => ({ ...now, poles: draftsOf(entries), reasons }));
  };
  return (
    <Disclosure summary="Take a published set">
      <div className="flex flex-col gap-3">
        <Select label="Set" value={set} onChange={({ target }) => setSet(target.value as PrototypeSet)} options={SETS} />
        <Segmented
          legend="For"
          value={spread}
          onChange={setSpread}
          choices={[
            { value: "axis", label: "each axis" },
            { value: "whole", label: "the whole loop" },
          ]}
        />
        {groups.map(({ name, order }) => (
          <NumberField
            key={name}
            label={`Frequency of ${name}, order ${order}`}
            unit="rad/s"
            value={frequencyOf(name)}
            onChange={(value) => setFrequencies((now) => ({ ...now, [`${spread} ${name}`]: value }))}
          />
        ))}
        {tooLong ? (
          <p className="text-table">
            The sets end at order {HIGHEST_PROTOTYPE_ORDER}; {tooLong.name} has {tooLong.order} states.
            {spread === "whole" && model.axes.length > 1 ? " Take one set for each axis." : ""}
          </p>
        ) : null}
        <div>
          <Button size="small" disabled={!usable} onClick={take}>
            Use these poles
          </Button>
        </div>
      </div>
    </Disclosure>
  );
}

type Group = { readonly name: string; readonly order: number };
type Model = ReturnType<typeof useRecipe>["model"];

/** The states of no axis make a group of their own. */
function groupsOf({ axes, states }: Model, spread: "axis" | "whole"): Group[] {
  if (spread === "whole") return [{ name: "the loop", order: states.length }];
  const of = (axis: number | null) => states.filter((state) => state.axis === axis).length;
  const named = axes.map(({ name }, axis) => ({ name, order: of(axis) }));
  return [...named, { name: "states of no axis", order: of(null) }].filter(({ order }) => order > 0);
}
