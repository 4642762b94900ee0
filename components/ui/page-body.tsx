import type { ReactNode } from "react";

/** The one `main` of a page, where the skip link leads. */
export function PageBody({ children }: Readonly<{ children: ReactNode }>) {
  return (
    <main id="content" tabIndex={-1} className="sheet-width pt-6 pb-16 outline-none">
      {children}
    </main>
  );
}
