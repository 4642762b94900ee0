import type { NumericalErrorCode } from "@/control/errors";
import type { DomainErrorCode } from "@/lib/errors";
import type { ProblemEntry } from "./problem-catalogue";

const refused = (title: string, meaning: string, nextStep: string): ProblemEntry => ({ status: 422, title, meaning, nextStep });

/**
 * What each refusal of the core means in general. Where the plant is known, the detail of a problem says it
 * in that plant's own signal names.
 */
export const NUMERICAL_PROBLEMS: Readonly<Record<Exclude<NumericalErrorCode, DomainErrorCode>, ProblemEntry>> = {
  "shape-mismatch": refused(
    "Matrices do not fit together",
    "The number of rows or columns of a matrix differs from what the signals or the other matrices ask for.",
    "Compare each matrix with the numbers of states, inputs and outputs, and correct the one named in the data.",
  ),
  "not-finite": refused(
    "A number is not finite",
    "An entry is infinite or not a number, or an intermediate result left the range of double precision.",
    "Correct the named entry, or choose units that bring very large and very small entries closer together.",
  ),
  "no-convergence": refused(
    "The method did not converge",
    "An iteration reached its limit of steps without an answer that can be trusted, so none is given.",
    "Check scaling and units first; then change the weights or poles a little.",
  ),
  singular: refused(
    "A matrix has no inverse",
    "A matrix that must be inverted is singular to working precision.",
    "Look for a row or column that is zero or a multiple of another one.",
  ),
  "not-symmetric": refused(
    "A weight or covariance is not symmetric",
    "The entry in the named row and column differs from its mirror image.",
    "Enter the same value on both sides of the diagonal.",
  ),
  "not-positive-definite": refused(
    "A matrix must be positive definite",
    "The input weight or the measurement noise leaves some direction without any weight.",
    "Give every input a weight, and every measurement a noise, above zero; lower the off-diagonal entries.",
  ),
  "not-positive-semidefinite": refused(
    "A matrix must be positive semidefinite",
    "The state weight, together with the cross weight, rewards some deviation instead of punishing it.",
    "Raise the diagonal entries, or lower the off-diagonal and cross weights.",
  ),
  "not-stabilizable": refused(
    "A mode that does not decay cannot be reached",
    "No input acts on a mode that does not decay by itself, so that no gain can make the loop stable.",
    "Add an input that acts on the named state, or correct the input matrix.",
  ),
  "not-detectable": refused(
    "A mode that does not decay cannot be seen",
    "No output shows a mode that does not decay by itself, so that no observer can follow it.",
    "Add an output that shows the named state, or correct the output matrix.",
  ),
  "not-controllable": refused(
    "A mode cannot be moved",
    "A pole was asked for where no input reaches the mode.",
    "Keep the named pole where it is, or add an input that acts on the named state.",
  ),
  "not-observable": refused(
    "A mode cannot be seen",
    "An observer pole was asked for where no output shows the mode.",
    "Keep the named pole where it is, or add an output that shows the named state.",
  ),
  "not-stable": refused(
    "Defined for a stable plant only",
    "A sum over all time was asked for, and the named mode does not decay.",
    "Close a stabilising loop first and ask this of the closed loop.",
  ),
  "unweighted-boundary-mode": refused(
    "A mode on the stability boundary carries no weight",
    "The cost does not see a mode on the stability boundary, so that the best gain would leave it there.",
    "Give the named state a weight above zero.",
  ),
  "on-stability-boundary": refused(
    "No gain with a stable loop was found",
    "Within working precision the best gain leaves the loop on the stability boundary.",
    "Weight the states that are still free, or ask for a degree of stability.",
  ),
  "not-stabilising": refused(
    "The computed gain failed its own check",
    "The gain was computed, but the loop that it closes is not stable, so it is withheld.",
    "Check scaling and units; then change the weights or poles a little.",
  ),
  inaccurate: refused(
    "The result is not accurate enough",
    "The result was computed, but its residual is above the bound that it is held against, so it is withheld.",
    "Check scaling and units; then change the weights or poles a little.",
  ),
  "pole-count": refused(
    "The number of poles does not fit",
    "As many poles are needed as there are states, or as the observer's order asks for.",
    "Add or remove poles until the count is the one given in the data; a pair counts twice.",
  ),
  "poles-not-conjugate": refused(
    "A complex pole stands alone",
    "A complex pole needs its conjugate beside it, or the gain would not be real.",
    "Enter the pole as a pair.",
  ),
  "pole-multiplicity": refused(
    "A pole is repeated too often",
    "A pole can be repeated at most as often as there are independent inputs.",
    "Move the repeated poles apart a little, or allow dependent eigenvectors in the recipe.",
  ),
  "too-sensitive": refused(
    "The wanted poles are too sensitive",
    "No gain of 16 digits holds these poles: rounding it moves them by more than the limit in the data.",
    "Ask for poles nearer to the plant's own, spread poles that lie close together, or use another input.",
  ),
  "unstable-pole": refused(
    "A wanted pole is not stable",
    "A pole was asked for at which the loop or the observer would not decay.",
    "Choose a pole with negative real part, or inside the unit circle for a sampled plant.",
  ),
  "period-missing": refused(
    "The sample period is missing",
    "A sampled plant needs its period in seconds.",
    "Enter the sample period, or declare the plant continuous.",
  ),
  "bad-option": refused(
    "A choice cannot be used here",
    "An option has a value that this method does not know or cannot use for this plant.",
    "Choose one of the values in the API description.",
  ),
  "bad-expression": refused(
    "An expression cannot be read",
    "An entry or parameter is not a number and not an expression in named parameters.",
    "Correct the expression at the named position.",
  ),
};
