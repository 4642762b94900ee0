import { pythagoras } from "../linalg/flat";
import type { Complex } from "../plant/model";
import type { SmallestSingular } from "./smallest-singular";

export type Bracket = { readonly lower: number; readonly upper: number; readonly at: Complex; readonly evaluations: number };

/** A corner of the triangulation with σ² there. */
type Corner = Complex & { readonly square: number };
type Triangle = { readonly corners: readonly [Corner, Corner, Corner]; readonly lower: number };

const MOST_DESCENTS = 12;
const DESCENT_STEPS = 40;

/**
 * Bracket of the least value of σ(s), the smallest singular value of [A - s I, B], over the complex plane, by best-first
 * bisection of triangles. σ² - |s|² is concave, so on a triangle σ² is at least |s|² plus the linear interpolant of the corners.
 *
 * Units     radius, beyond which σ is larger than at the starts, as s
 * Accuracy  lower and upper hold for σ as computed; ends when lower ≥ (1 - tightness) upper, when upper is below `floor`, or
 *           after `most` evaluations, with what is proven by then
 * Source    Gu, SIAM J. Matrix Anal. Appl. 21 (2000) 989-1003, for the problem; concavity of the smallest eigenvalue of a
 *           Hermitian matrix that is linear in s, Overton & Womersley, Math. Programming 62 (1993) 321-357 (from memory)
 */
export function bracketDistance(
  sigma: (s: Complex) => SmallestSingular,
  starts: readonly Complex[],
  radius: number,
  { tightness, floor, most }: { readonly tightness: number; readonly floor: number; readonly most: number },
): Bracket {
  const search = new Search(sigma, most);
  for (const s of starts) search.corner(s);
  for (const s of search.bestCorners(Math.min(4, MOST_DESCENTS))) search.descend(s);
  const [a, b, c, d] = [
    { re: -radius, im: 0 },
    { re: radius, im: 0 },
    { re: radius, im: radius },
    { re: -radius, im: radius },
  ].map((s) => search.corner(s));
  const heap: Triangle[] = [];
  push(heap, triangle(a, b, c));
  push(heap, triangle(a, c, d));
  let lower = 0;
  while (heap.length > 0 && search.evaluations < most && search.upper > floor) {
    const worst = pop(heap);
    lower = worst.lower;
    if (lower >= (1 - tightness) * search.upper) break;
    const [p, q, r] = byLongestEdge(worst.corners);
    const middle = search.corner({ re: (p.re + q.re) / 2, im: (p.im + q.im) / 2 });
    push(heap, triangle(p, middle, r));
    push(heap, triangle(q, middle, r));
  }
  if (search.upper <= floor) lower = 0;
  return { lower: Math.min(lower, search.upper), upper: search.upper, at: search.at, evaluations: search.evaluations };
}

/** Values met so far, the best of them, and the work done. */
class Search {
  evaluations = 0;
  upper = Number.POSITIVE_INFINITY;
  at: Complex = { re: 0, im: 0 };
  private descents = 0;
  private readonly met = new Map<string, Corner>();

  constructor(
    private readonly sigma: (s: Complex) => SmallestSingular,
    private readonly most: number,
  ) {}

  corner({ re, im }: Complex): Corner {
    const key = `${re} ${im}`;
    const known = this.met.get(key);
    if (known) return known;
    const better = this.upper;
    const value = this.evaluate({ re, im }).value;
    const made = { re, im, square: value * value };
    this.met.set(key, made);
    if (value < 0.999 * better && better < Number.POSITIVE_INFINITY) this.descend(made);
    return made;
  }

  bestCorners(count: number): Corner[] {
    return [...this.met.values()].sort((x, y) => x.square - y.square).slice(0, count);
  }

  /** Quasi-Newton steps down σ², whose gradient is twice the way from u* A u to s; the first step goes to u* A u itself. */
  descend(start: Complex): void {
    if (this.descents++ >= MOST_DESCENTS) return;
    let s = start;
    let now = this.evaluate(s);
    let inverse: Curvature = { xx: 0.5, xy: 0, yy: 0.5 };
    for (let step = 0; step < DESCENT_STEPS && this.evaluations < this.most; step++) {
      const slope = gradient(s, now);
      const way = { re: -(inverse.xx * slope.re + inverse.xy * slope.im), im: -(inverse.xy * slope.re + inverse.yy * slope.im) };
      const next = this.downhill(s, now, way);
      if (next === null) return;
      const steeper = gradient(next.s, next.now);
      const change = { re: next.s.re - s.re, im: next.s.im - s.im };
      inverse = updated(inverse, change, { re: steeper.re - slope.re, im: steeper.im - slope.im });
      const gained = now.value - next.now.value;
      ({ s, now } = next);
      if (gained <= 1e-13 * now.value) return;
    }
  }

