/** Stored in UTC; shown in the reader's zone. The server's zone never shows: callers render it in client components only. */
export function whenText(iso: string): string {
  return new Intl.DateTimeFormat(undefined, { dateStyle: "medium", timeStyle: "short" }).format(new Date(iso));
}
