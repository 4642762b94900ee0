/** First stop of every page; `PageBody` carries the id it leads to. */
export function SkipLink() {
  return (
    <a
      href="#content"
      className="no-print fixed top-2 left-2 z-50 -translate-y-20 rounded-md bg-action px-4 py-2 text-on-action focus-visible:translate-y-0"
    >
      Skip to the content
    </a>
  );
}
