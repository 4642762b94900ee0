/** "a", "a and b", "a, b and c". */
export function joinNames(names: readonly string[]): string {
  if (names.length < 2) return names[0] ?? "";
  return `${names.slice(0, -1).join(", ")} and ${names[names.length - 1]}`;
}

/** Shares nearer than this part of the largest are alike: rounding must not decide who is named first. */
const ALIKE = 1e-6;

/** Names of the signals with the largest shares: those with at least half of the largest, three at most. */
export function leadingNames(shares: readonly number[], signals: readonly { readonly name: string }[]): string[] {
  const sizes = shares.map(Math.abs);
  const largest = Math.max(0, ...sizes);
  if (largest === 0) return [];
  return sizes
    .map((size, index) => ({ rank: Math.round(size / largest / ALIKE), index }))
    .filter(({ rank }) => rank * ALIKE >= 0.5)
    .sort((x, y) => y.rank - x.rank || x.index - y.index)
    .slice(0, 3)
    .flatMap(({ index }) => signals[index]?.name ?? []);
}
