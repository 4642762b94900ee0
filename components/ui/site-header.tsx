import Link from "next/link";
import type { ReactNode } from "react";
import { joinClasses } from "./join-classes";
import { Mark } from "./mark";

export type SiteSection = "plants" | "templates" | "team";

const SECTIONS: readonly { readonly key: SiteSection; readonly label: string; readonly href: string }[] = [
  { key: "plants", label: "Plants", href: "/plants" },
  { key: "templates", label: "Templates", href: "/templates" },
  { key: "team", label: "Team", href: "/team" },
];

type SiteHeaderProps = Readonly<{
  /** The section the page belongs to; null for pages outside (account, documents). */
  current?: SiteSection | null;
  /** Absent for visitors: only the mark and `account` are shown. */
  signedIn?: boolean;
  /** `AccountMenu`, or sign-in links. */
  account?: ReactNode;
}>;

export function SiteHeader({ current = null, signedIn = true, account }: SiteHeaderProps) {
  return (
    <header className="border-b border-rule bg-sheet print:hidden">
      <div className="sheet-width flex min-h-13 flex-wrap items-center gap-x-6 gap-y-1 py-2">
        <Link href={signedIn ? "/plants" : "/"} className="flex min-h-8 items-center gap-2.5 text-lg font-bold no-underline">
          <Mark />
          Gainwright
        </Link>
        {signedIn ? (
          <nav aria-label="Main" className="flex flex-wrap gap-x-1">
            {SECTIONS.map(({ key, label, href }) => (
              <Link
                key={key}
                href={href}
                aria-current={key === current ? "true" : undefined}
                className={joinClasses(
                  "inline-flex min-h-8 items-center px-2 no-underline hover:underline",
                  key === current ? "font-semibold" : "text-soft",
                )}
              >
                {label}
              </Link>
            ))}
          </nav>
        ) : null}
        {account ? <div className="ml-auto flex items-center gap-3 text-sm">{account}</div> : null}
      </div>
    </header>
  );
}
