import { timesPowerOfTwo } from "../linalg/power-of-two";
import type { System } from "../plant/scale-plant";
import { channelOf, closedSensitivity, complementary, shifted } from "./closed-sensitivity";
import { type DiskMargin, diskMargin } from "./disk-margin";
import { jointPeak } from "./joint-peak";
import { type ClassicalMargins, classicalMargins } from "./loop-margins";
import { inOwnUnits, largestOnBoundary, type PeakValue, requireDecay } from "./peak-gain";
import { prepareFrequency } from "./prepare-frequency";
import { frequencyOf } from "./response-at";

/** One loop varied alone, all others closed; `channel` is its place among the cut signals. */
export type ChannelRobustness = ClassicalMargins & { readonly channel: number; readonly disk: DiskMargin | null };

export type LoopRobustness = {
  readonly channels: readonly ChannelRobustness[];
  /** All cut signals varied together and independently; null only for a loop without any, or with S = 1/2 throughout. */
  readonly together: DiskMargin | null;
  /** Peaks of the largest singular values of S = (I + L)⁻¹ and T = I - S. */
  readonly sensitivity: PeakValue;
  readonly complementarySensitivity: PeakValue;
};

/**
 * How much a closed loop bears: classical and disk margins of each loop and of all together, sensitivity peaks.
 *
 * Shapes    L square, as `openLoop` cuts it or any other: negative feedback of one is understood
 * Units     factors, rad, rad/s, seconds; period in seconds, null when continuous. Singular values in the signals' own units
 * Throws    not-stabilising { pole } when the closed loop does not decay; singular when it has no solution; shape-mismatch;
 *           not-finite; bad-option; too-large; no-convergence
 * Accuracy  peaks and each loop's disk as `peakGain`. Together: 2^-24, more where the bracket says so; `lower` is sure for any number of
 *           loops, `upper` is a variation that was found. Up to three loops they meet, beyond they usually do
 * Source    Seiler, Packard & Gahinet, IEEE Control Systems Magazine 40 (2020) 78-95
 */
export function loopRobustness(L: System, period: number | null = null): LoopRobustness {
  const S = closedSensitivity(L);
  requireDecay(S.A, period);
  const channels = Array.from({ length: S.D.rows }, (_, channel): ChannelRobustness => {
    const own = channelOf(S, channel);
    return {
      channel,
      ...classicalMargins(prepareFrequency(own, period)),
      disk: diskMargin(peakOf(shifted(own, 0.5), period)),
    };
  });
  return {
    channels,
    together: jointDisk(S, period, channels),
    sensitivity: peakOf(S, period),
    complementarySensitivity: peakOf(complementary(S), period),
  };
}

function peakOf(system: System, period: number | null): PeakValue {
  const prepared = prepareFrequency(system, period);
  return inOwnUnits(prepared, largestOnBoundary(prepared));
}

function jointDisk(S: System, period: number | null, channels: readonly ChannelRobustness[]): DiskMargin | null {
  if (channels.length === 0) return null;
  if (channels.length === 1) return channels[0].disk;
  const system = prepareFrequency(shifted(S, 0.5), period);
  const { at, value, lower, upper } = jointPeak(system);
  const own = (gain: number) => timesPowerOfTwo(gain, system.size);
  const alone = channels.flatMap(({ disk }) => (disk === null ? [] : [disk.upper]));
  // No loop has a limit of its own, and no ring of loops was found that has one.
  if (lower === 0 && alone.length === 0) return null;
  const joint = diskMargin({ value: own(value), lower: own(lower), upper: own(upper), frequency: frequencyOf(at, period) });
  if (joint === null) return null;
  return { ...joint, upper: Math.max(joint.size, Math.min(joint.upper, ...alone)) };
}