  private downhill(s: Complex, now: SmallestSingular, way: Complex): { s: Complex; now: SmallestSingular } | null {
    for (let share = 1; share > 1e-3; share /= 2) {
      const trial = { re: s.re + share * way.re, im: s.im + share * way.im };
      const there = this.evaluate(trial);
      if (there.value < now.value) return { s: trial, now: there };
    }
    return null;
  }

  private evaluate(s: Complex): SmallestSingular {
    this.evaluations++;
    const found = this.sigma(s);
    if (found.value < this.upper * (1 - 4 * Number.EPSILON) || this.evaluations === 1) {
      this.upper = found.value;
      this.at = { re: s.re, im: Math.abs(s.im) };
    }
    return found;
  }
}

/** A symmetric 2×2 matrix. */
type Curvature = { readonly xx: number; readonly xy: number; readonly yy: number };

function gradient(s: Complex, { rayleigh }: SmallestSingular): Complex {
  return { re: 2 * (s.re - rayleigh.re), im: 2 * (s.im - rayleigh.im) };
}

/** The inverse update of Broyden, Fletcher, Goldfarb and Shanno; skipped where the curvature is not positive. */
function updated(h: Curvature, change: Complex, turn: Complex): Curvature {
  const curvature = change.re * turn.re + change.im * turn.im;
  const bent = { re: h.xx * turn.re + h.xy * turn.im, im: h.xy * turn.re + h.yy * turn.im };
  const factor = (1 + (turn.re * bent.re + turn.im * bent.im) / curvature) / curvature;
  const next = {
    xx: h.xx + factor * change.re * change.re - (2 * bent.re * change.re) / curvature,
    xy: h.xy + factor * change.re * change.im - (bent.re * change.im + bent.im * change.re) / curvature,
    yy: h.yy + factor * change.im * change.im - (2 * bent.im * change.im) / curvature,
  };
  return curvature > 0 && Object.values(next).every(Number.isFinite) ? next : h;
}

function byLongestEdge(corners: readonly [Corner, Corner, Corner]): readonly [Corner, Corner, Corner] {
  const [a, b, c] = corners;
  const ab = length(a, b);
  const bc = length(b, c);
  const ca = length(c, a);
  if (ab >= bc && ab >= ca) return [a, b, c];
  return bc >= ca ? [b, c, a] : [c, a, b];
}

function length(x: Complex, y: Complex): number {
  return pythagoras(x.re - y.re, x.im - y.im);
}

/** Least of |s - p|² + constant over the triangle, the bound that the corners give. */
function triangle(a: Corner, b: Corner, c: Corner): Triangle {
  const corners = [a, b, c] as const;
  // In coordinates about a, where nothing large cancels.
  const [x1, y1, x2, y2] = [b.re - a.re, b.im - a.im, c.re - a.re, c.im - a.im];
  const fb = b.square - a.square - (x1 * x1 + y1 * y1);
  const fc = c.square - a.square - (x2 * x2 + y2 * y2);
  const area = x1 * y2 - x2 * y1;
  const gx = (fb * y2 - fc * y1) / area;
  const gy = (fc * x1 - fb * x2) / area;
  const bound = (x: number, y: number) => a.square + gx * x + gy * y + x * x + y * y;
  const px = -gx / 2;
  const py = -gy / 2;
  const share1 = (px * y2 - x2 * py) / area;
  const share2 = (x1 * py - px * y1) / area;
  let least = Number.POSITIVE_INFINITY;
  if (share1 >= 0 && share2 >= 0 && share1 + share2 <= 1) least = bound(px, py);
  else {
    const edges = [
      [0, 0, x1, y1],
      [0, 0, x2, y2],
      [x1, y1, x2 - x1, y2 - y1],
    ];
    for (const [x, y, dx, dy] of edges) {
      const along = Math.min(1, Math.max(0, ((px - x) * dx + (py - y) * dy) / (dx * dx + dy * dy)));
      least = Math.min(least, bound(x + along * dx, y + along * dy));
    }
  }
  return { corners, lower: least > 0 ? Math.sqrt(least) : 0 };
}

function push(heap: Triangle[], one: Triangle): void {
  heap.push(one);
  for (let i = heap.length - 1; i > 0; ) {
    const parent = (i - 1) >> 1;
    if (heap[parent].lower <= heap[i].lower) break;
    [heap[parent], heap[i]] = [heap[i], heap[parent]];
    i = parent;
  }
}

function pop(heap: Triangle[]): Triangle {
  const top = heap[0];
  const last = heap.pop() as Triangle;
  if (heap.length === 0) return top;
  heap[0] = last;
  for (let i = 0; ; ) {
    const left = 2 * i + 1;
    if (left >= heap.length) break;
    const child = left + 1 < heap.length && heap[left + 1].lower < heap[left].lower ? left + 1 : left;
    if (heap[i].lower <= heap[child].lower) break;
    [heap[i], heap[child]] = [heap[child], heap[i]];
    i = child;
  }
  return top;
}
