"use client";

import { useQueryClient } from "@tanstack/react-query";
import { useRef, useState } from "react";
import type { Recipe } from "@/control/design/recipe";
import { addDesignRevision, createDesign, designKeys, fetchDesign, fetchDesignRevision } from "@/lib/client/designs";
import { RequestProblem } from "@/lib/client/request";
import type { AddDesignRevision, DesignRevision, DesignSummary } from "@/lib/schemas/design";
import { useSession } from "../../providers/session-provider";
import { useCreateKey } from "../../ui/use-create-key";
import type { Bench } from "../bench/use-bench";
import { computed } from "../evidence/figures-reply";
import { recipeKey } from "../recipe/read-form";
import { untilAnswered } from "./until-answered";

/** Somebody saved a revision after this edit began. */
export type Conflict = { readonly design: DesignSummary; readonly theirs: DesignRevision; readonly note: string };

const isStale = (error: unknown) => error instanceof RequestProblem && error.code === "stale-version";

/**
 * One press, one save: without a connection it is sent again until it is answered. A create carries its key; a revision is sent from
 * its version, so that it counts once, too.
 */
function useSending() {
  const { resume } = useSession();
  const [waiting, setWaiting] = useState(false);
  const running = useRef<AbortController | null>(null);
  const send = <T>(work: () => Promise<T>): Promise<T> => {
    const { signal } = running.current ?? new AbortController();
    return untilAnswered(() => resume(work), { signal, onWaiting: setWaiting });
  };
  /** Gives up what waits; what was sent already may still arrive. */
  const stop = () => running.current?.abort();
  const start = () => {
    stop();
    running.current = new AbortController();
  };
  return { send, start, stop, waiting };
}

/** Stores the recipe on the page. The server solves it again; what it stores is what is shown afterwards. */
export function useSaving(bench: Bench, plantId: string) {
  const { send, start, stop, waiting } = useSending();
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
    start();
    const addAt = (at: number) => send(() => addDesignRevision(design.id, at, body));
    let saved: DesignSummary;
    try {
      saved = await addAt(version);
    } catch (error) {
      if (!isStale(error)) throw error;
      saved = await send(() => fetchDesign(design.id));
      if (saved.currentRevision.id === from?.revisionId) {
        // Only its name or its place in the archive changed: nothing of theirs is saved over.
        saved = await addAt(saved.version);
      } else {
        const theirs = await send(() => fetchDesignRevision(saved.currentRevision.id));
        if (!isSame(theirs, body)) {
          setConflict({ design: saved, theirs, note });
          return false;
        }
      }
    }
    bench.settle(saved, await send(() => fetchDesignRevision(saved.currentRevision.id)));
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
    start();
    const made = await send(() => createDesign(plantId, body, keyOf(body)));
    listsChanged(made.id);
    return made;
  }

  return { conflict, setConflict, saveRevision, saveAsNew, waiting, stop };
}

export type Saving = ReturnType<typeof useSaving>;

/** The gains on the page, where they were solved from the recipe as it stands: the server stores no others. */
function shownGains({ stale, solving: { solved } }: Bench): AddDesignRevision["shown"] {
  const gains = solved && !stale ? computed(solved.evidence.gains) : null;
  return solved && gains ? { methodVersion: solved.evidence.methodVersion, K: gains.K } : undefined;
}

/** The newest revision is the very one that was sent: only the answer to it was lost. */
const isSame = ({ plantRevision, note, recipe }: DesignRevision, sent: AddDesignRevision): boolean =>
  plantRevision.id === sent.plantRevisionId && note === (sent.note ?? "") && recipeKey(recipe) === recipeKey(sent.recipe);

/** The body's type allows changing; the recipe's does not. */
const asSent = (recipe: Recipe) => recipe as AddDesignRevision["recipe"];
