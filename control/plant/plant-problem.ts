/** `pointer` is a JSON pointer into the `PlantContent`. An error stops saving; a caution is shown beside the field and does not. */
export type PlantProblem = { readonly pointer: string; readonly severity: "error" | "caution"; readonly message: string };

export const error = (pointer: string, message: string): PlantProblem => ({ pointer, severity: "error", message });
export const caution = (pointer: string, message: string): PlantProblem => ({ pointer, severity: "caution", message });
