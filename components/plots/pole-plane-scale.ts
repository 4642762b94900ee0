import type { Complex } from "@/control/plant/model";

export const PLANE = { width: 280, height: 220, margin: 20 } as const;

export type PlaneScale = {
  readonly x: (re: number) => number;
  readonly y: (im: number) => number;
  /** Back from a place in the drawing. */
  readonly poleAt: (x: number, y: number) => Complex;
  readonly left: number;
  readonly top: number;
};

/**
 * Room for every pole and, for a continuous plant, a strip right of the imaginary axis; for a sampled one the whole unit circle with
 * equal scales. `left` and `top` are the plane's values at those edges.
 */
export function planeScale(poles: readonly Complex[], sampled: boolean): PlaneScale {
  const reach = (part: (pole: Complex) => number, least: number) =>
    poles.reduce((most, pole) => Math.max(most, part(pole)), least);
  const inner = { width: PLANE.width - 2 * PLANE.margin, height: PLANE.height - 2 * PLANE.margin };
  if (sampled) {
    const radius = 1.08 * reach(({ re, im }) => Math.sqrt(re * re + im * im), 1);
    const unit = Math.min(inner.width, inner.height) / (2 * radius);
    const x = (re: number) => PLANE.width / 2 + re * unit;
    const y = (im: number) => PLANE.height / 2 - im * unit;
    const poleAt = (px: number, py: number) => ({ re: (px - PLANE.width / 2) / unit, im: (PLANE.height / 2 - py) / unit });
    return { x, y, poleAt, left: -PLANE.width / (2 * unit), top: PLANE.height / (2 * unit) };
  }
  const left = 1.05 * reach(({ re }) => -re, 0) || 1;
  const right = Math.max(0.12 * left, 1.1 * reach(({ re }) => re, 0));
  const top = 1.1 * reach(({ im }) => Math.abs(im), 0.4 * left);
  const x = (re: number) => PLANE.margin + ((re + left) / (left + right)) * inner.width;
  const y = (im: number) => PLANE.height / 2 - (im / top) * (inner.height / 2);
  const poleAt = (px: number, py: number) => ({
    re: ((px - PLANE.margin) / inner.width) * (left + right) - left,
    im: ((PLANE.height / 2 - py) / (inner.height / 2)) * top,
  });
  return { x, y, poleAt, left: -left, top };
}

/** Damping ratio along a ray from the origin: continuous poles on it have re = -ζ |s|. */
export const DAMPING_RAYS: readonly number[] = [0.2, 0.4, 0.6, 0.8];

/** End of the ray at the left or upper edge of the plane, upper half. */
export function rayEnd(damping: number, { left, top }: PlaneScale): Complex {
  const slope = Math.sqrt(1 - damping * damping) / damping;
  const reachIm = -left * slope;
  return reachIm <= top ? { re: left, im: reachIm } : { re: -top / slope, im: top };
}
