/** How far above and below the range of the poles zeros are looked for with full accuracy. */
const BEYOND = 4;
const TRIES = 9;

/**
 * Three real numbers about which eigenvalues are sought by inversion: below, amid and above the sizes of the poles, each moved
 * to where it is far from all of them. Values within a few powers of ten of one of them come out with nearly all digits.
 */
export function searchShifts(sizes: readonly number[]): number[] {
  const positive = sizes.filter((size) => size > 0);
  if (positive.length === 0) return [1];
  const least = Math.min(...positive) / BEYOND;
  const most = Math.max(...positive) * BEYOND;
  return [least, Math.sqrt(least) * Math.sqrt(most), most].map((target) => {
    let best = target;
    let room = 0;
    for (let k = 0; k < TRIES; k++) {
      const sigma = target * (0.75 + k / 16);
      const gap = positive.reduce((near, size) => Math.min(near, Math.abs(size - sigma) / (size + sigma)), 1);
      if (gap <= room) continue;
      room = gap;
      best = sigma;
    }
    return best;
  });
}
