"use client";

import { whenText } from "./when-text";

/** A moment in the reader's zone, digits aligned; in UTC, to the second, on hover. For data that is loaded in the browser. */
export function When({ at }: Readonly<{ at: string }>) {
  return (
    <time dateTime={at} title={at} className="font-mono text-sm whitespace-nowrap">
      {whenText(at)}
    </time>
  );
}
