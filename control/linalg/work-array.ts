/** Numbers to a stretch of memory, and in one array from which it gets memory of its own. */
const STRETCH = 8192;
const LARGE = 1024;
/** The like inside a scope, whose memory is used again: at most eight megabytes are kept. */
const KEPT_STRETCH = 32_768;
const KEPT_LARGE = 8192;
const MOST_KEPT = 32;

type Place = { readonly buffer: ArrayBuffer; readonly index: number; readonly used: number };

const kept: ArrayBuffer[] = [];
let depth = 0;
let buffer = new ArrayBuffer(0);
let index = -1;
let used = Number.POSITIVE_INFINITY;

/**
 * Zeros for work inside the core, cut from a common stretch of memory: a buffer of its own for each small array costs more than
 * most of what is done with it. Whatever leaves the core as a Float64Array needs one, or its whole stretch would be sent along.
 */
export function workArray(length: number): Float64Array {
  if (length > (depth > 0 ? KEPT_LARGE : LARGE)) return new Float64Array(length);
  if (used + length > (depth > 0 ? KEPT_STRETCH : STRETCH) && !nextStretch()) return new Float64Array(length);
  const array = new Float64Array(buffer, 8 * used, length);
  used += length;
  return array;
}

/** The same with the entries of `a`. */
export function workCopy(a: ArrayLike<number>): Float64Array {
  const copy = workArray(a.length);
  copy.set(a);
  return copy;
}

/**
 * Runs work whose arrays are all given back at its end, so that the next work finds them in the cache. What `work` returns, or
 * leaves anywhere, must hold none of them: they turn to zeros.
 */
export function workScope<T>(work: () => T): T {
  const before: Place = { buffer, index, used };
  if (depth === 0) used = Number.POSITIVE_INFINITY;
  depth++;
  try {
    return work();
  } finally {
    depth--;
    giveBack(before);
  }
}

function nextStretch(): boolean {
  if (depth === 0) buffer = new ArrayBuffer(8 * STRETCH);
  else {
    if (index + 1 === MOST_KEPT) return false;
    index++;
    kept[index] ??= new ArrayBuffer(8 * KEPT_STRETCH);
    buffer = kept[index];
  }
  used = 0;
  return true;
}

function giveBack(before: Place): void {
  for (let k = Math.max(before.index, 0); k <= index; k++) {
    const from = k === before.index ? before.used : 0;
    new Float64Array(kept[k]).fill(0, from, k === index ? used : KEPT_STRETCH);
  }
  ({ buffer, index, used } = before);
}
