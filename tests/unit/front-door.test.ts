import { expect, test } from "vitest";
import { computeDesign } from "@/control/design/compute-design";
import { MIRROR_RECIPE, mirrorHead } from "@/lib/services/front-door/mirror-head";
import { shownDesign } from "@/lib/services/front-door/shown-design";

test("the design on the front door is verified, coupled, and inside its torque limits", () => {
  const { gains, figures } = shownDesign();
  expect(gains.residual).toBeLessThanOrEqual(gains.bound);
  const { worstCrossPeak, peakEffort } = figures.summary.fullState;
  expect(worstCrossPeak?.peak).toBeGreaterThan(0.1);
  for (const { overLimit } of peakEffort) expect(overLimit).toBeLessThan(1);
});

test("the curves on the front door are the core's own, thinned for the eye", () => {
  const { curves } = shownDesign();
  const { responses } = computeDesign(mirrorHead(), MIRROR_RECIPE);
  if (responses.state === "refused") throw new Error("refused");
  const [record] = responses.value.records.filter(({ kind }) => kind === "step");
  const [tip] = curves[0].values;
  expect(tip).toHaveLength(curves[0].samples);
  expect(curves[0].step * (curves[0].samples - 1)).toBeCloseTo(record.step * (record.samples - 1), 9);
  for (const [k, value] of tip.entries()) expect(Math.abs(value - record.values[2 * k])).toBeLessThanOrEqual(1e-4);
});

test("the front door computes its example once", () => {
  expect(shownDesign()).toBe(shownDesign());
});
