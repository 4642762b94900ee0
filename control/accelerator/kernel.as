// The products of control/linalg/flat.ts and control/linalg/double-double.ts with two columns to an instruction, in AssemblyScript.
// Every entry is summed over the inner index in order and begins with +0, as there, so that the bits agree. Matrices are
// row-major doubles at byte addresses; `panel` is room for columns packed side by side.

/** Four columns of b, padded with zeros, so that a tile reads them one after the other. */
function packFour(b: usize, inner: usize, columns: usize, width: usize, panel: usize): void {
  for (let k: usize = 0; k < inner; k++) {
    for (let lane: usize = 0; lane < 4; lane++) {
      store<f64>(panel + (lane << 3), lane < width ? load<f64>(b + (lane << 3)) : 0);
    }
    b += columns << 3;
    panel += 32;
  }
}

/** The first `width` of the four numbers in left and right. */
function storeFour(at: usize, left: v128, right: v128, width: usize): void {
  if (width == 4) {
    v128.store(at, left);
    v128.store(at, right, 16);
    return;
  }
  store<f64>(at, f64x2.extract_lane(left, 0));
  if (width > 1) store<f64>(at, f64x2.extract_lane(left, 1), 8);
  if (width > 2) store<f64>(at, f64x2.extract_lane(right, 0), 16);
}

/**
 * c = a b. Rows are taken by four: a must be readable and c writable for up to three rows more than `rows`.
 * a rows×inner, b inner×columns, c rows×columns, panel 4×inner.
 */
export function product(a: usize, b: usize, c: usize, rows: usize, inner: usize, columns: usize, panel: usize): void {
  const step = inner << 3;
  const stride = columns << 3;
  for (let j: usize = 0; j < columns; j += 4) {
    const width = min<usize>(4, columns - j);
    packFour(b + (j << 3), inner, columns, width, panel);
    let row = a;
    let out = c + (j << 3);
    for (let i: usize = 0; i < rows; i += 4) {
      let c00 = f64x2.splat(0), c01 = f64x2.splat(0), c10 = f64x2.splat(0), c11 = f64x2.splat(0);
      let c20 = f64x2.splat(0), c21 = f64x2.splat(0), c30 = f64x2.splat(0), c31 = f64x2.splat(0);
      let p = panel;
      let q = row;
      for (const end = row + step; q < end; q += 8) {
        const left = v128.load(p);
        const right = v128.load(p, 16);
        let x = v128.load64_splat(q);
        c00 = f64x2.add(c00, f64x2.mul(x, left));
        c01 = f64x2.add(c01, f64x2.mul(x, right));
        x = v128.load64_splat(q + step);
        c10 = f64x2.add(c10, f64x2.mul(x, left));
        c11 = f64x2.add(c11, f64x2.mul(x, right));
        x = v128.load64_splat(q + 2 * step);
        c20 = f64x2.add(c20, f64x2.mul(x, left));
        c21 = f64x2.add(c21, f64x2.mul(x, right));
        x = v128.load64_splat(q + 3 * step);
        c30 = f64x2.add(c30, f64x2.mul(x, left));
        c31 = f64x2.add(c31, f64x2.mul(x, right));
        p += 32;
      }
      storeFour(out, c00, c01, width);
      storeFour(out + stride, c10, c11, width);
      storeFour(out + 2 * stride, c20, c21, width);
      storeFour(out + 3 * stride, c30, c31, width);
      row += 4 * step;
      out += 4 * stride;
    }
  }
}

/** Upper half of x by Veltkamp's split. */
// @ts-ignore: decorator
@inline
function head(x: f64): f64 {
  const c = 134217729.0 * x;
  return c - (c - x);
}

