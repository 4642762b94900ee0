import type { PoleEntry } from "@/control/design/recipe";
import type { Complex, TimeBase } from "@/control/plant/model";
import { resolvePoles } from "@/control/poles/resolve-poles";
import { continuousPole } from "@/control/structure/continuous-pole";

/** A pole entry while it is being typed: `first` and `second` are its figures in the order of `POLE_FIGURES`. */
export type PoleDraft = {
  readonly key: number;
  readonly kind: PoleEntry["kind"];
  readonly first: number | null;
  readonly second: number | null;
};

type PoleFigure = {
  /** The field of the entry. */
  readonly field: string;
  readonly label: string;
  readonly unit: (timeBase: TimeBase) => string;
  readonly positive: boolean;
};

const planeUnit = ({ kind }: TimeBase) => (kind === "continuous" ? "1/s" : "");
const figure = (field: string, label: string, unit: PoleFigure["unit"], positive: boolean): PoleFigure => ({
  field,
  label,
  unit,
  positive,
});

export const POLE_FIGURES: Readonly<Record<PoleEntry["kind"], readonly PoleFigure[]>> = {
  real: [figure("value", "Pole", planeUnit, false)],
  pair: [figure("re", "Real part", planeUnit, false), figure("im", "Imaginary part, ±", planeUnit, true)],
  damping: [figure("frequency", "Frequency", () => "rad/s", true), figure("damping", "Damping", () => "", true)],
  "time-constant": [figure("seconds", "Time constant", () => "s", true)],
};

export const POLE_KINDS: readonly { readonly value: PoleEntry["kind"]; readonly label: string }[] = [
  { value: "damping", label: "damping and frequency" },
  { value: "pair", label: "pair" },
  { value: "time-constant", label: "time constant" },
  { value: "real", label: "real" },
];

export const polesOfDraft = ({ kind }: PoleDraft): 1 | 2 => (kind === "pair" || kind === "damping" ? 2 : 1);
export const poleTotal = (drafts: readonly PoleDraft[]): number => drafts.reduce((sum, draft) => sum + polesOfDraft(draft), 0);

export function draftOf(entry: PoleEntry, key: number): PoleDraft {
  switch (entry.kind) {
    case "real":
      return { key, kind: "real", first: entry.value, second: null };
    case "pair":
      return { key, kind: "pair", first: entry.re, second: entry.im };
    case "damping":
      return { key, kind: "damping", first: entry.frequency, second: entry.damping };
    case "time-constant":
      return { key, kind: "time-constant", first: entry.seconds, second: null };
  }
}

/** Null while a figure is missing. */
export function entryOf({ kind, first, second }: PoleDraft): PoleEntry | null {
  if (first === null) return null;
  if (kind === "real") return { kind, value: first };
  if (kind === "time-constant") return { kind, seconds: first };
  if (second === null) return null;
  return kind === "pair" ? { kind, re: first, im: second } : { kind, frequency: first, damping: second };
}

const DIGITS = 6;
const MOVED_DIGITS = 4;
/** Proposals are there to be read and changed, so they carry no more digits than a person would write. */
export const rounded = (value: number, digits = DIGITS) => Number(value.toPrecision(digits));

/** The pole that a draft stands for; null while it cannot be read. */
export function poleOf(draft: PoleDraft, timeBase: TimeBase): Complex | null {
  const entry = entryOf(draft);
  if (!entry) return null;
  try {
    return resolvePoles([entry], timeBase)[0];
  } catch {
    return null; // out of range while it is being typed
  }
}

/** A draft whose pole was moved, still said in its own way where that can say it. */
export function movedTo(draft: PoleDraft, { re, im }: Complex, timeBase: TimeBase): PoleDraft {
  const plain: PoleDraft =
    im === 0
      ? { key: draft.key, kind: "real", first: rounded(re, MOVED_DIGITS), second: null }
      : { key: draft.key, kind: "pair", first: rounded(re, MOVED_DIGITS), second: rounded(im, MOVED_DIGITS) };
  const said = asKind(plain, draft.kind, timeBase);
  return said.first === null ? plain : said;
}

/** The same pole said in another way, as far as it can be: what cannot be said is left to be typed. */
export function asKind(draft: PoleDraft, kind: PoleEntry["kind"], timeBase: TimeBase): PoleDraft {
  const blank: PoleDraft = { key: draft.key, kind, first: null, second: null };
  const pole = poleOf(draft, timeBase);
  if (draft.kind === kind || !pole) return draft.kind === kind ? draft : blank;
  if (kind === "real") return { ...blank, first: rounded(pole.re) };
  // A real pole has no imaginary part to offer: as much as makes its damping 0.7.
  if (kind === "pair") return { ...blank, first: rounded(pole.re), second: rounded(Math.abs(pole.im || pole.re)) };
  const s = continuousPole(pole, timeBase);
  // A sampled pole left of zero has no continuous counterpart that these figures could name.
  if (!s || (pole.im === 0 && s.im !== 0)) return blank;
  if (kind === "time-constant") return s.re < 0 ? { ...blank, first: rounded(-1 / s.re) } : blank;
  const frequency = Math.sqrt(s.re * s.re + s.im * s.im);
  return frequency > 0 ? { ...blank, first: rounded(frequency), second: rounded(-s.re / frequency) } : blank;
}
