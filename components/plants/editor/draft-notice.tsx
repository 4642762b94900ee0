"use client";

import { Button } from "../../ui/button";
import { Notice } from "../../ui/notice";
import { whenText } from "../when-text";
import type { PlantDraft } from "./use-plant-draft";

/** Says that unsaved work came back, and lets it go. */
export function DraftNotice({ draft }: Readonly<{ draft: PlantDraft }>) {
  if (!draft.restoredAt) return null;
  return (
    <div className="mb-6">
      <Notice
        kind="caution"
        title="Your unsaved changes are back."
        role="status"
        action={
          <Button size="small" onClick={draft.discard}>
            Discard them
          </Button>
        }
      >
        They were kept in this browser on {whenText(draft.restoredAt)}.
      </Notice>
    </div>
  );
}
