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
