"use client";

import type { PlantEvaluation } from "@/control/plant/evaluate-plant";
import { type Tab, UrlTabs } from "../../ui/url-tabs";
import { ModelTab } from "./model-tab";
import { ParametersTab } from "./parameters-tab";
import { SignalsTab } from "./signals-tab";
import type { PlantDraft } from "./use-plant-draft";

type EditorTabsProps = Readonly<{
  draft: PlantDraft;
  evaluation: PlantEvaluation | null;
  readOnly: boolean;
  more?: readonly Tab[];
}>;

export function EditorTabs({ draft, evaluation, readOnly, more = [] }: EditorTabsProps) {
  const { states, inputs, outputs, disturbances, commanded, parameters } = draft.content;
  const signals = [states, inputs, outputs, disturbances, commanded ?? []].reduce((sum, list) => sum + list.length, 0);
  const shared = { draft, evaluation, readOnly };
  const tabs: readonly Tab[] = [
    { key: "model", label: "Model", panel: <ModelTab {...shared} /> },
    { key: "signals", label: "Signals and axes", count: signals, panel: <SignalsTab {...shared} /> },
    { key: "parameters", label: "Parameters", count: parameters.length, panel: <ParametersTab {...shared} /> },
    ...more,
  ];
  return <UrlTabs label="Parts of the plant" tabs={tabs} />;
}
