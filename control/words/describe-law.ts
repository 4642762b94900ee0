import type { TimeBase } from "../plant/model";

/** The sign equation of a gain. ASCII throughout: it goes into files as well as onto screens. */
export function describeLaw(withReference: boolean, withObserver: boolean): string {
  const state = withObserver ? "xhat" : "x";
  const law = withReference ? `u = -K ${state} + F r` : `u = -K ${state}`;
  return `${law}, in deviations from the operating point: u = input - u0, ${withObserver ? "xhat estimates state - x0" : "x = state - x0"}`;
}

export function describeTimeBase(timeBase: TimeBase): string {
  if (timeBase.kind === "continuous") {
    return "Continuous law: the gain holds for a controller that acts without sampling. A sampled controller needs a gain computed for its own period.";
  }
  return `Sampled law: the gain holds for a controller that acts every ${timeBase.period} s, and for no other period.`;
}

export function describeObserverLaw(kind: "full" | "reduced", timeBase: TimeBase): string {
  const sampled = timeBase.kind === "sampled";
  if (kind === "reduced") {
    return `${sampled ? "w(k+1)" : "w'"} = Fw w + Fy y + Fu u, xhat = Gw w + Gy (y - D u)`;
  }
  return sampled
    ? "xhat(k+1) = A xhat(k) + B u(k) + L (y(k) - C xhat(k) - D u(k))"
    : "xhat' = A xhat + B u + L (y - C xhat - D u)";
}
