"use client";

import { useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import type { Recipe } from "@/control/design/recipe";
import { addDesignRevision, createDesign, designKeys, fetchDesign, fetchDesignRevision } from "@/lib/client/designs";
import { RequestProblem } from "@/lib/client/request";
import type { AddDesignRevision, DesignRevision, DesignSummary } from "@/lib/schemas/design";
import { useSession } from "../../providers/session-provider";
import { useCreateKey } from "../../ui/use-create-key";
import type { Bench } from "../bench/use-bench";
import { computed } from "../evidence/figures-reply";

/** Somebody saved a revision after this edit began. */
export type Conflict = { readonly design: DesignSummary; readonly theirs: DesignRevision; readonly note: string };

const isStale = (error: unknown) => error instanceof RequestProblem && error.code === "stale-version";

/** Stores the recipe on the page. The server solves it again; what it stores is what is shown afterwards. */
export function useSaving(bench: Bench, plantId: string) {
  const { resume } = useSession();
  const cache = useQueryClient();
  const [conflict, setConflict] = useState<Conflict | null>(null);
  const keyOf = useCreateKey();
  const { base, ground, reading } = bench;

  const listsChanged = (designId: string) => {
    void cache.invalidateQueries({ queryKey: designKeys.list(plantId).slice(0, -1) });
    void cache.invalidateQueries({ queryKey: designKeys.revisions(designId) });
  };

  /** True when it is stored; false when somebody else was first and `conflict` says who. @throws RequestProblem */
  async function saveRevision(note: string, version = base.from?.version): Promise<boolean> {
    const { design, from } = base;
    if (!design || version === undefined || !reading.recipe) return false;
    const body: AddDesignRevision = {
      plantRevisionId: ground.plantRevision.id,
      recipe: asSent(reading.recipe),
      note,
      shown: shownGains(bench),
    };
    const send = (at: number) => resume(() => addDesignRevision(design.id, at, body));
    let saved: DesignSummary;
    try {
      saved = await send(version);
    } catch (error) {
      if (!isStale(error)) throw error;
      const now = await resume(() => fetchDesign(design.id));
      if (now.currentRevision.id !== from?.revisionId) {
        setConflict({ design: now, theirs: await resume(() => fetchDesignRevision(now.currentRevision.id)), note });
        return false;
      }
      // Only its name or its place in the archive changed: nothing of theirs is saved over.
      saved = await send(now.version);
    }
    bench.settle(saved, await resume(() => fetchDesignRevision(saved.currentRevision.id)));
    setConflict(null);
    listsChanged(design.id);
    return true;
  }

  /** @throws RequestProblem */
  async function saveAsNew(name: string, note: string): Promise<DesignSummary | null> {
    if (!reading.recipe) return null;
    const body = {
      name,
      plantRevisionId: ground.plantRevision.id,
      recipe: asSent(reading.recipe),
      note,
      shown: shownGains(bench),
    };
    const made = await resume(() => createDesign(plantId, body, keyOf(body)));
    listsChanged(made.id);
    return made;
  }

  return { conflict, setConflict, saveRevision, saveAsNew };
}

export type Saving = ReturnType<typeof useSaving>;

/** The gains on the page, where they were solved from the recipe as it stands: the server stores no others. */
function shownGains({ stale, solving: { solved } }: Bench): AddDesignRevision["shown"] {
  const gains = solved && !stale ? computed(solved.evidence.gains) : null;
  return solved && gains ? { methodVersion: solved.evidence.methodVersion, K: gains.K } : undefined;
}

/** The body's type allows changing; the recipe's does not. */
const asSent = (recipe: Recipe) => recipe as AddDesignRevision["recipe"];
