/**
 * States on a way from an input to an output, judged by the pattern of entries that are exactly zero. The others leave the
 * transfer matrix as it is, and a pole of theirs on the stability boundary would only be in the way.
 *
 * Shapes    a n×n, b n×m, c p×n row-major → places in rising order
 * Accuracy  exact; n² steps
 */
export function connectedStates(
  a: Float64Array,
  b: Float64Array,
  c: Float64Array,
  n: number,
  m: number,
  p: number,
): readonly number[] {
  const driven = new Uint8Array(n);
  const heard = new Uint8Array(n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < m; j++) if (b[i * m + j] !== 0) driven[i] = 1;
    for (let k = 0; k < p; k++) if (c[k * n + i] !== 0) heard[i] = 1;
  }
  spread(driven, n, (from, to) => a[to * n + from] !== 0);
  spread(heard, n, (from, to) => a[from * n + to] !== 0);
  return Array.from({ length: n }, (_, i) => i).filter((i) => driven[i] === 1 && heard[i] === 1);
}

function spread(marked: Uint8Array, n: number, reaches: (from: number, to: number) => boolean): void {
  const open = Array.from({ length: n }, (_, i) => i).filter((i) => marked[i] === 1);
  for (let from = open.pop(); from !== undefined; from = open.pop()) {
    for (let to = 0; to < n; to++) {
      if (marked[to] === 1 || !reaches(from, to)) continue;
      marked[to] = 1;
      open.push(to);
    }
  }
}
