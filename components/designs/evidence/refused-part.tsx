import { Notice } from "../../ui/notice";
import type { RefusalReply } from "./figures-reply";

/** A part of the evidence that could not be computed: which assumption failed, and one change to try. */
export function RefusedPart({ refusal }: Readonly<{ refusal: RefusalReply }>) {
  return (
    <Notice kind="unmet" title={`${refusal.title}.`}>
      <span className="text-table">
        {refusal.sentence} {refusal.nextStep}
      </span>
    </Notice>
  );
}
