"use client";

import type { Complex } from "@/control/plant/model";
import { Button } from "../../ui/button";
import { DefectiveChoice } from "./defective-choice";
import { PoleList } from "./pole-list";
import { PrototypeFields } from "./prototype-fields";
import { ReasonField } from "./reason-field";
import { useRecipe } from "./recipe-context";
import { draftsOf } from "./recipe-form";
import { usePoleProposals } from "./use-proposals";

/** `loopPoles`: of the loop that was solved last, one of each pair; null before that. */
export function PolesFields({ loopPoles }: Readonly<{ loopPoles: readonly Complex[] | null }>) {
  const { form, model, change } = useRecipe();
  const proposals = usePoleProposals(model, true);
  const fill = (entries: ReturnType<typeof draftsOf>) => change(null, (now) => ({ ...now, poles: entries }));
  return (
    <div className="flex flex-col gap-4">
      <PoleList
        legend="Wanted closed-loop poles"
        pointer="/poles"
        drafts={form.poles}
        wanted={model.states.length}
        per={`${model.states.length} states`}
        write={(now, poles) => ({ ...now, poles })}
        proposals={
          proposals ? (
            <>
              <Button size="small" onClick={() => fill(draftsOf(proposals.fromPlant()))}>
                Propose from the plant's poles
              </Button>
              {loopPoles ? (
                <Button size="small" onClick={() => fill(draftsOf(proposals.fromLoop(loopPoles)))}>
                  Take the present loop's
                </Button>
              ) : null}
            </>
          ) : null
        }
      />
      <DefectiveChoice of="loop" held="inputs" />
      <PrototypeFields />
      <ReasonField of="poles" about="the poles" />
    </div>
  );
}
