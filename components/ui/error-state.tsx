import type { ReactNode } from "react";
import { Notice } from "./notice";

type ErrorStateProps = Readonly<{
  /** What failed. */
  title: string;
  /** What to do; a button that tries again, or a way out. */
  action?: ReactNode;
  /** Shown so that it can be found in the log. */
  requestId?: string;
  children?: ReactNode;
}>;

export function ErrorState({ title, action, requestId, children }: ErrorStateProps) {
  return (
    <Notice kind="unmet" title={title} role="alert" action={action}>
      {children}
      {requestId ? (
        <p className="mt-1 text-sm">
          Request <code>{requestId}</code>
        </p>
      ) : null}
    </Notice>
  );
}
