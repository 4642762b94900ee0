"use client";

import type { PlantEvaluation } from "@/control/plant/evaluate-plant";
import type { PlantContent } from "@/lib/schemas/plant";
import { Num } from "../../ui/num";
import { EditorField } from "./editor-field";
import { EditorSection } from "./editor-section";
import { EditorTable } from "./editor-table";
import { RowButton } from "./row-button";
import { fieldProblem } from "./use-evaluation";
import type { PlantDraft } from "./use-plant-draft";

type ParametersTabProps = Readonly<{ draft: PlantDraft; evaluation: PlantEvaluation | null; readOnly: boolean }>;
type Parameter = PlantContent["parameters"][number];

const FIELDS = [
  { field: "name", header: "Name", width: "min-w-28", limit: 40 },
  { field: "expression", header: "Value or expression", width: "min-w-56", limit: 200 },
  { field: "unit", header: "Unit", width: "min-w-24", limit: 24 },
  { field: "note", header: "Note", width: "min-w-56", limit: 200 },
] as const;

/** Numbers with a name, for the entries of the matrices and for one another. */
export function ParametersTab({ draft, evaluation, readOnly }: ParametersTabProps) {
  const { content, set } = draft;
  const change = (index: number, part: Partial<Parameter>) =>
    set((now) => ({ ...now, parameters: now.parameters.map((old, place) => (place === index ? { ...old, ...part } : old)) }));
  const add = () => set((now) => ({ ...now, parameters: [...now.parameters, { name: "", expression: "", unit: "", note: "" }] }));
  const remove = (index: number) => set((now) => ({ ...now, parameters: now.parameters.filter((_, place) => place !== index) }));
  const places = content.parameters.map((parameter, index) => ({ key: `parameter ${index + 1}`, parameter, index }));
  return (
    <EditorSection
      title="Parameters"
      note="entries may use them: numbers, + − * / ^, parentheses, pi, e, and functions such as sqrt, sin, exp"
      one="parameter"
      onAdd={readOnly ? undefined : add}
      none="None: every entry is a number."
      count={places.length}
    >
      <EditorTable caption="Parameters" headers={[...FIELDS.map(({ header }) => header), "Worth"]} buttons="Removal">
        {places.map(({ key, parameter, index }) => {
          const value = evaluation?.parameters.get(parameter.name);
          return (
            <tr key={key} className="border-b border-rule align-top">
              {FIELDS.map(({ field, header, width, limit }) => (
                <td key={field} className={`${width} px-2 py-1.5`}>
                  <EditorField
                    label={`${header} of parameter ${index + 1}`}
                    value={parameter[field]}
                    readOnly={readOnly}
                    maxLength={limit}
                    spellCheck={field === "note"}
                    problem={fieldProblem(evaluation, `/parameters/${index}/${field}`)}
                    onChange={(text) => change(index, { [field]: text })}
                  />
                </td>
              ))}
              <td className="px-2 py-3 text-right whitespace-nowrap">
                {value === undefined ? "–" : <Num value={value} unit={parameter.unit} />}
              </td>
              <td className="px-1 py-1.5">
                {readOnly ? null : (
                  <RowButton act="remove" name={`parameter ${parameter.name || index + 1}`} onClick={() => remove(index)} />
                )}
              </td>
            </tr>
          );
        })}
      </EditorTable>
    </EditorSection>
  );
}
