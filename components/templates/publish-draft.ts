import { parsePlainNumber } from "@/control/expression/plain-number";
import { RequestProblem } from "@/lib/client/request";
import type { PlantContent } from "@/lib/schemas/plant";
import type { OpenParameter } from "@/lib/schemas/template";

/** A design revision whose recipe can go along. */
export type RecipeChoice = { readonly revisionId: string; readonly name: string };

/** One of the plant's parameters on the way into a template. */
export type PublishRow = {
  readonly name: string;
  readonly unit: string;
  readonly open: boolean;
  readonly lowest: number | null;
  readonly highest: number | null;
  readonly suggested: number | null;
  readonly help: string;
  /** Fields that hold something that is no number yet. */
  readonly unread: ReadonlySet<Figure>;
};
export type Figure = "lowest" | "highest" | "suggested";
export const FIGURES: readonly { readonly key: Figure; readonly label: string }[] = [
  { key: "lowest", label: "Lowest" },
  { key: "highest", label: "Highest" },
  { key: "suggested", label: "Suggested" },
];

export type PublishDraft = {
  readonly name: string;
  readonly description: string;
  readonly revisionId: string;
  readonly rows: readonly PublishRow[];
};

/** Parameters that are plain numbers can be opened; the range is left for the lead to decide. */
export function startDraft(plantName: string, content: PlantContent, revisionId: string): PublishDraft {
  const rows = content.parameters.flatMap(({ name, unit, expression, note }): PublishRow[] => {
    const suggested = parsePlainNumber(expression);
    if (suggested === null) return [];
    return [{ name, unit, open: false, lowest: null, highest: null, suggested, help: note, unread: new Set() }];
  });
  return { name: plantName, description: "", revisionId, rows };
}

/** Those that follow from others, and so are never filled in. */
export const derivedNames = ({ parameters }: PlantContent) =>
  parameters.filter(({ expression }) => parsePlainNumber(expression) === null).map(({ name }) => name);

export const figureId = (row: Pick<PublishRow, "name">, key: Figure | "open" | "help") => `open-${row.name}-${key}`;

/** Where a refusal belongs: the service counts the open parameters only. */
export function publishFields(rows: readonly PublishRow[]): Record<string, string> {
  const perRow = rows
    .filter(({ open }) => open)
    .flatMap((row, index) => {
      const at = `/content/openParameters/${index}`;
      const figures = FIGURES.map(({ key }) => [`${at}/${key}`, figureId(row, key)]);
      return [...figures, [`${at}/help`, figureId(row, "help")], [at, figureId(row, "open")]];
    });
  const first = rows[0];
  return {
    "/name": "template-name",
    "/description": "template-description",
    ...Object.fromEntries(perRow),
    ...(first && { "/content/openParameters": figureId(first, "open") }),
    "/content/recipe": "template-recipe",
  };
}

/** @throws RequestProblem for what cannot be sent yet, at its fields, as the service would */
export function openParameters(rows: readonly PublishRow[]): OpenParameter[] {
  const open = rows.filter((row) => row.open);
  const errors = open.flatMap((row, index) =>
    FIGURES.flatMap(({ key, label }) => {
      if (row[key] !== null && !row.unread.has(key)) return [];
      const wrong = row.unread.has(key) ? "is not a number yet" : "is missing";
      return [{ pointer: `/content/openParameters/${index}/${key}`, detail: `${label} ${row.name} ${wrong}` }];
    }),
  );
  if (open.length === 0) errors.push({ pointer: "/content/openParameters", detail: "Open at least one parameter" });
  if (errors.length > 0) {
    const detail = "Correct the places listed.";
    throw new RequestProblem({ code: "invalid", status: 422, title: "The template is not complete", detail, errors });
  }
  return open.map(({ name, unit, lowest, highest, suggested, help }) => ({
    ...{ name, unit, help },
    ...{ lowest: lowest ?? Number.NaN, highest: highest ?? Number.NaN, suggested: suggested ?? Number.NaN },
  }));
}
