const view = new DataView(new ArrayBuffer(8));

/** Largest e with 2^e ≤ |x| for a finite x (-1074 for zero); exact, no logarithm, so that every engine agrees. */
export function exponentOf(x: number): number {
  view.setFloat64(0, x);
  if (x === 0) return -1074;
  const bits = (view.getUint32(0) >>> 20) & 0x7ff;
  return bits > 0 ? bits - 1023 : exponentOf(x * 4294967296) - 32;
}

/** 2^e for -1022 ≤ e ≤ 1023, exact; beyond that range the nearest such power. */
export function powerOfTwo(e: number): number {
  const clamped = e < -1022 ? -1022 : Math.min(e, 1023);
  view.setUint32(0, (clamped + 1023) << 20);
  view.setUint32(4, 0);
  return view.getFloat64(0);
}

/** x·2^e for -2044 ≤ e ≤ 2046, exact unless the result itself leaves the range: the two halves never leave it before. */
export function timesPowerOfTwo(x: number, e: number): number {
  const half = Math.trunc(e / 2);
  return x * powerOfTwo(half) * powerOfTwo(e - half);
}
