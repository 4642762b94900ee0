import Link from "next/link";

const HELP: readonly { readonly label: string; readonly href: string }[] = [
  { label: "Cautions", href: "/docs/cautions" },
  { label: "API description", href: "/docs/api" },
  { label: "Problems and what to do", href: "/docs/problems" },
];

/** Help in one place on every page. Kept at the foot of the window where a page is short. */
export function SiteFooter() {
  return (
    <footer className="sticky top-[100vh] border-t border-rule text-sm text-soft print:hidden">
      <div className="sheet-width flex flex-wrap items-baseline gap-x-8 gap-y-1 py-3">
        <nav aria-label="Help" className="flex flex-wrap gap-x-5">
          {HELP.map(({ label, href }) => (
            <Link key={href} href={href} className="inline-flex min-h-6 items-center">
              {label}
            </Link>
          ))}
        </nav>
        <p className="ml-auto">Results hold for the linear model and its stated limits.</p>
      </div>
    </footer>
  );
}
