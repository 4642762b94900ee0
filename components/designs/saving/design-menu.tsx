"use client";

import { useQueryClient } from "@tanstack/react-query";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { archiveDesign, designKeys, duplicateDesign, renameDesign } from "@/lib/client/designs";
import { RequestProblem } from "@/lib/client/request";
import type { DesignSummary } from "@/lib/schemas/design";
import { useSession } from "../../providers/session-provider";
import { useToast } from "../../providers/toast-provider";
import { Menu } from "../../ui/menu";
import { NameDialog } from "../../ui/name-dialog";

type DesignMenuProps = Readonly<{
  design: DesignSummary;
  onChanged: (design: DesignSummary) => void;
  onSaveAsNew: () => void;
}>;

/** What can be done with the design as a whole. */
export function DesignMenu({ design, onChanged, onSaveAsNew }: DesignMenuProps) {
  const { resume } = useSession();
  const cache = useQueryClient();
  const router = useRouter();
  const say = useToast();
  const [asking, setAsking] = useState<"rename" | "duplicate" | null>(null);
  const changed = (now: DesignSummary) => {
    onChanged(now);
    void cache.invalidateQueries({ queryKey: designKeys.list(design.plantId).slice(0, -1) });
  };
  const putAway = async (from: DesignSummary, archived: boolean) => {
    try {
      const now = await resume(() => archiveDesign(from.id, from.version, archived));
      changed(now);
      const action = archived ? { label: "Undo", run: () => void putAway(now, false) } : undefined;
      say({
        text: archived ? `“${now.name}” is archived; it keeps everything.` : `“${now.name}” is back in use.`,
        kind: "met",
        action,
      });
    } catch (error) {
      if (!(error instanceof RequestProblem)) throw error;
      say({ text: error.message, kind: "unmet" });
    }
  };
  const archived = design.archivedAt !== null;
  return (
    <>
      <Menu
        label="Design"
        ariaLabel="Design: rename, duplicate, archive"
        align="end"
        items={[
          { key: "rename", label: "Rename…", onSelect: () => setAsking("rename") },
          { key: "duplicate", label: "Duplicate…", onSelect: () => setAsking("duplicate") },
          ...(archived ? [] : [{ key: "as-new", label: "Save as a new design…", onSelect: onSaveAsNew }]),
          {
            key: "archive",
            ruled: true,
            label: archived ? "Bring back from the archive" : "Archive",
            onSelect: () => void putAway(design, !archived),
          },
        ]}
      />
      {asking === "rename" ? (
        <NameDialog
          title="Rename the design"
          label="Name of the design"
          confirm="Rename"
          start={design.name}
          onClose={() => setAsking(null)}
          onName={async (name) => changed(await resume(() => renameDesign(design.id, design.version, name)))}
        />
      ) : null}
      {asking === "duplicate" ? (
        <NameDialog
          title="Duplicate the design as it is stored"
          label="Name of the design"
          confirm="Duplicate"
          start={`${design.name}, copy`.slice(0, 120)}
          onClose={() => setAsking(null)}
          onName={async (name) => {
            const made = await resume(() => duplicateDesign(design.id, name));
            changed(design);
            say({ text: `“${made.name}” is made.`, kind: "met" });
            router.push(`/plants/${made.plantId}/designs/${made.id}`);
          }}
        />
      ) : null}
    </>
  );
}
