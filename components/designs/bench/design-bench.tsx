"use client";

import { useDeferredValue, useMemo, useState } from "react";
import { useSession } from "../../providers/session-provider";
import { Button } from "../../ui/button";
import { EmptyState } from "../../ui/empty-state";
import { FormProblems } from "../../ui/form-problems";
import { LoadingState } from "../../ui/loading-state";
import { EvidencePanel } from "../evidence/evidence-panel";
import { polesOfReport } from "../evidence/evidence-words";
import { computed } from "../evidence/figures-reply";
import { GainsSection } from "../gains/gains-section";
import { KeyMap } from "../keys/key-map";
import { useBenchKeys } from "../keys/use-bench-keys";
import { useMapKey } from "../keys/use-map-key";
import { RecipeActionsContext, RecipeContext, type RecipeEditing } from "../recipe/recipe-context";
import { recipeFields } from "../recipe/recipe-fields";
import { RecipeMatrices } from "../recipe/recipe-matrices";
import { RecipePanel } from "../recipe/recipe-panel";
import { RecipeReading } from "../recipe/recipe-reading";
import { useWeightLines } from "../recipe/use-weight-lines";
import { ResponsesPanel } from "../responses/responses-panel";
import { RevisionsList } from "../revisions-list";
import { ConflictDialog } from "../saving/conflict-dialog";
import { SaveNewDialog } from "../saving/save-new-dialog";
import { SaveRevisionDialog } from "../saving/save-revision-dialog";
import { useSaving } from "../saving/use-saving";
import { TradeSection } from "../trade/trade-section";
import { startOf } from "./bench-base";
import { BenchHeading } from "./bench-heading";
import { BenchNotices } from "./bench-notices";
import type { BenchStart } from "./bench-types";
import { cellProblems, problemAt, shownProblems } from "./recipe-problems-at";
import { isUnsolvable } from "./recipe-refusal";
import { SolveBar } from "./solve-bar";
import { SolveRefusal } from "./solve-refusal";
import { type Bench, useBench } from "./use-bench";
import { useNewestAddress } from "./use-newest-address";

/** The page of a design: recipe, coupled responses and evidence side by side, the gains below. */
export function DesignBench({ start }: Readonly<{ start: BenchStart }>) {
  const mayWrite = useSession().role !== "reviewer";
  const bench = useBench(start, mayWrite);
  const saving = useSaving(bench, start.plant.id);
  const [dialog, setDialog] = useState<"revision" | "new" | "keys" | null>(null);
  const [mapByKey, setMapByKey] = useMapKey();
  const { base, reading } = bench;
  const mayEdit = mayWrite && !base.design?.archivedAt;
  useNewestAddress(start, base);
  // A recipe that cannot be sent is not asked a name for: its fields say first what is wrong.
  const open = (which: "revision" | "new") => (reading.recipe ? setDialog(which) : void bench.solve());
  const save = () => open(base.design ? "revision" : "new");
  const close = () => {
    saving.stop();
    setDialog(null);
  };
  useBenchKeys({
    ...(mapByKey && { map: () => setDialog("keys") }),
    ...(mayEdit && {
      solve: () => void (bench.solving.busy || bench.solve()),
      save: () => void (base.design !== null && !bench.dirty ? null : save()),
      undo: bench.undo,
      redo: bench.redo,
    }),
  });
  const suggested = base.design ? `${base.design.name}, next`.slice(0, 120) : "";
  return (
    <>
      <BenchHeading
        {...{ bench, start, mayWrite, mayEdit }}
        onSave={save}
        onSaveAsNew={() => open("new")}
        onKeys={() => setDialog("keys")}
      />
      <BenchNotices {...{ bench, start, mayEdit }} />
      {mayEdit ? (
        <Editing bench={bench} plant={start.plant} />
      ) : (
        <Columns bench={bench} plant={start.plant} recipe={<Read bench={bench} />} />
      )}
      {base.design && base.revision ? <RevisionsList design={base.design} shownId={base.revision.id} /> : null}
      <SaveRevisionDialog {...{ bench, saving }} open={dialog === "revision"} onClose={close} />
      {dialog === "new" ? (
        <SaveNewDialog {...{ bench, saving, suggested }} plantId={start.plant.id} open onClose={close} />
      ) : null}
      <KeyMap open={dialog === "keys"} onClose={close} mayEdit={mayEdit} byKey={mapByKey} onByKey={setMapByKey} />
      <ConflictDialog {...{ bench, saving }} onCopy={() => setDialog("new")} />
    </>
  );
}

