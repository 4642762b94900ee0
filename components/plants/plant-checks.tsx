"use client";

import { useQuery } from "@tanstack/react-query";
import type { PlantModel } from "@/control/plant/model";
import { checkContent, fetchRevisionChecks, plantKeys } from "@/lib/client/plants";
import type { PlantContent } from "@/lib/schemas/plant";
import { useSession } from "../providers/session-provider";
import { Button } from "../ui/button";
import { ErrorState } from "../ui/error-state";
import { LoadingState } from "../ui/loading-state";
import { SheetSection } from "../ui/sheet-section";
import { ChecksPanel } from "./checks-panel";

type PlantChecksProps = Readonly<{
  /** The stored revision, where there is one. */
  revision: { readonly plantId: string; readonly revisionId: string } | null;
  content: PlantContent;
  /** The evaluated plant as it stands on the page; null while an entry is in error. */
  model: PlantModel | null;
  /** Whether the page differs from the stored revision. */
  dirty: boolean;
}>;

/** Checks of the stored revision at once, of a changed plant as it stands: nothing has to be saved to be judged. */
export function PlantChecks({ revision, content, model, dirty }: PlantChecksProps) {
  const { resume } = useSession();
  const stored = revision !== null && !dirty;
  const checks = useQuery({
    queryKey: stored ? plantKeys.checks(revision.plantId, revision.revisionId) : ["checks", content],
    queryFn: ({ signal }) =>
      resume(() => (stored ? fetchRevisionChecks(revision.plantId, revision.revisionId, signal) : checkContent(content, signal))),
    enabled: stored,
    staleTime: Number.POSITIVE_INFINITY,
    retry: false,
  });
  const ask = (
    <Button tone={checks.data ? undefined : "primary"} busy={checks.isFetching} onClick={() => checks.refetch()}>
      {checks.isFetching ? "Checking…" : "Check this plant"}
    </Button>
  );
  return (
    <div className="mt-10">
      <SheetSection title="Checks" ruled actions={!stored && model ? ask : null}>
        {checks.isError ? (
          <ErrorState title="The checks could not be made." action={<Button onClick={() => checks.refetch()}>Try again</Button>}>
            {checks.error.message}
          </ErrorState>
        ) : checks.isFetching ? (
          <LoadingState label="Checking the plant" />
        ) : checks.data && model ? (
          <ChecksPanel checks={checks.data} model={model} />
        ) : (
          <p className="text-soft">
            {model
              ? "Modes, controllability, observability, zeros, coupling and scaling, in plain words. Nothing has to be saved first."
              : "The checks wait until every entry has a value; the entries in error are marked above."}
          </p>
        )}
      </SheetSection>
    </div>
  );
}
