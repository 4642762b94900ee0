import { formatNumber } from "@/control/words/format-number";
import { methodText } from "../designs/evidence/evidence-words";
import { computed } from "../designs/evidence/figures-reply";
import { type RecipeLine, recipeLines } from "../designs/recipe/recipe-lines";
import { timeBaseText } from "../plants/time-base-text";
import type { CompareCell, Compared, CompareRow, CompareSection } from "./compare-types";
import { figureRows } from "./figure-rows";
import { poleRows } from "./pole-rows";
import { tradeSentence } from "./trade-sentences";

const plain = (text: string, exact = text): CompareCell => ({ text, exact });

function plantSection(designs: readonly Compared[]): CompareSection {
  const row = (key: string, label: string, cell: (design: Compared) => CompareCell): CompareRow => ({
    key,
    label,
    cells: designs.map(cell),
  });
  return {
    key: "plant",
    title: "Plant",
    rows: [
      row("plant-revision", "plant revision", ({ plantRevision, outdated }) => ({
        ...plain(String(plantRevision.number)),
        ...(outdated ? { note: "outdated: the plant has a newer one" } : {}),
      })),
      row("time-base", "time base", ({ model }) => plain(timeBaseText(model.timeBase))),
    ],
  };
}

/** Deviations can only be held against matrices as the weights they stand for. */
const needsMatrices = (designs: readonly Compared[]) =>
  designs.some(({ recipe }) => recipe.method === "weights" && recipe.weights.form === "matrices");

/** The recipes' own facts, matched by what they are about: signals by name. */
function recipeSections(designs: readonly Compared[]): CompareSection[] {
  const asMatrices = needsMatrices(designs);
  const lines = designs.map(
    ({ recipe, model }) => new Map(recipeLines(recipe, model, asMatrices).map((line) => [line.key, line])),
  );
  const order = new Map<string, RecipeLine>();
  for (const own of lines) for (const [key, line] of own) if (!order.has(key)) order.set(key, line);
  const titles = [...new Set([...order.values()].map(({ section }) => section))];
  const sections = titles.map(
    (title): CompareSection => ({
      key: title,
      title,
      rows: [...order.values()]
        .filter(({ section }) => section === title)
        .map(({ key, label, axis, prose }) => ({
          key,
          label,
          ...(axis === undefined ? {} : { axis }),
          ...(prose ? { prose } : {}),
          cells: lines.map((own) => {
            const line = own.get(key);
            return line ? plain(line.text, line.exact) : null;
          }),
        })),
    }),
  );
  // How the responses are tried matters only where it differs.
  return sections.map((section) =>
    section.key === "Test"
      ? { ...section, rows: section.rows.filter(({ cells }) => cells.some((cell) => cell?.exact !== cells[0]?.exact)) }
      : section,
  );
}

function poleSections(designs: readonly Compared[]): CompareSection[] {
  const sides = (part: "poles" | "observer") =>
    designs.map(({ evidence, model }) => {
      const poles = part === "poles" ? computed(evidence.poles) : computed(evidence.observer)?.poles;
      return poles ? { poles, model } : null;
    });
  const unit = designs[0]?.model.timeBase.kind === "continuous" ? ", 1/s" : "";
  return [
    { key: "poles", title: `Closed-loop poles${unit}`, rows: poleRows("pole", sides("poles")) },
    { key: "observer-poles", title: `Observer poles${unit}`, rows: poleRows("observer", sides("observer")) },
  ];
}

function trustSection(designs: readonly Compared[]): CompareSection {
  const row = (key: string, label: string, cell: (design: Compared) => CompareCell | null): CompareRow => ({
    key,
    label,
    cells: designs.map(cell),
  });
  const gains = ({ evidence }: Compared) => computed(evidence.gains);
  return {
    key: "trust",
    title: "How it was solved",
    rows: [
      row("solved-by", "method", (design) => {
        const found = gains(design);
        return found && plain(methodText(found.method));
      }),
      row("residual", "residual, and its bound", (design) => {
        const found = gains(design);
        return found && plain(`${formatNumber(found.residual, 2)} ≤ ${formatNumber(found.bound, 2)}`);
      }),
      row("error", "relative error of K, at most", (design) => {
        const error = gains(design)?.errorBound ?? null;
        return error === null ? null : plain(formatNumber(error, 2));
      }),
    ],
  };
}

function figureSection(designs: readonly Compared[]): CompareSection {
  const trade: CompareRow = {
    key: "trade",
    label: "against the first",
    prose: true,
    cells: designs.map((design, place) => plain(place === 0 ? "reference" : tradeSentence(designs[0], design))),
  };
  return { key: "figures", title: "Figures, worst over everything commanded", rows: [...figureRows(designs), trade] };
}

/** Everything two to six designs are held against each other by, in the order it is read. Gains and curves stand below. */
export function compareSections(designs: readonly Compared[]): CompareSection[] {
  return [
    plantSection(designs),
    ...recipeSections(designs),
    ...poleSections(designs),
    figureSection(designs),
    trustSection(designs),
  ].filter(({ rows }) => rows.length > 0);
}
