import { LoadingState } from "./loading-state";
import { PageBody } from "./page-body";

/** Stands in for a page while it is made, with a heading's rule in place so that little moves. */
export function LoadingPage({ label, lines = 6 }: Readonly<{ label: string; lines?: number }>) {
  return (
    <PageBody>
      <div aria-hidden="true" className="mb-6 border-b-2 border-ink pb-3">
        <div className="skeleton h-[1.875rem] w-56" />
      </div>
      <LoadingState label={label} lines={lines} />
    </PageBody>
  );
}
