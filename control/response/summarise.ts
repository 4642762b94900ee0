import type { StepFigures, Summary } from "../design/evidence";
import { requireRepresentable } from "../linalg/require-representable";

/**
 * Worst of the steps of one loop: the commanded quantity for settling, rise and overshoot, all others for the cross-axis peak.
 * Throws too-large where that peak is beyond the largest double times its amplitude.
 */
export function summarise(steps: readonly Omit<StepFigures, "loop">[], amplitudes: readonly number[], inputs: number): Summary {
  const own = steps.map(({ commanded, source }) => commanded[source]);
  return {
    worstSettling: worst(own.map(({ settling }) => settling)),
    worstRise: worst(own.map(({ rise }) => rise)),
    worstOvershoot: worst(own.map(({ overshoot }) => overshoot)),
    worstCrossPeak: worstCross(steps, amplitudes),
    peakEffort: Array.from({ length: inputs }, (_, i) => ({
      peak: worst(steps.map(({ effort }) => effort[i].peak)) ?? 0,
      overLimit: worst(steps.map(({ effort }) => effort[i].overLimit)),
    })),
  };
}

function worst(values: readonly (number | null)[]): number | null {
  return values.reduce((most, value) => (value !== null && (most === null || value > most) ? value : most), null);
}

/** Peaks of different quantities are compared in parts of their own test amplitudes. */
function worstCross(steps: readonly Omit<StepFigures, "loop">[], amplitudes: readonly number[]): Summary["worstCrossPeak"] {
  let found: Summary["worstCrossPeak"] = null;
  for (const { source, commanded } of steps) {
    commanded.forEach(({ peak }, signal) => {
      if (signal === source) return;
      const share = peak / (Math.abs(amplitudes[signal]) || 1);
      requireRepresentable("response", [share]);
      if (found === null || share > found.peak) found = { source, signal, peak: share };
    });
  }
  return found;
}
