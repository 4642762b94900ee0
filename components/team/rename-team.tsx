"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { renameTeam } from "@/lib/client/account";
import { useSession } from "../providers/session-provider";
import { useToast } from "../providers/toast-provider";
import { Button } from "../ui/button";
import { NameDialog } from "../ui/name-dialog";

export function RenameTeam({ name }: Readonly<{ name: string }>) {
  const { resume } = useSession();
  const toast = useToast();
  const router = useRouter();
  const [open, setOpen] = useState(false);
  const rename = async (wanted: string) => {
    await resume(() => renameTeam(wanted));
    toast({ kind: "met", text: `The team is called ${wanted} now.` });
    router.refresh();
  };

  return (
    <>
      <Button onClick={() => setOpen(true)}>Rename the team</Button>
      {open ? (
        <NameDialog
          title="Rename the team"
          label="Name of the team"
          start={name}
          confirm="Save the name"
          onClose={() => setOpen(false)}
          onName={rename}
        />
      ) : null}
    </>
  );
}
