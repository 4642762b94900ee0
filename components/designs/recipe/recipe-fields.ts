import type { PlantModel } from "@/control/plant/model";
import { POLE_FIGURES, type PoleDraft } from "./pole-drafts";
import type { RecipeForm } from "./recipe-form";

/** Where the recipe stands in the bodies that are sent. */
export const IN_BODY = "/recipe";

/** Id of the control that stands for a place of the recipe. */
export const fieldId = (pointer: string) => `recipe${pointer.replaceAll("/", "-")}`;

const ofPoles = (pointer: string, drafts: readonly PoleDraft[]) => [
  ...drafts.flatMap(({ kind }, k) => POLE_FIGURES[kind].map(({ field }) => `${pointer}/${k}/${field}`)),
  pointer,
];

/** Controls by their place in the body, the narrower place first, as `useSubmit` wants them. */
export function recipeFields(form: RecipeForm, { states, inputs }: PlantModel): Record<string, string> {
  const each = (pointer: string, list: readonly unknown[]) => list.map((_, index) => `${pointer}/${index}`);
  const pointers = [
    ...each("/weights/states", states),
    ...each("/weights/inputs", inputs),
    "/weights/state",
    "/weights/input",
    "/crossWeight",
    "/degreeOfStability",
    ...ofPoles("/poles", form.poles),
    ...ofPoles("/observer/poles", form.observer.kind === "reduced" ? form.observer.reduced : form.observer.poles),
    "/observer/process",
    "/observer/measurement",
    "/observer",
    "/test/horizon",
    ...each("/test/initialState", states),
    ...each("/test/inputDisturbance", inputs),
  ];
  return Object.fromEntries(pointers.map((pointer) => [IN_BODY + pointer, fieldId(pointer)]));
}
