/** Rows and columns that one sweep works on: the unreduced block start..end of h, all of h when the factor is kept whole. */
export type Chase = {
  readonly h: Float64Array;
  readonly qt: Float64Array | null;
  readonly n: number;
  readonly full: boolean;
  /** One sweep from row m on, where the start vector is v. */
  sweep(m: number, start: number, end: number, v0: number, v1: number, v2: number): void;
};

/** The sweeps in loops: the reference for the accelerator. */
export function chaseByLoops(h: Float64Array, n: number, full: boolean, qt: Float64Array | null): Chase {
  return { h, qt, n, full, sweep };
}

/** Chases the bulge down the block by reflections of three rows and columns (two at the end). */
function sweep(this: Chase, m: number, start: number, end: number, v0: number, v1: number, v2: number): void {
  const { h, qt, n, full } = this;
  for (let k = m; k < end; k++) {
    const three = k + 2 <= end;
    const at = k * n + k - 1;
    const a = k > m ? h[at] : v0;
    const b = k > m ? h[at + n] : v1;
    const c = three ? (k > m ? h[at + 2 * n] : v2) : 0;
    const rest = Math.max(Math.abs(b), Math.abs(c));
    if (rest === 0) continue;
    const largest = Math.max(Math.abs(a), rest);
    const scale = largest < 1e-140 || largest > 1e140 ? largest : 1;
    const x = a / scale;
    const y = b / scale;
    const z = c / scale;
    const length = Math.sqrt(x * x + y * y + z * z);
    const beta = x >= 0 ? -length : length;
    const tau = (beta - x) / beta;
    const u = y / (x - beta);
    const w = z / (x - beta);
    if (k > m) {
      h[at] = beta * scale;
      h[at + n] = 0;
      if (three) h[at + 2 * n] = 0;
    } else if (m > start) {
      // The small subdiagonal entries that let the sweep start here are kept, not assumed zero.
      h[at] *= 1 - tau;
    }
    const last = full ? n : end + 1;
    const first = full ? 0 : start;
    const under = Math.min(k + 3, end);
    if (three) {
      threeRows(h, n, k * n + k, k * n + last, u, w, tau);
      threeColumns(h, n, first * n + k, under * n + k, u, w, tau);
      if (qt) threeRows(qt, n, k * n, k * n + n, u, w, tau);
    } else {
      twoRows(h, n, k * n + k, k * n + last, u, tau);
      twoColumns(h, n, first * n + k, under * n + k, u, tau);
      if (qt) twoRows(qt, n, k * n, k * n + n, u, tau);
    }
  }
}

function threeRows(h: Float64Array, n: number, from: number, to: number, u: number, w: number, tau: number): void {
  for (let i = from, j = from + n, k = j + n; i < to; i++, j++, k++) {
    const x = h[i];
    const y = h[j];
    const z = h[k];
    const sum = (x + u * y + w * z) * tau;
    h[i] = x - sum;
    h[j] = y - sum * u;
    h[k] = z - sum * w;
  }
}

function threeColumns(h: Float64Array, n: number, from: number, to: number, u: number, w: number, tau: number): void {
  for (let at = from; at <= to; at += n) {
    const x = h[at];
    const y = h[at + 1];
    const z = h[at + 2];
    const sum = (x + u * y + w * z) * tau;
    h[at] = x - sum;
    h[at + 1] = y - sum * u;
    h[at + 2] = z - sum * w;
  }
}

function twoRows(h: Float64Array, n: number, from: number, to: number, u: number, tau: number): void {
  for (let i = from, j = from + n; i < to; i++, j++) {
    const x = h[i];
    const y = h[j];
    const sum = (x + u * y) * tau;
    h[i] = x - sum;
    h[j] = y - sum * u;
  }
}

function twoColumns(h: Float64Array, n: number, from: number, to: number, u: number, tau: number): void {
  for (let at = from; at <= to; at += n) {
    const x = h[at];
    const y = h[at + 1];
    const sum = (x + u * y) * tau;
    h[at] = x - sum;
    h[at + 1] = y - sum * u;
  }
}
