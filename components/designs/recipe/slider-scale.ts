const DECADES = 2;
export const STEPS_PER_DECADE = 50;
/** Furthest place to either side of the middle. */
export const SLIDER_END = DECADES * STEPS_PER_DECADE;
const DIGITS = 3;

/** The place of a value on a slider whose middle stands for `middle` and whose every step is the same factor. */
export function placeOf(value: number, middle: number): number {
  const place = Math.round(Math.log10(value / middle) * STEPS_PER_DECADE);
  return Math.max(-SLIDER_END, Math.min(SLIDER_END, place));
}

/** With as many digits as a person would write; the middle itself is given back as it was written. */
export function valueAt(place: number, middle: number): number {
  return place === 0 ? middle : Number((middle * 10 ** (place / STEPS_PER_DECADE)).toPrecision(DIGITS));
}
