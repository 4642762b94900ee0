"use client";

import { useState } from "react";
import { endSessions } from "@/lib/client/account";
import { usePerson } from "../providers/session-provider";
import { useToast } from "../providers/toast-provider";
import { Button } from "../ui/button";
import { ConfirmDialog } from "../ui/confirm-dialog";
import { FormProblems } from "../ui/form-problems";
import { useSubmit } from "../ui/use-submit";

const endedText = (ended: number) =>
  ended === 0
    ? "No other session was open."
    : ended === 1
      ? "One other session was ended."
      : `${ended} other sessions were ended.`;

export function SignOutEverywhere() {
  const { resume } = usePerson();
  const toast = useToast();
  const [asking, setAsking] = useState(false);
  const { busy, attempt, problems, run } = useSubmit({});

  const endOthers = () =>
    run(async () => {
      const ended = await resume(() => endSessions("others"));
      toast({ kind: "met", text: endedText(ended) });
    });
  const endAll = async () => {
    const done = await run(() => resume(() => endSessions("all")));
    setAsking(false);
    if (done) window.location.assign("/sign-in");
  };

  return (
    <>
      <FormProblems title="No session was ended." {...{ attempt, problems }} />
      <p className="mb-3 max-w-prose">
        A session ends by itself a day after its last use. Left signed in on a machine in the hall, or lost a tablet? End the
        sessions here. Access tokens are not touched.
      </p>
      <div className="flex flex-wrap gap-3">
        <Button busy={busy} onClick={endOthers}>
          Sign out everywhere else
        </Button>
        <Button tone="grave" onClick={() => setAsking(true)}>
          Sign out everywhere
        </Button>
      </div>
      <ConfirmDialog
        open={asking}
        onClose={() => setAsking(false)}
        onConfirm={endAll}
        busy={busy}
        title="Sign out everywhere?"
        keepLabel="Stay signed in"
        confirmLabel="Sign out everywhere"
      >
        All your sessions end at once, this one too. Screens that are open keep what was typed and ask for your password again.
      </ConfirmDialog>
    </>
  );
}
