"use client";

import { Chip } from "../../ui/chip";
import type { StateKind } from "../../ui/state-mark";
import type { AutosaveState } from "./autosave";
import type { Drafting } from "./use-kept-draft";

type Words = { readonly kind?: StateKind; readonly text: string };

const SAVING: Words = { text: "Draft: saving…" };
const NOT_SAVED: Words = { kind: "caution", text: "Draft not saved, kept in this browser" };
const NOWHERE: Words = { kind: "unmet", text: "Draft not saved: this browser keeps nothing either" };

/** Where the unsaved work is, in a few words. */
export function draftWords(state: AutosaveState, keptHere: boolean): Words {
  if (state === "saved") return { kind: "met", text: "Draft saved" };
  if (state === "nothing" || state === "waiting" || state === "saving") return SAVING;
  return keptHere ? NOT_SAVED : NOWHERE;
}

/** Announced politely, since it changes by itself while somebody works. */
export function DraftState({ drafting: { state, keptHere }, dirty }: Readonly<{ drafting: Drafting; dirty: boolean }>) {
  const { kind, text } = draftWords(state, keptHere);
  return <span role="status">{dirty ? <Chip kind={kind}>{text}</Chip> : null}</span>;
}
