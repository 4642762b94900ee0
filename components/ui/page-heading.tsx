import Link from "next/link";
import type { ReactNode } from "react";

export type Crumb = { readonly label: string; readonly href?: string };

type PageHeadingProps = Readonly<{
  title: ReactNode;
  /** Where the page stands, outermost first; may end in a plain fact such as "6 states, 3 inputs". */
  crumbs?: readonly Crumb[];
  /** `Chip`s: revision, draft, outdated. */
  state?: ReactNode;
  /** Buttons; the main act last, `tone="primary"`. */
  actions?: ReactNode;
}>;

export function PageHeading({ title, crumbs = [], state, actions }: PageHeadingProps) {
  return (
    <div className="mb-6 border-b-2 border-ink pb-3">
      {crumbs.length > 0 ? (
        <nav aria-label="You are here" className="mb-0.5 text-soft">
          <ol className="flex flex-wrap">
            {crumbs.map((crumb, index) => (
              <li key={`${crumb.label} ${crumb.href ?? ""}`}>
                {index > 0 ? <span aria-hidden="true">&nbsp;·&nbsp;</span> : null}
                {crumb.href ? (
                  <Link href={crumb.href} className="no-underline hover:underline">
                    {crumb.label}
                  </Link>
                ) : (
                  crumb.label
                )}
              </li>
            ))}
          </ol>
        </nav>
      ) : null}
      <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
        <h1 className="text-title font-bold break-words">{title}</h1>
        {state ? <div className="flex flex-wrap gap-2">{state}</div> : null}
        {actions ? <div className="no-print ml-auto flex flex-wrap items-center gap-3">{actions}</div> : null}
      </div>
    </div>
  );
}