/** Two columns of b = hi + lo with the halves of hi: value, head, tail and lo, two lanes each, for one k after the other. */
function packWide(hi: usize, lo: usize, inner: usize, columns: usize, width: usize, panel: usize): void {
  for (let k: usize = 0; k < inner; k++) {
    for (let lane: usize = 0; lane < 2; lane++) {
      const at = lane << 3;
      const value = lane < width ? load<f64>(hi + at) : 0;
      const upper = head(value);
      store<f64>(panel + at, value);
      store<f64>(panel + at, upper, 16);
      store<f64>(panel + at, value - upper, 32);
      store<f64>(panel + at, lane < width ? load<f64>(lo + at) : 0, 48);
    }
    hi += columns << 3;
    lo += columns << 3;
    panel += 64;
  }
}

// @ts-ignore: decorator
@inline
function storeTwo(at: usize, pair: v128, width: usize): void {
  if (width == 2) v128.store(at, pair);
  else store<f64>(at, f64x2.extract_lane(pair, 0));
}

/**
 * hi + lo = a (bHi + bLo) in double-double. a rows×inner, b inner×columns, panel 8×inner, parts 3×rows×inner (the entries of a
 * with their halves).
 */
export function wideProduct(
  a: usize, bHi: usize, bLo: usize, hi: usize, lo: usize,
  rows: usize, inner: usize, columns: usize, panel: usize, parts: usize
): void {
  for (let k: usize = 0, to = parts; k < rows * inner; k++, to += 24) {
    const value = load<f64>(a + (k << 3));
    const upper = head(value);
    store<f64>(to, value);
    store<f64>(to, upper, 8);
    store<f64>(to, value - upper, 16);
  }
  for (let j: usize = 0; j < columns; j += 2) {
    const width = min<usize>(2, columns - j);
    packWide(bHi + (j << 3), bLo + (j << 3), inner, columns, width, panel);
    let q = parts;
    for (let i: usize = 0; i < rows; i++) {
      let sum = f64x2.splat(0);
      let rest = f64x2.splat(0);
      let p = panel;
      for (const end = panel + (inner << 6); p < end; p += 64) {
        const x = v128.load64_splat(q);
        const upper = v128.load64_splat(q, 8);
        const lower = v128.load64_splat(q, 16);
        const value = v128.load(p);
        const bh = v128.load(p, 16);
        const bt = v128.load(p, 32);
        const term = f64x2.mul(x, value);
        const below = f64x2.sub(
          f64x2.mul(lower, bt),
          f64x2.sub(f64x2.sub(f64x2.sub(term, f64x2.mul(upper, bh)), f64x2.mul(lower, bh)), f64x2.mul(upper, bt))
        );
        const total = f64x2.add(sum, term);
        const part = f64x2.sub(total, sum);
        rest = f64x2.add(
          rest,
          f64x2.add(
            f64x2.add(f64x2.sub(sum, f64x2.sub(total, part)), f64x2.sub(term, part)),
            f64x2.add(below, f64x2.mul(x, v128.load(p, 48)))
          )
        );
        sum = total;
        q += 24;
      }
      const whole = f64x2.add(sum, rest);
      const at = (i * columns + j) << 3;
      storeTwo(hi + at, whole, width);
      storeTwo(lo + at, f64x2.sub(rest, f64x2.sub(whole, sum)), width);
    }
  }
}

/** y += factor x, count numbers. */
function addMultiple(y: usize, x: usize, count: usize, factor: f64): void {
  const f = f64x2.splat(factor);
  for (const end = y + ((count & ~1) << 3); y < end; y += 16, x += 16) {
    v128.store(y, f64x2.add(v128.load(y), f64x2.mul(f, v128.load(x))));
  }
  if (count & 1) store<f64>(y, load<f64>(y) + factor * load<f64>(x));
}

/** Rows from..to of h, from the given byte on, times the reflection I - beta v v'; `sums` is room for a row. */
function reflectRows(h: usize, stride: usize, rows: usize, count: usize, v: usize, beta: f64, sums: usize): void {
  memory.fill(sums, 0, count << 3);
  let row = h;
  for (let i: usize = 0; i < rows; i++, row += stride) addMultiple(sums, row, count, load<f64>(v + (i << 3)));
  row = h;
  for (let i: usize = 0; i < rows; i++, row += stride) addMultiple(row, sums, count, -(beta * load<f64>(v + (i << 3))));
}

