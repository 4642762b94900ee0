"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { renameTeam } from "@/lib/client/account";
import { useSession } from "../providers/session-provider";
import { useToast } from "../providers/toast-provider";
import { Button } from "../ui/button";
import { NameDialog } from "../ui/name-dialog";
import { useSubmit } from "../ui/use-submit";

const FIELD = "team-name";

export function RenameTeam({ name }: Readonly<{ name: string }>) {
  const { resume } = useSession();
  const toast = useToast();
  const router = useRouter();
  const [open, setOpen] = useState(false);
  const form = useSubmit({ "/name": FIELD });

  const close = () => {
    setOpen(false);
    form.clear();
  };
  const rename = async (wanted: string) => {
    if (!(await form.run(() => resume(() => renameTeam(wanted))))) return;
    close();
    toast({ kind: "met", text: `The team is called ${wanted.trim()} now.` });
    router.refresh();
  };

  return (
    <>
      <Button onClick={() => setOpen(true)}>Rename the team</Button>
      <NameDialog
        open={open}
        onClose={close}
        fieldId={FIELD}
        title="Rename the team"
        label="Name of the team"
        start={name}
        action="Save the name"
        form={form}
        onSubmit={rename}
      />
    </>
  );
}
