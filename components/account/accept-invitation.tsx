"use client";

import { acceptInvitation } from "@/lib/client/account";
import { Button } from "../ui/button";
import { FormProblems } from "../ui/form-problems";
import { useSubmit } from "../ui/use-submit";

/** For somebody who is signed in with the invited address. */
export function AcceptInvitation({ secret }: Readonly<{ secret: string }>) {
  const { busy, attempt, problems, run } = useSubmit({});
  const join = async () => {
    if (await run(() => acceptInvitation(secret))) window.location.assign("/plants");
  };
  return (
    <>
      <FormProblems title="You have not joined yet." {...{ attempt, problems }} />
      <Button tone="primary" busy={busy} onClick={join}>
        {busy ? "Joining…" : "Join the team"}
      </Button>
    </>
  );
}
