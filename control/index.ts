/**
 * The computing core: plants, designs and what can be said about them. Pure functions of plain data or of ml-matrix matrices;
 * every docstring states shapes, units, refusals, accuracy and source. Formulas (`control/plant/evaluate-plant.ts`,
 * `control/expression/`) are left out on purpose: whoever imports them also loads the parser.
 */

export { switchAccelerator } from "./accelerator/accelerator";
export { computeDesign, METHOD_VERSION } from "./design/compute-design";
export { defaultRecipe } from "./design/default-recipe";
export type * from "./design/evidence";
// A recipe, and the evidence it gives
export type * from "./design/recipe";
export { type RecipeProblem, recipeProblems } from "./design/recipe-problems";
export { type ContinuousCost, discretiseCost, type SampledCost } from "./discrete/discretise-cost";
export { NumericalError, type NumericalErrorCode } from "./errors";
export { eigenvalues } from "./linalg/eigenvalues";
export { type LyapunovProblem, type LyapunovSolution, solveLyapunov } from "./linalg/solve-lyapunov";
export { weightsFromDeviations } from "./lqr/accepted-deviations";
// The solvers behind it
export { designLqr, type LqrProblem } from "./lqr/design-lqr";
export { type ReferenceGain, type ReferenceProblem, referenceGain } from "./lqr/reference-gain";
// What a loop bears, and its frequency response
export type { DiskMargin } from "./margins/disk-margin";
export { frequencyGrid } from "./margins/frequency-grid";
export { type FrequencyResponse, frequencyResponse, responseSingularValues } from "./margins/frequency-response";
export type { ClassicalMargins, Crossover, Margin, NoMargin } from "./margins/loop-margins";
export { type ChannelRobustness, type LoopRobustness, loopRobustness } from "./margins/loop-robustness";
export { type LoopCut, openLoop } from "./margins/open-loop";
export { type PeakValue, peakGain } from "./margins/peak-gain";
export { type ObserverProblem, observerByPoles, type PlacedObserver } from "./observer/observer-by-poles";
export { type NoiseObserver, type NoiseProblem, observerFromNoise } from "./observer/observer-from-noise";
export { type ReducedObserver, type ReducedProblem, reducedObserver } from "./observer/reduced-observer";
export { checkPlant } from "./plant/check-plant";
// A plant as evaluated, and its checks
export type { CommandedSignal, Complex, InputSignal, PlantModel, Rows, ScaledSignal, Signal, TimeBase } from "./plant/model";
export { SIZE_LIMITS } from "./plant/model";
export type * from "./plant/report";
export { type Placement, type PlacementProblem, placePoles } from "./poles/place-poles";
export { resolvePoles } from "./poles/resolve-poles";
export { type ClosedLoop, closeLoop, type LoopPlant, type ObserverInLoop } from "./response/close-loop";
export {
  type EnsembleLaw,
  type EnsemblePlant,
  type EnsembleRequest,
  type EnsembleResponses,
  respondEnsemble,
} from "./response/ensemble";
export { holdEquivalent } from "./response/hold-equivalent";
export { matrixExponential } from "./response/matrix-exponential";
export { type ResponseRequest, respond } from "./response/respond";
export { respondToStep, type StepProblem } from "./response/respond-to-step";
export { type RiccatiProblem, type RiccatiSolution, solveRiccati } from "./riccati/solve-riccati";
export { controllabilityReport, observabilityReport } from "./structure/controllability-report";
export {
  type DistanceBracket,
  distanceToUncontrollability,
  distanceToUnobservability,
} from "./structure/distance-to-uncontrollability";
export { type GramianProblem, type Gramians, gramians } from "./structure/gramians";
export { type HankelValues, hankelValues } from "./structure/hankel-values";
export { modes } from "./structure/modes";
export { relativeGainArray } from "./structure/relative-gain-array";
export { type RelativeGainAtRest, relativeGainAtRest } from "./structure/relative-gain-at-rest";
export { transmissionZeros } from "./structure/transmission-zeros";
export type { TransmissionZero } from "./structure/zero-directions";

// The same in words
export { CAUTIONS } from "./words/cautions";
export { describeChecks, type Finding } from "./words/describe-checks";
export { describeMode } from "./words/describe-mode";
export { explainRefusal } from "./words/explain-refusal";
