import { decodeBase64 } from "./decode-base64";
import { KERNEL_BYTES } from "./kernel-bytes";
import { type Memory, webAssembly } from "./web-assembly";

/** What kernel.as exports; an argument that names a matrix or room is a byte address. */
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
  factor(a: number, n: number, rows: number): number;
  solve(lu: number, n: number, x: number, columns: number): void;
  hessenberg(h: number, q: number, n: number, v: number, sums: number): void;
  sweep(
    h: number,
    q: number,
    n: number,
    full: number,
    m: number,
    start: number,
    end: number,
    v0: number,
    v1: number,
    v2: number,
  ): void;
};

/** `numbers` is the kernel's whole memory, good until the next call of `accelerator`. */
export type Accelerator = { readonly kernel: Kernel; readonly numbers: Float64Array };

const PAGE = 65536;
/** Beyond this many numbers the loops serve: memory that has grown is never given back. */
const MOST_NUMBERS = 4_000_000;

let kernel: Kernel | null | undefined;
let held: Accelerator | null = null;
let wanted = true;

/**
 * Switches the kernel on or off for all work from now on, and says whether it is in use. Results have the same bits either
 * way; off is for comparing, and for pages whose policy forbids compiling, where even trying would be reported.
 *
 * Shapes    none
 * Units     none
 * Throws    nothing
 * Accuracy  no bit of any result depends on it
 * Source    kernel.as, beside this file
 */
export function switchAccelerator(on: boolean): boolean {
  wanted = on;
  return accelerator(0) !== null;
}

/** The kernel with room for so many numbers, or null when the loops must serve. */
export function accelerator(count: number): Accelerator | null {
  if (!wanted || count > MOST_NUMBERS) return null;
  if (held && held.numbers.length >= count) return held;
  // Compiled at the first call that wants it; null where the engine has no WebAssembly, lacks SIMD, or a policy forbids it.
  if (kernel === undefined) kernel = load();
  if (!kernel) return null;
  const { memory } = kernel;
  const missing = count * 8 - memory.buffer.byteLength;
  try {
    if (missing > 0) memory.grow(Math.ceil(missing / PAGE));
  } catch {
    return null;
  }
  held = { kernel, numbers: new Float64Array(memory.buffer) };
  return held;
}

function load(): Kernel | null {
  if (!webAssembly) return null;
  try {
    return new webAssembly.Instance(new webAssembly.Module(decodeBase64(KERNEL_BYTES))).exports as Kernel;
  } catch {
    return null;
  }
}
