"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { archivePlant, duplicatePlant, renamePlant } from "@/lib/client/plants";
import { RequestProblem } from "@/lib/client/request";
import type { Plant } from "@/lib/schemas/plant";
import { useSession } from "../providers/session-provider";
import { useToast } from "../providers/toast-provider";
import { Menu } from "../ui/menu";
import { NameDialog } from "../ui/name-dialog";
import { useCreateKey } from "../ui/use-create-key";

type PlantActionsProps = Readonly<{ plant: Plant; onChanged: (plant: Plant) => void }>;

/** What is done to a plant as a whole. Each change carries the version it started from. */
export function PlantActions({ plant, onChanged }: PlantActionsProps) {
  const { resume } = useSession();
  const router = useRouter();
  const toast = useToast();
  const keyFor = useCreateKey();
  const [asking, setAsking] = useState<"rename" | "duplicate" | null>(null);

  const rename = async (name: string) => onChanged(await resume(() => renamePlant(plant.id, plant.version, name)));
  const duplicate = async (name: string) => {
    const copy = await resume(() => duplicatePlant(plant.id, { name }, keyFor({ name })));
    router.push(`/plants/${copy.id}`);
  };
  const archive = async (archived: boolean, from = plant) => {
    try {
      const changed = await resume(() => archivePlant(from.id, from.version, archived));
      onChanged(changed);
      toast({
        text: archived ? `${plant.name} is archived.` : `${plant.name} is back in use.`,
        kind: "met",
        action: archived ? { label: "Undo", run: () => void archive(false, changed) } : undefined,
      });
    } catch (error) {
      if (!(error instanceof RequestProblem)) throw error;
      toast({ text: error.message, kind: "unmet" });
    }
  };

  return (
    <>
      <Menu
        label="More"
        ariaLabel={`More for ${plant.name}`}
        align="end"
        items={[
          { key: "rename", label: "Rename…", onSelect: () => setAsking("rename") },
          { key: "duplicate", label: "Duplicate…", onSelect: () => setAsking("duplicate") },
          plant.archivedAt
            ? { key: "restore", label: "Bring back into use", onSelect: () => void archive(false) }
            : { key: "archive", label: "Archive", onSelect: () => void archive(true) },
        ]}
      />
      {asking ? (
        <NameDialog
          title={asking === "duplicate" ? `Duplicate ${plant.name}` : `Rename ${plant.name}`}
          label="Name of the plant"
          start={asking === "duplicate" ? `${plant.name} (copy)`.slice(0, 120) : plant.name}
          confirm={asking === "duplicate" ? "Duplicate" : "Rename"}
          onClose={() => setAsking(null)}
          onName={asking === "duplicate" ? duplicate : rename}
        />
      ) : null}
    </>
  );
}
