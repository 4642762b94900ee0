"use client";

import { useEffect, useRef } from "react";
import { Notice } from "./notice";

export type FormProblem = {
  /** The control's id; absent for a problem of the form as a whole. */
  readonly fieldId?: string;
  readonly message: string;
};

type FormProblemsProps = Readonly<{
  problems: readonly FormProblem[];
  /** Counts the tries to send; focus moves once per try, to the first field at fault. */
  attempt: number;
  title?: string;
}>;

type Labelled = HTMLInputElement | HTMLTextAreaElement | HTMLSelectElement;

/** The words at a field speak of "here"; away from it they need its name. */
function withLabel(fieldId: string, message: string): string {
  const field = document.querySelector<Labelled>(`:is(input, textarea, select)#${CSS.escape(fieldId)}`);
  const label = field?.labels?.[0]?.firstChild?.textContent;
  return label && !message.startsWith(label) ? `${label}: ${message}` : message;
}

/** Stands above a form that was refused. Values are the caller's and are kept. */
export function FormProblems({ problems, attempt, title = "This could not be saved yet." }: FormProblemsProps) {
  const summary = useRef<HTMLDivElement>(null);
  const latest = useRef(problems);
  latest.current = problems;
  useEffect(() => {
    if (attempt === 0 || latest.current.length === 0) return;
    const first = latest.current.find(({ fieldId }) => fieldId)?.fieldId;
    const field = first ? document.getElementById(first) : null;
    (field ?? summary.current)?.focus();
  }, [attempt]);
  if (problems.length === 0) return null;
  return (
    <div ref={summary} tabIndex={-1} className="mb-4 outline-none">
      <Notice kind="unmet" title={title} role="alert">
        <ul className="mt-1 list-disc pl-5">
          {problems.map(({ fieldId, message }) => (
            <li key={`${fieldId} ${message}`}>
              {fieldId ? (
                <a href={`#${fieldId}`} className="block w-fit py-0.5">
                  {withLabel(fieldId, message)}
                </a>
              ) : (
                message
              )}
            </li>
          ))}
        </ul>
      </Notice>
    </div>
  );
}
