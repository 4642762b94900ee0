"use client";

import { useRouter } from "next/navigation";
import { type FormEvent, useState } from "react";
import { renameTeam } from "@/lib/client/account";
import { useSession } from "../providers/session-provider";
import { useToast } from "../providers/toast-provider";
import { Button } from "../ui/button";
import { Dialog } from "../ui/dialog";
import { FormProblems } from "../ui/form-problems";
import { TextField } from "../ui/text-field";
import { useSubmit } from "../ui/use-submit";

const FIELDS = { "/name": "team-name" };

export function RenameTeam({ name }: Readonly<{ name: string }>) {
  const { resume } = useSession();
  const toast = useToast();
  const router = useRouter();
  const [open, setOpen] = useState(false);
  const { busy, attempt, problems, at, run, clear } = useSubmit(FIELDS);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const wanted = String(new FormData(event.currentTarget).get("name"));
    if (!(await run(() => resume(() => renameTeam(wanted))))) return;
    setOpen(false);
    toast({ kind: "met", text: `The team is called ${wanted.trim()} now.` });
    router.refresh();
  }
  const close = () => {
    setOpen(false);
    clear();
  };

  return (
    <>
      <Button onClick={() => setOpen(true)}>Rename the team</Button>
      <Dialog
        open={open}
        onClose={close}
        title="Rename the team"
        actions={
          <>
            <Button onClick={close}>Keep the name</Button>
            <Button type="submit" form="rename-team" tone="primary" busy={busy}>
              {busy ? "Saving…" : "Save the name"}
            </Button>
          </>
        }
      >
        <form id="rename-team" method="post" onSubmit={submit} noValidate>
          <FormProblems title="The team was not renamed." {...{ attempt, problems }} />
          <TextField
            id={FIELDS["/name"]}
            name="name"
            label="Name of the team"
            autoComplete="off"
            defaultValue={name}
            problem={at("/name")}
            hint="Shown to every member, and in invitations."
          />
        </form>
      </Dialog>
    </>
  );
}