/** As `hessenbergByLoops`; q is the address of qt or 0, v and sums are room for n numbers each. */
export function hessenberg(h: usize, q: usize, n: usize, v: usize, sums: usize): void {
  const stride = n << 3;
  for (let k: usize = 0; k + 2 < n; k++) {
    const count = n - k - 1;
    const corner = h + (k + 1) * stride + (k << 3);
    const bottom = corner + count * stride;
    let below: f64 = 0;
    for (let at = corner + stride; at < bottom; at += stride) below = max(below, abs(load<f64>(at)));
    if (below == 0) continue;
    const scale = max(below, abs(load<f64>(corner)));
    let sum: f64 = 0;
    for (let at = corner, to = v; at < bottom; at += stride, to += 8) {
      const x = load<f64>(at) / scale;
      store<f64>(to, x);
      sum += x * x;
    }
    const length = sqrt(sum);
    const first = load<f64>(v);
    store<f64>(v, first + (first >= 0 ? length : -length));
    let square: f64 = 0;
    for (let to = v; to < v + (count << 3); to += 8) square += load<f64>(to) * load<f64>(to);
    const beta = 2 / square;
    reflectRows(corner, stride, count, count + 1, v, beta, sums);
    const edge = h + ((k + 1) << 3);
    for (let at = edge; at < edge + n * stride; at += stride) {
      let pair = f64x2.splat(0);
      const pairs = (count & ~1) << 3;
      for (let j: usize = 0; j < pairs; j += 16) pair = f64x2.add(pair, f64x2.mul(v128.load(at + j), v128.load(v + j)));
      let even = f64x2.extract_lane(pair, 0);
      if (count & 1) even += load<f64>(at + pairs) * load<f64>(v + pairs);
      addMultiple(at, v, count, -((even + f64x2.extract_lane(pair, 1)) * beta));
    }
    if (q) reflectRows(q + (k + 1) * stride, stride, count, n, v, beta, sums);
    for (let at = corner + stride; at < bottom; at += stride) store<f64>(at, 0);
  }
}

/** `three` rows (else two) from the byte at `x` up to `end` times a reflection. */
function turnRows(x: usize, end: usize, stride: usize, three: bool, u: f64, w: f64, tau: f64): void {
  const us = f64x2.splat(u);
  const ws = f64x2.splat(w);
  const taus = f64x2.splat(tau);
  const past = three ? 2 * stride : stride;
  for (; x + 8 < end; x += 16) {
    const a = v128.load(x);
    const b = v128.load(x + stride);
    const c = v128.load(x + past);
    let sum = f64x2.add(a, f64x2.mul(us, b));
    if (three) sum = f64x2.add(sum, f64x2.mul(ws, c));
    sum = f64x2.mul(sum, taus);
    v128.store(x, f64x2.sub(a, sum));
    v128.store(x + stride, f64x2.sub(b, f64x2.mul(sum, us)));
    if (three) v128.store(x + past, f64x2.sub(c, f64x2.mul(sum, ws)));
  }
  if (x < end) turnEntries(x, x, stride, stride, three, u, w, tau);
}

/** Groups of three (else two) entries, `gap` apart, of which the first stand from x to last, `step` apart, times a reflection. */
function turnEntries(x: usize, last: usize, step: usize, gap: usize, three: bool, u: f64, w: f64, tau: f64): void {
  for (; x <= last; x += step) {
    const a = load<f64>(x);
    const b = load<f64>(x + gap);
    let sum = a + u * b;
    if (three) {
      const c = load<f64>(x + 2 * gap);
      sum = (sum + w * c) * tau;
      store<f64>(x + 2 * gap, c - sum * w);
    } else sum *= tau;
    store<f64>(x, a - sum);
    store<f64>(x + gap, b - sum * u);
  }
}

