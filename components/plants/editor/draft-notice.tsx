"use client";

import { UnsavedBack } from "../../ui/unsaved-back";
import type { PlantDraft } from "./use-plant-draft";

/** Says that unsaved work came back, and lets it go. */
export function DraftNotice({ draft: { restoredAt, dismissRestored, discard } }: Readonly<{ draft: PlantDraft }>) {
  return restoredAt ? <UnsavedBack at={restoredAt} onKeep={dismissRestored} onDiscard={discard} /> : null;
}
