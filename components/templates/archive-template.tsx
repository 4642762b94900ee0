"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { RequestProblem } from "@/lib/client/request";
import { archiveTemplate } from "@/lib/client/templates";
import { useSession } from "../providers/session-provider";
import { useToast } from "../providers/toast-provider";
import { Button } from "../ui/button";

type ArchiveTemplateProps = Readonly<{ templateId: string; name: string; version: number; archived: boolean }>;

/** Takes a template out of use, or brings it back; what was made from it stays either way. */
export function ArchiveTemplate({ templateId, name, version, archived }: ArchiveTemplateProps) {
  const { resume } = useSession();
  const toast = useToast();
  const router = useRouter();
  const [busy, setBusy] = useState(false);

  const change = async (wanted: boolean, from: number) => {
    setBusy(true);
    try {
      const saved = await resume(() => archiveTemplate(templateId, from, wanted));
      toast({
        kind: "met",
        text: wanted ? `“${name}” is archived: nobody can start from it.` : `“${name}” is in use again.`,
        action: { label: "Undo", run: () => void change(!wanted, saved.version) },
      });
    } catch (error) {
      if (!(error instanceof RequestProblem)) throw error;
      toast({ kind: "unmet", text: error.message });
    } finally {
      setBusy(false);
      router.refresh();
    }
  };
  return (
    <Button busy={busy} onClick={() => change(!archived, version)}>
      {archived ? "Bring it back into use" : "Archive"}
    </Button>
  );
}
