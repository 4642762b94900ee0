"use client";

import { Mark } from "@/components/ui/mark";
import { PageFailure, type PageFailureProps } from "@/components/ui/page-failure";

/** Where no part nearer to the page caught it. It comes along with every page, so it is kept small. */
export default function PageError(props: PageFailureProps) {
  return (
    <>
      <header className="border-b border-rule bg-sheet">
        <div className="sheet-width flex min-h-13 items-center">
          <a href="/" className="flex min-h-8 items-center gap-2.5 text-lg font-bold no-underline">
            <Mark />
            Gainwright
          </a>
        </div>
      </header>
      <PageFailure {...props} />
    </>
  );
}
