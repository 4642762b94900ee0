"use client";

import { X } from "lucide-react";
import type { PlantEvaluation } from "@/control/plant/evaluate-plant";
import type { PlantContent } from "@/lib/schemas/plant";
import { Button } from "../../ui/button";
import { Num } from "../../ui/num";
import { ScrollBox } from "../../ui/scroll-box";
import { SheetSection } from "../../ui/sheet-section";
import { TextField } from "../../ui/text-field";
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
    <SheetSection
      title="Parameters"
      note="entries may use them: numbers, + − * / ^, parentheses, pi, e, and functions such as sqrt, sin, exp"
      actions={
        readOnly ? null : (
          <Button size="small" onClick={add}>
            Add parameter
          </Button>
        )
      }
    >
      {places.length === 0 ? (
        <p className="text-soft">None: every entry is a number.</p>
      ) : (
        <ScrollBox label="Parameters">
          <table className="w-full border-collapse text-table">
            <caption className="sr-only">Parameters</caption>
            <thead>
              <tr className="border-b border-ink text-left">
                {[...FIELDS.map(({ header }) => header), "Worth"].map((header) => (
                  <th key={header} scope="col" className="px-2 py-1 font-normal text-soft">
                    {header}
                  </th>
                ))}
                <th scope="col" className="sr-only">
                  Removal
                </th>
              </tr>
            </thead>
            <tbody>
              {places.map(({ key, parameter, index }) => {
                const value = evaluation?.parameters.get(parameter.name);
                return (
                  <tr key={key} className="border-b border-rule align-top">
                    {FIELDS.map(({ field, header, width, limit }) => (
                      <td key={field} className={`${width} px-2 py-1.5`}>
                        <TextField
                          label={`${header} of parameter ${index + 1}`}
                          hideLabel
                          value={parameter[field]}
                          readOnly={readOnly}
                          maxLength={limit}
                          spellCheck={field === "note"}
                          problem={fieldProblem(evaluation, `/parameters/${index}/${field}`)}
                          onChange={({ target }) => change(index, { [field]: target.value })}
                        />
                      </td>
                    ))}
                    <td className="px-2 py-3 text-right whitespace-nowrap">
                      {value === undefined ? "–" : <Num value={value} unit={parameter.unit} />}
                    </td>
                    <td className="px-1 py-1.5">
                      {readOnly ? null : (
                        <Button
                          size="small"
                          tone="quiet"
                          aria-label={`Remove parameter ${parameter.name || index + 1}`}
                          onClick={() => remove(index)}
                        >
                          <X aria-hidden size={16} />
                        </Button>
                      )}
                    </td>
                  </tr>
                );
              })}
            </tbody>
          </table>
        </ScrollBox>
      )}
    </SheetSection>
  );
}
