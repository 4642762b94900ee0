import type { Matrix } from "ml-matrix";

/** Entries · 2^exponent in whole numbers, row by row: sums and products of doubles without any rounding. */
export type Exact = { readonly rows: bigint[][]; readonly exponent: number };

const bits = new DataView(new ArrayBuffer(8));

function dyadic(x: number): { mantissa: bigint; exponent: number } {
  bits.setFloat64(0, x);
  const word = bits.getBigUint64(0);
  const field = Number((word >> 52n) & 0x7ffn);
  const fraction = word & 0xfffffffffffffn;
  const size = field === 0 ? fraction : fraction | 0x10000000000000n;
  return { mantissa: word >> 63n ? -size : size, exponent: Math.max(field, 1) - 1075 };
}

/** Throws on NaN and infinities, which are no numbers. */
export function exactly(given: Matrix | readonly (readonly number[])[]): Exact {
  const rows = "to2DArray" in given ? given.to2DArray() : given;
  if (!rows.every((row) => row.every(Number.isFinite))) throw new Error("An exact matrix needs finite entries.");
  const parts = rows.map((row) => row.map(dyadic));
  const present = parts.flat().filter(({ mantissa }) => mantissa !== 0n);
  const least = present.reduce((lowest, { exponent }) => Math.min(lowest, exponent), present[0]?.exponent ?? 0);
  const shifted = parts.map((row) =>
    row.map(({ mantissa, exponent }) => (mantissa === 0n ? 0n : mantissa << BigInt(exponent - least))),
  );
  return { rows: shifted, exponent: least };
}

export function times(a: Exact, b: Exact): Exact {
  const columns = b.rows[0]?.length ?? 0;
  const rows = a.rows.map((row) =>
    Array.from({ length: columns }, (_, j) => row.reduce((sum, x, l) => (x === 0n ? sum : sum + x * b.rows[l][j]), 0n)),
  );
  return { rows, exponent: a.exponent + b.exponent };
}

export function plus(a: Exact, b: Exact, sign: 1 | -1 = 1): Exact {
  const exponent = Math.min(a.exponent, b.exponent);
  const [left, right] = [BigInt(a.exponent - exponent), BigInt(b.exponent - exponent)];
  const rows = a.rows.map((row, i) => row.map((x, j) => (x << left) + (sign === 1 ? 1n : -1n) * (b.rows[i][j] << right)));
  return { rows, exponent };
}

export function transposed({ rows, exponent }: Exact): Exact {
  return { rows: (rows[0] ?? []).map((_, j) => rows.map((row) => row[j])), exponent };
}

/** A whole number · 2^exponent as a double, within an ulp; beyond the doubles infinity or zero. */
export function toDouble(x: bigint, exponent: number): number {
  const size = x < 0n ? -x : x;
  const spare = Math.max(0, size.toString(2).length - 64);
  const rounded = Number(size >> BigInt(spare));
  const half = Math.trunc((exponent + spare) / 2);
  return (x < 0n ? -1 : 1) * rounded * 2 ** half * 2 ** (exponent + spare - half);
}

/** Square root of the sum of squares, as a double. */
export function exactNorm({ rows, exponent }: Exact): number {
  return Math.hypot(...rows.flat().map((x) => toDouble(x, exponent)));
}
