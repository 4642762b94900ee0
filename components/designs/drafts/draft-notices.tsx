"use client";

import { Button } from "../../ui/button";
import { Notice } from "../../ui/notice";
import { whenText } from "../../ui/when-text";
import type { Drafting } from "./use-kept-draft";

/** What keeps a draft from the server, and what to do about it. */
export function DraftNotices({ drafting, dirty }: Readonly<{ drafting: Drafting; dirty: boolean }>) {
  return (
    <>
      {dirty ? <NoConnection drafting={drafting} /> : null}
      <OtherDraftNotice drafting={drafting} dirty={dirty} />
    </>
  );
}

function NoConnection({ drafting: { state, keptHere } }: Readonly<{ drafting: Drafting }>) {
  if (state !== "offline") return null;
  if (!keptHere) {
    return (
      <Notice kind="unmet" role="alert" title="No connection, and this browser stores nothing.">
        Leave this page open: the draft is saved as soon as the service answers again.
      </Notice>
    );
  }
  return (
    <Notice kind="caution" role="status" title="No connection: kept in this browser.">
      Go on working. The draft is saved by itself as soon as the service answers again.
    </Notice>
  );
}

function OtherDraftNotice({ drafting: { other, decide }, dirty }: Readonly<{ drafting: Drafting; dirty: boolean }>) {
  if (!other) return null;
  const { at, where } = other.draft;
  const action = (
    <>
      <Button size="small" onClick={() => decide(true, other)}>
        Show that one
      </Button>
      <Button size="small" onClick={() => decide(false, other)}>
        {dirty ? "Keep this one" : "Drop it"}
      </Button>
    </>
  );
  return (
    <Notice kind="caution" role="status" title="You have another draft of this design." action={action}>
      It was written {where === "server" ? "on another page or in another browser" : "in this browser"} on {whenText(at)}.
      {dirty ? " What stands here is not saved over it. Showing the other one can be undone." : ""}
    </Notice>
  );
}
