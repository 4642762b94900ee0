"use client";

import type { MatrixName } from "@/control/plant/content-shape";
import type { PlantEvaluation } from "@/control/plant/evaluate-plant";
import type { Header } from "../../matrix/header";
import { MatrixGrid } from "../../matrix/matrix-grid";
import { unitOfEntry } from "./matrix-headers";
import { cellProblems } from "./use-evaluation";

type MatrixFieldProps = Readonly<{
  name: MatrixName;
  caption: string;
  note?: string;
  rows: readonly Header[];
  columns: readonly Header[];
  entries: readonly (readonly string[])[];
  evaluation: PlantEvaluation | null;
  onChange: (entries: string[][]) => void;
  history: { readonly undo: () => void; readonly redo: () => void };
  readOnly: boolean;
}>;

/** One matrix of the plant: texts in, values and problems beside them. */
export function MatrixField({ name, evaluation, onChange, ...grid }: MatrixFieldProps) {
  return (
    <MatrixGrid
      {...grid}
      name={name}
      onChange={grid.readOnly ? undefined : onChange}
      values={evaluation?.values[name] ?? null}
      problems={cellProblems(evaluation, name)}
      entryUnit={unitOfEntry(grid.rows, grid.columns)}
    />
  );
}
