/** Whole-number potentials with row[i] + column[j] ≤ cost[i][j], equal along an assignment of least total cost. */
export type Potentials = { readonly rows: readonly number[]; readonly columns: readonly number[] };

/**
 * Least-cost assignment of rows to columns.
 *
 * Shapes    n×n whole numbers → n and n
 * Throws    nothing; n³ steps
 * Source    Kuhn, Naval Research Logistics Quarterly 2 (1955) 83-97, in the form with shortest paths (from memory)
 */
export function assignLeast(cost: readonly (readonly number[])[]): Potentials {
  const n = cost.length;
  const rows = new Array<number>(n).fill(0);
  const columns = new Array<number>(n).fill(0);
  const rowOf = new Array<number>(n).fill(-1);
  for (let start = 0; start < n; start++) {
    const slack = new Array<number>(n).fill(Number.POSITIVE_INFINITY);
    const from = new Array<number>(n).fill(-1);
    const used = new Array<boolean>(n).fill(false);
    let row = start;
    let column = -1;
    for (let step = 0; step < n && row >= 0; step++) {
      let next = -1;
      for (let j = 0; j < n; j++) {
        if (used[j]) continue;
        const reduced = cost[row][j] - rows[row] - columns[j];
        if (reduced < slack[j]) {
          slack[j] = reduced;
          from[j] = column;
        }
        if (next < 0 || slack[j] < slack[next]) next = j;
      }
      const move = slack[next];
      rows[start] += move;
      for (let j = 0; j < n; j++) {
        if (used[j]) {
          rows[rowOf[j]] += move;
          columns[j] -= move;
        } else slack[j] -= move;
      }
      used[next] = true;
      column = next;
      row = rowOf[next];
    }
    for (let hops = 0; hops < n && column >= 0; hops++) {
      const before = from[column];
      rowOf[column] = before >= 0 ? rowOf[before] : start;
      column = before;
    }
  }
  return { rows, columns };
}
