"use client";

import { useCallback, useState } from "react";
import { RequestProblem } from "@/lib/client/request";
import type { FormProblem } from "./form-problems";

export type Submit = {
  readonly busy: boolean;
  /** Counts refusals, for `FormProblems`. */
  readonly attempt: number;
  readonly problems: readonly FormProblem[];
  readonly refusal: RequestProblem | null;
  /** What to say at a field, by its JSON pointer. */
  readonly at: (pointer: string) => string | undefined;
  /** Does `work`; a refusal is kept for the fields and answered with false. Any other failure is thrown on. */
  readonly run: (work: () => Promise<unknown>) => Promise<boolean>;
  readonly clear: () => void;
};

/**
 * One way for every form to send: busy while it runs, problems at their fields afterwards, values never touched.
 *
 * @param fields ids of the controls by JSON pointer, in the order of the form; an issue below a pointer belongs to it
 */
export function useSubmit(fields: Readonly<Record<string, string>>): Submit {
  const [busy, setBusy] = useState(false);
  const [attempt, setAttempt] = useState(0);
  const [refusal, setRefusal] = useState<RequestProblem | null>(null);

  const run = useCallback(async (work: () => Promise<unknown>) => {
    setBusy(true);
    setRefusal(null);
    try {
      await work();
      return true;
    } catch (error) {
      if (!(error instanceof RequestProblem)) throw error;
      setRefusal(error);
      setAttempt((count) => count + 1);
      return false;
    } finally {
      setBusy(false);
    }
  }, []);

  const clear = useCallback(() => setRefusal(null), []);
  const at = (pointer: string) => refusal?.at(pointer).join(" ") || undefined;
  return { busy, attempt, problems: refusal ? formProblems(refusal, fields) : [], refusal, at, run, clear };
}

function formProblems({ issues, message }: RequestProblem, fields: Readonly<Record<string, string>>): FormProblem[] {
  if (issues.length === 0) return [{ message }];
  const pointers = Object.keys(fields);
  const placed = issues.map(({ pointer, detail }) => {
    const place = pointers.findIndex((known) => pointer === known || pointer.startsWith(`${known}/`));
    return { place: place < 0 ? pointers.length : place, message: detail };
  });
  // From top to bottom as the reader meets them, so that the focus goes to the first.
  return placed
    .sort((a, b) => a.place - b.place)
    .map(({ place, message: detail }) => ({ fieldId: fields[pointers[place]], message: detail }));
}
