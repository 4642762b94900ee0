import type { Metadata } from "next";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { PROBLEMS } from "@/lib/api/problem-catalogue";

export const metadata: Metadata = { title: "Problems" };

/** Where the `type` of every problem document leads. */
export default function ProblemsPage() {
  const entries = Object.entries(PROBLEMS).sort(([a, one], [b, other]) => one.status - other.status || a.localeCompare(b, "en"));
  return (
    <PageBody>
      <PageHeading title="Problems" crumbs={[{ label: "API", href: "/docs/api" }]} />
      <p className="mb-6 max-w-prose">
        A refused request is answered with a problem document (RFC 9457). Its <code>code</code> is one of these; its{" "}
        <code>detail</code> says what it means for this request, <code>errors</code> what to correct and where, and{" "}
        <code>requestId</code> finds it in the log. Only a method that an address does not know is answered without one: by 405
        and an empty body.
      </p>
      <dl className="max-w-prose">
        {entries.map(([code, { status, title, meaning, nextStep }]) => (
          <div key={code} id={code} className="-mx-3 mb-2 scroll-mt-4 border-t border-rule px-3 pt-3 pb-3 target:bg-caution">
            <dt className="flex flex-wrap items-baseline gap-x-3">
              <h2>{title}</h2>
              <span className="font-mono text-sm text-soft">
                {status} {code}
              </span>
            </dt>
            <dd>
              {meaning} <strong className="font-semibold">{nextStep}</strong>
            </dd>
          </div>
        ))}
      </dl>
    </PageBody>
  );
}
