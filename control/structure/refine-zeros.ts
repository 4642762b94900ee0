import { modulus } from "../linalg/complex";
import { pythagoras } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import type { Complex } from "../plant/model";
import { type SquarePencil, transposedPencil } from "./square-pencil";
import { wideRoots } from "./wide-roots";
import { plainBlock, refineBlock, type ZeroBlock } from "./zero-block";
import { conjugate, mergeClusters, type ZeroCluster, zeroClusters } from "./zero-clusters";
import { startVectors } from "./zero-start";

/** A simple zero that was refined has its block and that of the transposed pencil, off which its directions can be read. */
export type RefinedZero = { readonly value: Complex; readonly right: ZeroBlock | null; readonly left: ZeroBlock | null };

/** A zero that is not this large beside the system, in wide numbers, is one at rest. */
const WIDE_REST = 1e-27;
/** From so near a refined zero a few rounds of inverse iteration give its left vector to rounding. */
const BESIDE = 1e-4;

/**
 * Zeros corrected against the given pencil in twice the working precision, cluster by cluster; clusters that do not contract
 * are joined and tried again. What does not contract then keeps its values.
 *
 * Shapes    zeros closed under conjugation → as many
 * Units     those of the pencil
 * Accuracy  simple zeros are rounded correctly but for data worse than 1e16 conditioned; multiplicity j to about ε^(2/j)
 * Source    Dongarra, Moler & Wilkinson, SIAM J. Numer. Anal. 20 (1983) 23-45, carried over to pencils
 */
export function refineZeros(pencil: SquarePencil, zeros: readonly Complex[]): RefinedZero[] {
  const rate = flatNorm(pencil.matrix.hi) || 1;
  const done: RefinedZero[] = [];
  const failed: ZeroCluster[] = [];
  for (const cluster of zeroClusters(zeros, rate)) {
    const refined = refineCluster(pencil, cluster, rate);
    if (refined) done.push(...refined);
    else failed.push(cluster);
  }
  for (let joins = 0; failed.length > 1 && joins < zeros.length; joins++) {
    const [cluster] = failed.splice(0, 1);
    const partner = nearest(cluster, failed);
    const joined = mergeClusters(cluster, failed[partner], zeros, rate);
    if (joined === null) {
      done.push(...unrefined(cluster));
      continue;
    }
    failed.splice(partner, 1);
    const refined = refineCluster(pencil, joined, rate);
    if (refined) done.push(...refined);
    else failed.push(joined);
  }
  done.push(...failed.flatMap(unrefined));
  return done.length === zeros.length ? done : zeros.map((value) => ({ value, right: null, left: null }));
}

function refineCluster(pencil: SquarePencil, cluster: ZeroCluster, rate: number): RefinedZero[] | null {
  const { members, real, mean, gap, reach } = cluster;
  const start = startVectors(pencil, cluster);
  const right = start === null ? null : refineBlock(pencil, start, start.length / pencil.size);
  if (right === null) return null;
  const values = wideRoots(right.s, right.k).map((value) => (modulus(value) <= WIDE_REST * rate ? { re: 0, im: 0 } : value));
  const away = ({ re, im }: Complex) => pythagoras(re - mean.re, real ? im : Math.abs(im) - mean.im);
  if (!values.every((zero) => away(zero) <= reach)) return null;
  if (members.length > 1) return values.map((value) => ({ value, right: null, left: null }));
  const dual = transposedPencil(pencil);
  const beside = { ...cluster, mean: values[0].im < 0 ? values[1] : values[0], gap: gap * BESIDE };
  const leftStart = startVectors(dual, beside);
  const left = leftStart === null ? null : plainBlock(dual, leftStart, right.k);
  return values.map((value) => ({ value, right, left }));
}

function unrefined({ members, real }: ZeroCluster): RefinedZero[] {
  const kept = real ? members : [...members, ...members.map(conjugate)];
  return kept.map((value) => ({ value, right: null, left: null }));
}

function nearest({ mean }: ZeroCluster, others: readonly ZeroCluster[]): number {
  const distances = others.map((other) => pythagoras(other.mean.re - mean.re, other.mean.im - mean.im));
  return distances.indexOf(Math.min(...distances));
}
