"use client";

import type { TimeBase } from "@/control/plant/model";
import { NumberField } from "../../ui/number-field";
import { Select } from "../../ui/select";

type TimeBaseFieldProps = Readonly<{ value: TimeBase; readOnly: boolean; onChange: (value: TimeBase) => void }>;

const FIRST_PERIOD_S = 0.01;

export function TimeBaseField({ value, readOnly, onChange }: TimeBaseFieldProps) {
  return (
    <div className="flex flex-wrap items-start gap-4">
      <Select
        label="Time base"
        value={value.kind}
        disabled={readOnly}
        onChange={({ target }) =>
          onChange(target.value === "sampled" ? { kind: "sampled", period: FIRST_PERIOD_S } : { kind: "continuous" })
        }
        options={[
          { value: "continuous", label: "continuous: rates of change" },
          { value: "sampled", label: "sampled: values one period later" },
        ]}
      />
      {value.kind === "sampled" ? (
        <NumberField
          label="Sample time"
          unit="s"
          value={value.period}
          disabled={readOnly}
          problem={value.period > 0 ? undefined : "The sample time must be above zero"}
          onChange={(period) => onChange({ kind: "sampled", period: period ?? 0 })}
        />
      ) : null}
    </div>
  );
}
