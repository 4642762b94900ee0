import { modulus } from "../linalg/complex";
import { pythagoras } from "../linalg/flat";
import type { Complex } from "../plant/model";

/**
 * Zeros that are refined together. A cluster about the real axis holds both of each pair, another one those with im > 0.
 * `gap` is the smaller of its distance to other zeros and its own size; `reach` is how far its zeros may move.
 */
export type ZeroCluster = {
  readonly members: readonly Complex[];
  readonly real: boolean;
  readonly mean: Complex;
  readonly gap: number;
  readonly reach: number;
};

/** Zeros nearer than this, beside their size, are a cluster; the limit falls where clusters grow too large. */
const LINKS = [2e-2, 2e-3, 2e-4, 2e-5, 2e-6, 2e-7];
/** Real dimension of the largest cluster. */
const MOST_TOGETHER = 8;
/** Beside a zero at rest that stands alone the size of the system, times this, says what is near. */
const NEAR_REST = 1e-4;

/**
 * Clusters of zeros, each to be refined as one block.
 *
 * Shapes    zeros closed under conjugation → clusters that together hold each zero with im ≥ 0 once
 * Units     rate, the size of the system, as the zeros
 * Accuracy  a cluster that stays larger than 8 at the smallest limit is left out
 */
export function zeroClusters(zeros: readonly Complex[], rate: number): ZeroCluster[] {
  const upper = zeros.filter(({ im }) => im >= 0);
  return linked(upper, zeros, rate, 0);
}

/** The two as one; null when that is too large. */
export function mergeClusters(x: ZeroCluster, y: ZeroCluster, all: readonly Complex[], rate: number): ZeroCluster | null {
  const real = x.real || y.real;
  const members = [x, y].flatMap((one) => (real && !one.real ? [...one.members, ...one.members.map(conjugate)] : one.members));
  return members.length * (real ? 1 : 2) > MOST_TOGETHER ? null : clusterOf(members, real, all, rate);
}

export function conjugate({ re, im }: Complex): Complex {
  return { re, im: -im };
}

function linked(upper: readonly Complex[], all: readonly Complex[], rate: number, level: number): ZeroCluster[] {
  if (level >= LINKS.length) return [];
  const open = [...upper];
  const clusters: ZeroCluster[] = [];
  while (open.length > 0) {
    const group = open.splice(0, 1);
    for (let i = 0; i < group.length; i++) {
      for (let j = open.length - 1; j >= 0; j--) if (near(group[i], open[j], LINKS[level])) group.push(...open.splice(j, 1));
    }
    const real = group.some((zero) => near(zero, conjugate(zero), LINKS[level]));
    const members = real ? group.flatMap((zero) => (zero.im === 0 ? [zero] : [zero, conjugate(zero)])) : group;
    if (members.length * (real ? 1 : 2) > MOST_TOGETHER) clusters.push(...linked(group, all, rate, level + 1));
    else clusters.push(clusterOf(members, real, all, rate));
  }
  return clusters;
}

function near(x: Complex, y: Complex, link: number): boolean {
  return pythagoras(x.re - y.re, x.im - y.im) <= link * Math.max(modulus(x), modulus(y));
}

function clusterOf(members: readonly Complex[], real: boolean, all: readonly Complex[], rate: number): ZeroCluster {
  const share = 1 / members.length;
  const mean = {
    re: members.reduce((sum, { re }) => sum + re * share, 0),
    im: real ? 0 : members.reduce((sum, { im }) => sum + im * share, 0),
  };
  const away = ({ re, im }: Complex) => pythagoras(re - mean.re, im - mean.im);
  const radius = Math.max(...members.map(away));
  const inside = (zero: Complex) => members.some(({ re, im }) => re === zero.re && im === zero.im);
  let alone = rate;
  for (const zero of all) if (!inside(zero) && !inside(conjugate(zero))) alone = Math.min(alone, away(zero));
  const gap = Math.min(alone, Math.max(modulus(mean), 50 * radius) || NEAR_REST * rate);
  return { members, real, mean, gap, reach: Math.max(alone / 2, 2 * radius) };
}
