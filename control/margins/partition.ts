/**
 * The places themselves, inner places between neighbours, and one on each side; rising places in, rising places out.
 */
export function partition(places: readonly number[]): number[] {
  if (places.length === 0) return [];
  const all = [places[0] / 2, 2 * places[places.length - 1]];
  places.forEach((v, k) => {
    all.push(v);
    if (k + 1 < places.length) all.push(...innerPlaces(v, places[k + 1]));
  });
  return rising(all);
}

/** The middle of an interval of positive numbers; where it spans much, also in proportion and nearer its lower end. */
export function innerPlaces(from: number, to: number): number[] {
  if (!Number.isFinite(to)) return from > 0 ? [2 * from, 16 * from] : [1];
  const middle = from + (to - from) / 2;
  if (from === 0) return [middle, to / 16];
  return to > 2 * from ? [middle, Math.sqrt(from) * Math.sqrt(to), 2 * from * (to / (from + to))] : [middle];
}

export function rising(places: readonly number[]): number[] {
  return [...new Set(places)].sort((x, y) => x - y);
}
