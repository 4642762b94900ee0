/** `order[k]` is the old index at new place k; block b occupies places starts[b] to starts[b + 1] - 1. */
export type StrongComponents = { readonly order: Int32Array; readonly starts: readonly number[] };

/**
 * Order of the indices in which a square matrix is block upper triangular with irreducible diagonal blocks.
 *
 * Shapes    a n×n row-major → order n, starts one more than there are blocks
 * Accuracy  exact: only the pattern of nonzero entries counts; n² steps
 * Source    Tarjan, Depth-first search and linear graph algorithms, SIAM J. Comput. 1 (1972) 146-160
 */
export function strongComponents(a: Float64Array, n: number): StrongComponents {
  if (isRing(a, n)) return { order: Int32Array.from({ length: n }, (_, i) => i), starts: n === 0 ? [0] : [0, n] };
  const found = new Int32Array(n).fill(-1);
  const low = new Int32Array(n);
  const next = new Int32Array(n);
  const open = new Uint8Array(n);
  const stack: number[] = [];
  const path: number[] = [];
  const components: number[][] = [];
  let count = 0;
  for (let root = 0; root < n; root++) {
    if (found[root] < 0) path.push(root);
    while (path.length > 0) {
      const i = path[path.length - 1];
      if (found[i] < 0) {
        found[i] = low[i] = count++;
        stack.push(i);
        open[i] = 1;
      }
      const child = nextChild(a, n, i, next, found, open, low);
      if (child >= 0) {
        path.push(child);
        continue;
      }
      path.pop();
      if (path.length > 0) low[path[path.length - 1]] = Math.min(low[path[path.length - 1]], low[i]);
      if (low[i] === found[i]) components.push(closeComponent(stack, open, i));
    }
  }
  // A component is closed after everything its rows reach, so the reverse of that order is upper triangular.
  components.reverse();
  const starts = [0];
  for (const component of components) starts.push(starts[starts.length - 1] + component.length);
  return { order: Int32Array.from(components.flat()), starts };
}

/** Whether every index reaches the next one and the last the first: the usual dense matrix is one component without a search. */
function isRing(a: Float64Array, n: number): boolean {
  for (let i = 0; i + 1 < n; i++) if (a[i * n + i + 1] === 0) return false;
  return n < 2 || a[(n - 1) * n] !== 0;
}

/** Next index not seen yet that row i reaches, or -1; lowers i's mark by open ones on the way. */
function nextChild(
  a: Float64Array,
  n: number,
  i: number,
  next: Int32Array,
  found: Int32Array,
  open: Uint8Array,
  low: Int32Array,
): number {
  for (let j = next[i]; j < n; j++) {
    if (j === i || a[i * n + j] === 0) continue;
    if (found[j] < 0) {
      next[i] = j;
      return j;
    }
    if (open[j] === 1) low[i] = Math.min(low[i], found[j]);
  }
  next[i] = n;
  return -1;
}

function closeComponent(stack: number[], open: Uint8Array, root: number): number[] {
  const component = stack.splice(stack.indexOf(root));
  for (const i of component) open[i] = 0;
  return component.sort((x, y) => x - y);
}
