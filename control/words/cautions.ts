/** Stand wherever gains leave the product: gain sheet, downloads, API. */
export const CAUTIONS: readonly string[] = [
  "These results hold for the linear model about its operating point and within its stated limits. The machine itself was not tested.",
  "Close the loop on hardware for the first time only with travel stops, torque or current limits, and an emergency stop that does not depend on this controller.",
  "This control law is not a safety function. The machine's safety functions follow the applicable standards (ISO 13849-1, IEC 61508, IEC 61800-5-2 or the local code) and the judgement of the licensed engineer responsible.",
];