/** Everything that is typed into stands below one context, anew for another plant revision. */
function Editing({ bench, plant }: Readonly<{ bench: Bench; plant: BenchStart["plant"] }>) {
  const { base, form, ground, change, undo, redo, setUsable, solving, reading } = bench;
  const { refusal } = solving;
  const problems = useMemo(() => shownProblems(refusal, reading), [refusal, reading]);
  const weightLines = useWeightLines(reading.recipe, ground.model);
  const start = useMemo(() => startOf(base, ground), [base, ground]);
  const editing = useMemo(
    (): RecipeEditing => ({
      ...{ form, start, weightLines, change, undo, redo, setUsable },
      model: ground.model,
      problemAt: (pointer) => problemAt(problems, pointer),
      cellProblems: (pointer) => cellProblems(problems, pointer),
    }),
    [form, start, weightLines, change, undo, redo, setUsable, ground, problems],
  );
  const actions = useMemo(() => ({ change, setUsable }), [change, setUsable]);
  const poles = solving.solved && computed(solving.solved.evidence.poles);
  // Only proposals read them: they need not be there in the frame of the curves.
  const loopPoles = useDeferredValue(useMemo(() => (poles ? polesOfReport(poles) : null), [poles]));
  return (
    <RecipeActionsContext value={actions}>
      <RecipeContext value={editing}>
        <div key={ground.plantRevision.id}>
          <Columns
            {...{ bench, plant }}
            trade={form.method === "weights" ? <TradeSection /> : null}
            recipe={
              <>
                <SolveBar bench={bench} />
                <Refused bench={bench} />
                <RecipePanel loopPoles={loopPoles} />
              </>
            }
          />
          <RecipeMatrices />
        </div>
      </RecipeContext>
    </RecipeActionsContext>
  );
}

/** Why the last try was refused: fields to mend, an assumption that does not hold, or no connection. */
function Refused({ bench: { solving, form, ground, reading } }: Readonly<{ bench: Bench }>) {
  const { refusal, attempt, problems } = solving;
  if (!refusal) return null;
  if (isUnsolvable(refusal)) return <SolveRefusal problem={refusal} model={ground.model} />;
  if (refusal.code !== "invalid") return <FormProblems {...{ attempt, problems }} title="This could not be solved yet." />;
  const fields = recipeFields(form, ground.model);
  const shown = shownProblems(refusal, reading).map(({ pointer, message }) => {
    const field = Object.keys(fields).find(
      (known) => `/recipe${pointer}` === known || `/recipe${pointer}`.startsWith(`${known}/`),
    );
    return { fieldId: field && fields[field], message };
  });
  return <FormProblems attempt={attempt} problems={shown} title="The recipe is not complete yet." />;
}

function Read({ bench: { base } }: Readonly<{ bench: Bench }>) {
  return (
    <>
      <h2 className="mb-2">Recipe</h2>
      <RecipeReading recipe={base.recipe} model={base.ground.model} />
    </>
  );
}

type ColumnsProps = Readonly<{ bench: Bench; plant: BenchStart["plant"]; recipe: React.ReactNode; trade?: React.ReactNode }>;

/** Three columns where there is room, one part below the other on a tablet and on paper. */
function Columns({ bench, plant, recipe, trade }: ColumnsProps) {
  const { base, stale } = bench;
  const { solved } = bench.solving;
  // Curves follow the hand; figures and gains may come a frame later.
  const settled = useDeferredValue(solved);
  const ghostOf = solved?.source.kind === "computed" ? (base.revision?.id ?? null) : null;
  return (
    <div className="mb-8 grid gap-x-6 gap-y-8 xl:grid-cols-[20rem_minmax(0,1fr)_22rem] xl:grid-rows-[auto_1fr]">
      <div className="flex min-w-0 flex-col gap-4 xl:row-span-2">{recipe}</div>
      <section aria-labelledby="responses-heading" className={MIDDLE}>
        <h2 id="responses-heading" className="mb-1">
          Coupled response
        </h2>
        <p className="mb-3 text-sm text-soft">columns: what is commanded · rows: what the machine does</p>
        {stale && solved ? (
          <p className="mb-3 text-sm">
            Drawn for the recipe as it was last solved, on plant revision {solved.ground.plantRevision.number}.
          </p>
        ) : null}
        {solved ? <ResponsesPanel solved={solved} ghostOf={ghostOf} /> : <NothingSolved bench={bench} />}
        {trade}
      </section>
      <section aria-labelledby="evidence-heading" aria-busy={settled !== solved} className="min-w-0 contain-layout xl:row-span-2">
        <h2 id="evidence-heading" className="mb-3">
          Evidence
        </h2>
        {settled ? (
          <EvidencePanel plant={plant} solved={settled} />
        ) : (
          <p className="text-soft">It appears with the first solution.</p>
        )}
      </section>
      <div aria-busy={settled !== solved} className={MIDDLE}>
        {settled ? <GainsSection solved={settled} plantName={plant.name} designName={base.design?.name ?? null} /> : null}
      </div>
    </div>
  );
}

const MIDDLE = "min-w-0 contain-layout xl:border-x xl:border-rule xl:px-6 xl:col-start-2 xl:-my-4 xl:py-4";

function NothingSolved({ bench: { solving, solve, reading } }: Readonly<{ bench: Bench }>) {
  if (solving.live && reading.recipe && !solving.refusal)
    return <LoadingState label="Solving the recipe as it stands" lines={8} />;
  const action = (
    <Button tone="primary" busy={solving.busy} onClick={solve}>
      Solve
    </Button>
  );
  return (
    <EmptyState title="Not solved yet" action={action}>
      Once the recipe can be solved, this shows what every axis does when one is commanded.
    </EmptyState>
  );
}
