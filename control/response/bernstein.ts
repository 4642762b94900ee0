import { workArray, workCopy } from "../linalg/work-array";

/** Searches on a polynomial over [0, 1] given by its Bernstein coefficients, the smallest and largest of which enclose its values. */
export type Extreme = { readonly value: number; readonly at: number };

const SMALLEST_PIECE = 1 / 70_368_744_177_664; // 2^-46
const MOST_PIECES = 400;

type Piece = { readonly b: Float64Array; readonly from: number; readonly size: number };

/** de Casteljau's halving: what the rounds leave at the front is the left half, what they leave behind is the right one. */
function halve({ b, from, size }: Piece): [Piece, Piece] {
  const n = b.length;
  const left = workArray(n);
  const right = workCopy(b);
  for (let k = 0; k < n; k++) {
    left[k] = right[0];
    for (let i = 0; i < n - 1 - k; i++) right[i] = (right[i] + right[i + 1]) / 2;
  }
  return [
    { b: left, from, size: size / 2 },
    { b: right, from: from + size / 2, size: size / 2 },
  ];
}

export function largest(b: Float64Array): number {
  let most = b[0];
  for (let i = 1; i < b.length; i++) if (b[i] > most) most = b[i];
  return most;
}

export function smallest(b: Float64Array): number {
  let least = b[0];
  for (let i = 1; i < b.length; i++) if (b[i] < least) least = b[i];
  return least;
}

/** Largest value if it exceeds `best` by more than `margin`, and its place; null otherwise. */
export function maximumAbove(b: Float64Array, best: number, margin: number): Extreme | null {
  let found: Extreme | null = null;
  let limit = best + margin;
  const take = (value: number, at: number) => {
    if (value <= limit) return;
    found = { value, at };
    limit = value;
  };
  const open: Piece[] = [{ b, from: 0, size: 1 }];
  for (let count = 0; count < MOST_PIECES; count++) {
    const piece = open.pop();
    if (!piece) break;
    if (largest(piece.b) <= limit) continue;
    take(piece.b[0], piece.from);
    take(piece.b[piece.b.length - 1], piece.from + piece.size);
    if (largest(piece.b) <= limit || piece.size < SMALLEST_PIECE) continue;
    if (isConcave(piece.b)) {
      const top = topOfConcave(piece.b);
      take(top.value, piece.from + top.at * piece.size);
      continue;
    }
    const [left, right] = halve(piece);
    if (largest(left.b) >= largest(right.b)) open.push(right, left);
    else open.push(left, right);
  }
  return found;
}

/** No second difference of the coefficients is above zero, so the polynomial has one top. */
function isConcave(b: Float64Array): boolean {
  for (let i = 2; i < b.length; i++) if (b[i] - b[i - 1] > b[i - 1] - b[i - 2]) return false;
  return true;
}

/** Newton on the slope, kept inside a bracket that halves when Newton leaves it. */
function topOfConcave(b: Float64Array): Extreme {
  let low = 0;
  let high = 1;
  let at = 0.5;
  for (let round = 0; round < 60 && high - low > SMALLEST_PIECE; round++) {
    const { slope, bend } = derivatives(b, at);
    if (slope > 0) low = at;
    else high = at;
    const next = at - slope / bend;
    const inside = next > low && next < high ? next : (low + high) / 2;
    if (Math.abs(inside - at) < SMALLEST_PIECE) break;
    at = inside;
  }
  return { value: valueAt(b, at), at };
}

function valueAt(b: Float64Array, t: number): number {
  return casteljau(b, t, 1)[0];
}

function derivatives(b: Float64Array, t: number): { slope: number; bend: number } {
  const degree = b.length - 1;
  const points = casteljau(b, t, 3);
  const [p0, p1, p2] = [points[0], points[1], points[2]];
  const s0 = p1 - p0;
  const s1 = p2 - p1;
  // of the last three points, s0 and s1 span the first derivative's control points
  return { slope: degree * (s0 + t * (s1 - s0)), bend: degree * (degree - 1) * (s1 - s0) };
}

let scheme = new Float64Array(16);

/** The last `keep` points of de Casteljau's scheme at t, good until the next call. */
function casteljau(b: Float64Array, t: number, keep: number): Float64Array {
  if (scheme.length < b.length) scheme = new Float64Array(b.length);
  const points = scheme;
  points.set(b);
  for (let k = b.length - 1; k >= keep; k--) for (let i = 0; i < k; i++) points[i] += t * (points[i + 1] - points[i]);
  return points;
}

/** Smallest t with p(t) ≥ level, or null. */
export function firstReaching(b: Float64Array, level: number): number | null {
  const open: Piece[] = [{ b, from: 0, size: 1 }];
  for (let count = 0; count < MOST_PIECES; count++) {
    const piece = open.pop();
    if (!piece) return null;
    if (piece.b[0] >= level) return piece.from;
    if (largest(piece.b) < level) continue;
    if (isRising(piece.b)) return piece.from + piece.size * crossing(piece.b, level);
    if (piece.size < SMALLEST_PIECE) return piece.from + piece.size;
    const [left, right] = halve(piece);
    open.push(right, left);
  }
  return null;
}

/** Largest t at which p(t) leaves low ≤ p ≤ high, 1 when it ends outside, or null when it never leaves. */
export function lastOutside(b: Float64Array, low: number, high: number): number | null {
  const open: Piece[] = [{ b, from: 0, size: 1 }];
  for (let count = 0; count < MOST_PIECES; count++) {
    const piece = open.pop();
    if (!piece) return null;
    const end = piece.b[piece.b.length - 1];
    if (end < low || end > high) return piece.from + piece.size;
    if (smallest(piece.b) >= low && largest(piece.b) <= high) continue;
    if (isRising(piece.b)) return piece.from + piece.size * crossing(piece.b, low);
    const mirrored = negative(piece.b);
    if (isRising(mirrored)) return piece.from + piece.size * crossing(mirrored, -high);
    if (piece.size < SMALLEST_PIECE) return piece.from;
    const [left, right] = halve(piece);
    open.push(left, right);
  }
  return null;
}

let mirrored = new Float64Array(0);

/** -b, good until the next call. */
export function negative(b: Float64Array): Float64Array {
  if (mirrored.length !== b.length) mirrored = new Float64Array(b.length);
  for (let i = 0; i < b.length; i++) mirrored[i] = -b[i];
  return mirrored;
}

/** No coefficient is below the one before, so the polynomial never falls. */
function isRising(b: Float64Array): boolean {
  for (let i = 1; i < b.length; i++) if (b[i] < b[i - 1]) return false;
  return true;
}

/** Where a rising polynomial that begins below the level and ends at or above it passes it: Newton inside a bracket. */
function crossing(b: Float64Array, level: number): number {
  const degree = b.length - 1;
  let low = 0;
  let high = 1;
  let at = (level - b[0]) / (b[degree] - b[0]);
  for (let round = 0; round < 60 && high - low > SMALLEST_PIECE; round++) {
    const points = casteljau(b, at, 2);
    const [p0, p1] = [points[0], points[1]];
    const beyond = p0 + at * (p1 - p0) - level;
    if (beyond < 0) low = at;
    else high = at;
    const next = at - beyond / (degree * (p1 - p0));
    const inside = next > low && next < high ? next : (low + high) / 2;
    if (Math.abs(inside - at) < SMALLEST_PIECE) return inside;
    at = inside;
  }
  return at;
}
