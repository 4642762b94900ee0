"use client";

import { useQuery } from "@tanstack/react-query";
import { useRouter } from "next/navigation";
import { createPlant, fetchDifference, fetchPlant } from "@/lib/client/plants";
import type { PlantContent, PlantSummary } from "@/lib/schemas/plant";
import { useSession } from "../../providers/session-provider";
import { Button } from "../../ui/button";
import { Dialog } from "../../ui/dialog";
import { FormProblems } from "../../ui/form-problems";
import { LoadingState } from "../../ui/loading-state";
import { useSubmit } from "../../ui/use-submit";
import { DifferenceTable } from "../difference-table";

type PlantConflictProps = Readonly<{
  /** As this page knew it. */
  plant: PlantSummary;
  /** The newest revision when the edit started; null where that is not known any more. */
  startedFrom: string | null;
  content: PlantContent;
  busy: boolean;
  onKeepMine: (version: number) => void;
  onTakeTheirs: () => void;
  /** Mine is kept elsewhere: this page has nothing unsaved any more. */
  onCopied: () => void;
  onClose: () => void;
}>;

/** Somebody saved first: what they changed, and three ways on. Nothing is lost by any of them. */
export function PlantConflict({
  plant,
  startedFrom,
  content,
  busy,
  onKeepMine,
  onTakeTheirs,
  onCopied,
  onClose,
}: PlantConflictProps) {
  const { resume } = useSession();
  const router = useRouter();
  const copy = useSubmit({});
  const theirs = useQuery({
    queryKey: ["conflict", plant.id, plant.version],
    queryFn: ({ signal }) =>
      resume(async () => {
        const current = await fetchPlant(plant.id, signal);
        return {
          current,
          difference: await fetchDifference(
            plant.id,
            startedFrom ?? plant.currentRevision.id,
            current.currentRevision.id,
            signal,
          ),
        };
      }),
    gcTime: 0,
  });
  const saveCopy = () =>
    copy.run(async () => {
      const made = await resume(() => createPlant({ name: `${plant.name} (my changes)`.slice(0, 120), content, note: "" }));
      onCopied();
      router.push(`/plants/${made.id}`);
    });
  const current = theirs.data?.current;
  return (
    <Dialog
      open
      wide
      onClose={onClose}
      title="Somebody saved this plant after you opened it"
      actions={
        <>
          <Button onClick={onTakeTheirs}>Take theirs, drop mine</Button>
          <Button busy={copy.busy} onClick={saveCopy}>
            Keep mine as a plant of its own
          </Button>
          <Button tone="primary" busy={busy} disabled={!current} onClick={() => current && onKeepMine(current.version)}>
            Save mine as revision {current ? current.currentRevision.number + 1 : "…"}
          </Button>
        </>
      }
    >
      <FormProblems attempt={copy.attempt} problems={copy.problems} />
      {theirs.isPending ? <LoadingState label="Loading what they changed" /> : null}
      {theirs.isError ? <p role="alert">{theirs.error.message}</p> : null}
      {theirs.data ? (
        <>
          <p className="mb-3">
            {theirs.data.difference.to.createdBy ?? "Somebody"} saved revision {theirs.data.difference.to.number}
            {theirs.data.difference.to.note ? `: ${theirs.data.difference.to.note}` : "."} Yours is still on this page. What they
            changed:
          </p>
          <DifferenceTable difference={theirs.data.difference} />
        </>
      ) : null}
    </Dialog>
  );
}
