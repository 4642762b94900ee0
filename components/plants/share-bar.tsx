/** How strongly, as a length beside the words: 0 to 1. */
export function ShareBar({ share, text }: Readonly<{ share: number; text: string }>) {
  const width = `${Math.round(Math.min(1, Math.max(0, share)) * 70)}px`;
  return (
    <span className="flex items-center gap-2 whitespace-nowrap">
      <span aria-hidden="true" className="inline-block h-2 shrink-0 bg-ink [print-color-adjust:exact]" style={{ width }} />
      <span>{text}</span>
      <span className="sr-only">{`share ${share.toFixed(2)} of 1`}</span>
    </span>
  );
}
