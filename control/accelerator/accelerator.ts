import { decodeBase64 } from "./decode-base64";
import { KERNEL_BYTES } from "./kernel-bytes";
import { type Memory, webAssembly } from "./web-assembly";

/** What kernel.as exports; every argument is a byte address or a count. */
type Kernel = {
  readonly memory: Memory;
  product(a: number, b: number, c: number, rows: number, inner: number, columns: number, panel: number): void;
  wideProduct(
    a: number,
    bHi: number,
    bLo: number,
    hi: number,
    lo: number,
    rows: number,
    inner: number,
    columns: number,
    panel: number,
    parts: number,
  ): void;
};

const PAGE = 65536;
/** Beyond this many numbers the loops serve: memory that has grown is never given back. */
const MOST_NUMBERS = 4_000_000;
/** Multiplications from which a call repays the copies it needs. */
const WORTH_A_CALL = 400;
const WORTH_A_WIDE_CALL = 60;

let kernel: Kernel | null | undefined;
let wanted = true;
let numbers = new Float64Array(0);

/**
 * Switches the kernel on or off for all products from now on, and says whether it is in use. Results have the same bits either
 * way; off is for comparing, and for pages whose policy forbids compiling, where even trying would be reported.
 */
export function useAccelerator(on: boolean): boolean {
  wanted = on;
  return on && loaded() !== null;
}

/** Compiled at the first call that wants it; null where the engine has no WebAssembly, lacks SIMD, or a policy forbids it. */
function loaded(): Kernel | null {
  if (kernel === undefined) kernel = load();
  return kernel;
}

function load(): Kernel | null {
  if (!webAssembly) return null;
  try {
    return new webAssembly.Instance(new webAssembly.Module(decodeBase64(KERNEL_BYTES))).exports as Kernel;
  } catch {
    return null;
  }
}

/** The kernel with room for so many doubles, or null when the loops must serve. */
function ready(count: number): Kernel | null {
  if (!wanted || count > MOST_NUMBERS) return null;
  const found = loaded();
  if (!found) return null;
  const { memory } = found;
  const missing = count * 8 - memory.buffer.byteLength;
  try {
    if (missing > 0) memory.grow(Math.ceil(missing / PAGE));
  } catch {
    return null;
  }
  if (numbers.buffer !== memory.buffer) numbers = new Float64Array(memory.buffer);
  return found;
}

/** As `flatProduct`, to the bit; null when the call is too small, too large or impossible here. */
export function acceleratedProduct(
  a: Float64Array,
  b: Float64Array,
  rows: number,
  inner: number,
  columns: number,
): Float64Array | null {
  if (columns === 1 || rows * inner * columns < WORTH_A_CALL) return null;
  const c = 4 * inner;
  // Rows are taken by four: the last ones read on into b and write on behind c.
  const atA = c + (rows + 3) * columns;
  const atB = atA + rows * inner;
  const found = ready(atB + (columns + 3) * inner);
  if (!found) return null;
  numbers.set(a, atA);
  numbers.set(b, atB);
  found.product(8 * atA, 8 * atB, 8 * c, rows, inner, columns, 0);
  return numbers.slice(c, c + rows * columns);
}

/** As `wideProduct`, to the bit; null as above. */
export function acceleratedWideProduct(
  a: Float64Array,
  b: { readonly hi: Float64Array; readonly lo: Float64Array },
  rows: number,
  inner: number,
  columns: number,
): { hi: Float64Array; lo: Float64Array } | null {
  if (columns === 1 || rows * inner * columns < WORTH_A_WIDE_CALL) return null;
  const parts = 8 * inner;
  const hi = parts + 3 * rows * inner;
  const lo = hi + rows * columns;
  const atA = lo + rows * columns;
  const bHi = atA + rows * inner;
  const bLo = bHi + inner * columns;
  const found = ready(bLo + inner * columns);
  if (!found) return null;
  numbers.set(a, atA);
  numbers.set(b.hi, bHi);
  numbers.set(b.lo, bLo);
  found.wideProduct(8 * atA, 8 * bHi, 8 * bLo, 8 * hi, 8 * lo, rows, inner, columns, 0, 8 * parts);
  return { hi: numbers.slice(hi, lo), lo: numbers.slice(lo, atA) };
}
