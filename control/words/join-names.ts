/** "a", "a and b", "a, b and c". */
export function joinNames(names: readonly string[]): string {
  if (names.length < 2) return names[0] ?? "";
  return `${names.slice(0, -1).join(", ")} and ${names[names.length - 1]}`;
}

/** Names of the signals with the largest shares: those with at least half of the largest, three at most. */
export function leadingNames(shares: readonly number[], signals: readonly { readonly name: string }[]): string[] {
  const sizes = shares.map(Math.abs);
  const largest = Math.max(0, ...sizes);
  if (largest === 0) return [];
  return sizes
    .map((size, index) => ({ size, index }))
    .filter(({ size }) => size >= largest / 2)
    .sort((x, y) => y.size - x.size || x.index - y.index)
    .slice(0, 3)
    .flatMap(({ index }) => signals[index]?.name ?? []);
}
