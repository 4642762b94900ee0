"use client";

import { formatNumber } from "@/control/words/format-number";
import { Checkbox } from "../ui/checkbox";
import { NumberField } from "../ui/number-field";
import { TextField } from "../ui/text-field";
import { FIGURES, type Figure, figureId, type PublishRow } from "./publish-draft";

type PublishRowFieldsProps = Readonly<{
  row: PublishRow;
  onChange: (change: Partial<PublishRow>) => void;
  /** What the service said at a part of this parameter. */
  at: (part: Figure | "help" | "open") => string | undefined;
}>;

/** Opens one parameter, and says between which values and with which words. */
export function PublishRowFields({ row, onChange, at }: PublishRowFieldsProps) {
  const { name, unit, open, suggested, help, unread } = row;
  const mark = (key: Figure, usable: boolean) => {
    const next = new Set(unread);
    if (usable) next.delete(key);
    else next.add(key);
    onChange({ unread: next });
  };
  return (
    <div className="border-t border-rule py-2">
      <Checkbox
        id={figureId(row, "open")}
        checked={open}
        onChange={({ target }) => onChange({ open: target.checked })}
        problem={at("open")}
        label={
          <span>
            <code className="font-semibold">{name}</code>
            {open || suggested === null ? null : (
              <span className="ml-3 font-mono text-sm text-soft">
                stays {formatNumber(suggested)} {unit}
              </span>
            )}
          </span>
        }
      />
      {open ? (
        <div className="mt-1 mb-2 grid gap-3 pl-6 sm:grid-cols-3">
          {FIGURES.map(({ key, label }) => (
            <NumberField
              key={key}
              id={figureId(row, key)}
              label={`${label} ${name}`}
              unit={unit}
              value={row[key]}
              onChange={(value) => onChange({ [key]: value })}
              onUsable={(usable) => mark(key, usable)}
              problem={at(key)}
            />
          ))}
          <TextField
            id={figureId(row, "help")}
            label={`How to find ${name}`}
            value={help}
            onChange={({ target }) => onChange({ help: target.value })}
            maxLength={400}
            problem={at("help")}
            className="sm:col-span-3"
          />
        </div>
      ) : null}
    </div>
  );
}
