/** Numbers to a stretch of memory: small enough that what outlives the others keeps little of it from being freed. */
const STRETCH = 8192;
const LARGE = 1024;

let stretch = new ArrayBuffer(0);
let used = STRETCH + 1;

/**
 * Zeros for work inside the core, cut from a common stretch of memory: a buffer of its own for each small array costs more than
 * most of what is done with it. Whatever leaves the core as a Float64Array needs one, or its whole stretch would be sent along.
 */
export function workArray(length: number): Float64Array {
  if (length > LARGE) return new Float64Array(length);
  if (used + length > STRETCH) {
    stretch = new ArrayBuffer(8 * STRETCH);
    used = 0;
  }
  const array = new Float64Array(stretch, 8 * used, length);
  used += length;
  return array;
}

/** The same with the entries of `a`. */
export function workCopy(a: ArrayLike<number>): Float64Array {
  const copy = workArray(a.length);
  copy.set(a);
  return copy;
}
