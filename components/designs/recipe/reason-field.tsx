"use client";

import { useState } from "react";
import { Button } from "../../ui/button";
import { TextArea } from "../../ui/text-area";
import { useRecipe } from "./recipe-context";

type ReasonFieldProps = Readonly<{
  /** What it stands beside: `weights`, `state:2`. */
  of: string;
  /** The same in words, for the label: "the state weights". */
  about: string;
  /** Asked for already, so that it need not be opened first. */
  startOpen?: boolean;
}>;

const LONGEST = 1000;

/** A place for the written reason of a choice. Closed until it is wanted, open where something is written. */
export function ReasonField({ of, about, startOpen = false }: ReasonFieldProps) {
  const { form, change } = useRecipe();
  const text = form.reasons[of] ?? "";
  const [opened, setOpened] = useState(startOpen || text !== "");
  if (!opened && text === "") {
    return (
      <div>
        <Button size="small" tone="quiet" className="-ml-2 font-normal text-soft" onClick={() => setOpened(true)}>
          + Reason for {about}
        </Button>
      </div>
    );
  }
  return (
    <TextArea
      label={`Reason for ${about}`}
      rows={2}
      maxLength={LONGEST}
      value={text}
      onChange={({ target }) => change(`/reasons/${of}`, (now) => ({ ...now, reasons: { ...now.reasons, [of]: target.value } }))}
    />
  );
}
