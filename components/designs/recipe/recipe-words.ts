import type { ObserverRecipe, PoleEntry, Recipe } from "@/control/design/recipe";
import type { TimeBase } from "@/control/plant/model";
import { formatNumber } from "@/control/words/format-number";
import type { Measured } from "../measured";

export const METHOD_WORDS: Readonly<Record<Recipe["method"], string>> = { weights: "quadratic weights", poles: "poles" };

export const OBSERVER_WORDS: Readonly<Record<ObserverRecipe["kind"], string>> = {
  none: "none, full state",
  poles: "by poles",
  noise: "from noise",
  reduced: "reduced order",
};

/** What a written reason stands beside. */
const REASON_WORDS: Readonly<Record<string, string>> = {
  weights: "state weights",
  inputs: "input weights",
  cross: "cross weight",
  stability: "degree of stability",
  poles: "poles",
  observer: "observer",
  reference: "reference",
  test: "test",
};

type Names = { readonly states: readonly { readonly name: string }[]; readonly inputs: readonly { readonly name: string }[] };

export function reasonPlace(key: string, { states, inputs }: Names): string {
  const [list, place] = key.split(":");
  if (place === undefined) return REASON_WORDS[key] ?? key;
  const signals = list === "state" ? states : list === "input" ? inputs : [];
  return signals[Number(place)]?.name ?? key;
}

/** One entry of a list of wanted poles. */
export function poleEntryText(entry: PoleEntry, timeBase: TimeBase, digits = 4): string {
  const unit = timeBase.kind === "continuous" ? " 1/s" : "";
  const figure = (value: number) => formatNumber(value, digits);
  switch (entry.kind) {
    case "real":
      return `${figure(entry.value)}${unit}`;
    case "pair":
      return `${figure(entry.re)} ± ${figure(entry.im)} i${unit}`;
    case "damping":
      return `${figure(entry.frequency)} rad/s, damping ${figure(entry.damping)}`;
    case "time-constant":
      return `time constant ${figure(entry.seconds)} s`;
  }
}

/** The same in numbers. */
export function poleEntryFigures(entry: PoleEntry, timeBase: TimeBase): Measured[] {
  const plane = timeBase.kind === "continuous" ? "1/s" : "1";
  switch (entry.kind) {
    case "real":
      return [{ what: "real part", unit: plane, value: entry.value }];
    case "pair":
      return [
        { what: "real part", unit: plane, value: entry.re },
        { what: "imaginary part, plus and minus", unit: plane, value: entry.im },
      ];
    case "damping":
      return [
        { what: "frequency", unit: "rad/s", value: entry.frequency },
        { what: "damping", unit: "1", value: entry.damping },
      ];
    case "time-constant":
      return [{ what: "time constant", unit: "s", value: entry.seconds }];
  }
}
