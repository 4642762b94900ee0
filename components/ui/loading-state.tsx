const WIDTHS = ["92%", "75%", "83%", "66%", "88%", "71%", "79%", "62%"];

/** Stands in for what is fetched, in about its size; `label` is read out. */
export function LoadingState({ label = "Loading…", lines = 4 }: Readonly<{ label?: string; lines?: number }>) {
  return (
    <div role="status" className="max-w-3xl space-y-3 py-2">
      <span className="sr-only">{label}</span>
      {WIDTHS.slice(0, lines).map((width) => (
        <div key={width} aria-hidden="true" className="skeleton h-4" style={{ width }} />
      ))}
    </div>
  );
}
