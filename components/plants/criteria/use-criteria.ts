"use client";

import { useEffect, useState } from "react";
import type { PlantContent } from "@/control/plant/content";
import { fetchPlant, setCriteria } from "@/lib/client/plants";
import type { Plant } from "@/lib/schemas/plant";
import { useSession } from "../../providers/session-provider";
import { useToast } from "../../providers/toast-provider";
import { useSubmit } from "../../ui/use-submit";
import { changePastOthers, isStale } from "../change-past-others";
import { type CriterionLine, linesOf, nextLine, saysTheSame, sentOf } from "./criterion-lines";

export const limitId = (index: number) => `criterion-${index + 1}-limit`;
export const signalId = (index: number) => `criterion-${index + 1}-signal`;
const limitPointer = (index: number) => `/criteria/${index}/limit`;
export const signalPointer = (index: number) => `/criteria/${index}/signal`;

/** The criteria of a plant while they are written, and their saving as one. */
export function useCriteria(plant: Plant, onSaved: (saved: Plant) => void) {
  const { resume } = useSession();
  const toast = useToast();
  const [stored, setStored] = useState(plant.criteria);
  const [round, setRound] = useState(0);
  const [lines, setLines] = useState(() => linesOf(plant.criteria, 0));
  const odd = useUnread();
  const [theirs, setTheirs] = useState<Plant | null>(null);
  const fields = lines.flatMap((_, k) => [
    [signalPointer(k), signalId(k)],
    [limitPointer(k), limitId(k)],
  ]);
  const submit = useSubmit(Object.fromEntries(fields));
  const dirty = !saysTheSame(lines, stored) || odd.unread.size > 0;
  useLeaveWarning(dirty);

  const show = (criteria: Plant["criteria"]) => {
    setStored(criteria);
    setLines(linesOf(criteria, round + 1));
    setRound(round + 1);
  };
  // Came with another part of the plant: what nobody writes here follows, what somebody does is kept.
  const overtaken = !saysTheSame(plant.criteria, stored);
  if (overtaken && !dirty) show(plant.criteria);

  const settle = (saved: Plant) => {
    show(saved.criteria);
    setTheirs(null);
    submit.clear();
    onSaved(saved);
  };
  const saveFrom = ({ version, criteria }: Pick<Plant, "version" | "criteria">) =>
    submit.run(async () => {
      const send = (from: number) => setCriteria(plant.id, from, sentOf(lines));
      const leftAlone = (now: Plant) => saysTheSame(now.criteria, criteria);
      try {
        settle(await resume(() => changePastOthers(plant.id, version, send, leftAlone)));
        toast({ text: "The acceptance criteria are saved.", kind: "met" });
      } catch (error) {
        if (!isStale(error)) throw error;
        setTheirs(await resume(() => fetchPlant(plant.id)));
      }
    });
  const change = (next: (now: CriterionLine[]) => CriterionLine[]) => {
    // Problems are told by place, and places move.
    submit.clear();
    odd.setTried(false);
    setLines(next);
  };

  return {
    ...{ lines, dirty, theirs, submit, settle },
    setUsable: odd.setUsable,
    limitProblem: ({ key }: CriterionLine, index: number) => odd.problemOf(key) ?? submit.at(limitPointer(index)),
    save: () => {
      odd.setTried(true);
      const first = lines.findIndex(({ key }) => odd.unread.has(key));
      if (first >= 0) document.getElementById(limitId(first))?.focus();
      else if (overtaken && !theirs) setTheirs(plant);
      else void saveFrom(theirs ?? plant);
    },
    add: (content: PlantContent) => {
      change((now) => [...now, nextLine(now, content, `new ${round}`)]);
      setRound(round + 1);
    },
    put: (line: CriterionLine) => change((now) => now.map((old) => (old.key === line.key ? line : old))),
    remove: (key: string) => change((now) => now.filter((line) => line.key !== key)),
    drop: () => {
      submit.clear();
      show(plant.criteria);
      setTheirs(null);
    },
  };
}
export type CriteriaEditing = ReturnType<typeof useCriteria>;

/** Lines whose field holds a text that is no number; said once somebody tried to save. */
function useUnread() {
  const [unread, setUnread] = useState<ReadonlySet<string>>(new Set());
  const [tried, setTried] = useState(false);
  return {
    ...{ unread, setTried },
    setUsable: (key: string, usable: boolean) =>
      setUnread((now) => {
        const others = [...now].filter((one) => one !== key);
        return new Set(usable ? others : [...others, key]);
      }),
    problemOf: (key: string) => (tried && unread.has(key) ? "This is not a number. Write for example 0.25." : undefined),
  };
}

/** The browser asks before it drops what is not saved. */
function useLeaveWarning(dirty: boolean): void {
  useEffect(() => {
    if (!dirty) return;
    const warn = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener("beforeunload", warn);
    return () => window.removeEventListener("beforeunload", warn);
  }, [dirty]);
}
