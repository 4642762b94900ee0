import type { NumericalErrorCode } from "../../errors";
import type { PlantModel } from "../../plant/model";

export type RefusalWords = { readonly title: string; readonly sentence: string; readonly nextStep: string };
export type Facts = Readonly<Record<string, unknown>>;
export type Explain = (data: Facts, model: PlantModel) => RefusalWords;
/** Every code has its words: one that is missing does not compile. */
export type Explainers = Readonly<Record<NumericalErrorCode, Explain>>;