/** As the sweep of `chaseByLoops`; q is the address of qt or 0. */
export function sweep(
  h: usize, q: usize, n: usize, full: bool, m: usize, start: usize, end: usize, v0: f64, v1: f64, v2: f64
): void {
  const stride = n << 3;
  for (let k = m; k < end; k++) {
    const three = k + 2 <= end;
    const at = h + k * stride + (k << 3) - 8;
    const a = k > m ? load<f64>(at) : v0;
    const b = k > m ? load<f64>(at + stride) : v1;
    const c = three ? (k > m ? load<f64>(at + 2 * stride) : v2) : 0;
    const rest = max(abs(b), abs(c));
    if (rest == 0) continue;
    const largest = max(abs(a), rest);
    const scale: f64 = largest < 1e-140 || largest > 1e140 ? largest : 1;
    let x = a, y = b, z = c;
    if (scale != 1) {
      x /= scale;
      y /= scale;
      z /= scale;
    }
    const length = sqrt(x * x + y * y + z * z);
    const beta = x >= 0 ? -length : length;
    const tau = (beta - x) / beta;
    const u = y / (x - beta);
    const w = z / (x - beta);
    if (k > m) {
      store<f64>(at, beta * scale);
      store<f64>(at + stride, 0);
      if (three) store<f64>(at + 2 * stride, 0);
    } else if (m > start) {
      store<f64>(at, load<f64>(at) * (1 - tau));
    }
    const row = h + k * stride;
    turnRows(row + (k << 3), row + ((full ? n : end + 1) << 3), stride, three, u, w, tau);
    const column = h + (k << 3);
    const last = column + min(k + 3, end) * stride;
    turnEntries(column + (full ? 0 : start) * stride, last, stride, 8, three, u, w, tau);
    if (q) turnRows(q + k * stride, q + (k + 1) * stride, stride, three, u, w, tau);
  }
}

/** As `factorByLoops`: L U over a, the order of its rows in `rows` (32-bit numbers); the first row without a pivot, or -1. */
export function factor(a: usize, n: usize, rows: usize): i32 {
  const stride = n << 3;
  let zeroPivot: i32 = -1;
  for (let k: usize = 0; k < n; k++) {
    const top = a + k * stride;
    const column = top + (k << 3);
    const end = a + n * stride;
    let best = column;
    for (let at = column + stride; at < end; at += stride) if (abs(load<f64>(at)) > abs(load<f64>(best))) best = at;
    const pivot = load<f64>(best);
    if (pivot == 0) {
      if (zeroPivot < 0) zeroPivot = <i32>k;
      continue;
    }
    if (best != column) {
      const other = best - (k << 3);
      for (let j: usize = 0; j < stride; j += 8) {
        const x = load<f64>(top + j);
        store<f64>(top + j, load<f64>(other + j));
        store<f64>(other + j, x);
      }
      const at = rows + ((other - a) / stride << 2);
      const row = load<i32>(at);
      store<i32>(at, load<i32>(rows + (k << 2)));
      store<i32>(rows + (k << 2), row);
    }
    for (let at = column + stride; at < end; at += stride) {
      const x = load<f64>(at);
      if (x == 0) continue;
      store<f64>(at, x / pivot);
      addMultiple(at + 8, column + 8, n - k - 1, -(x / pivot));
    }
  }
  return zeroPivot;
}

/** As `solveByLoops`: x, rows in order of the factors, is overwritten by the solution. */
export function solve(lu: usize, n: usize, x: usize, columns: usize): void {
  const stride = columns << 3;
  for (let i: usize = 0; i < n; i++) subtractRows(lu + ((i * n) << 3), 0, i, x, x + i * stride, columns);
  for (let i = n; i-- > 0; ) {
    const row = lu + ((i * n) << 3);
    const to = x + i * stride;
    subtractRows(row, i + 1, n, x, to, columns);
    const pivot = load<f64>(row + (i << 3));
    for (let at = to; at < to + stride; at += 8) store<f64>(at, load<f64>(at) / pivot);
  }
}

/** Row at `to` minus factors from..end of `row` times the rows of x. */
function subtractRows(row: usize, from: usize, end: usize, x: usize, to: usize, columns: usize): void {
  for (let k = from; k < end; k++) {
    const factor = load<f64>(row + (k << 3));
    if (factor != 0) addMultiple(to, x + ((k * columns) << 3), columns, -factor);
  }
}
