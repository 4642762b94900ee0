import { computeDesign } from "@/control/design/compute-design";
import type { Recipe } from "@/control/design/recipe";
import { recipeFigures } from "@/control/design/recipe-figures";
import { weightEffects } from "@/control/design/weight-effects";
import type { PlantModel } from "@/control/plant/model";
import { namedCurves } from "@/control/response/named-curves";
import { evidenceInWords } from "@/control/words/evidence-in-words";
import type { LiveAnswer, LiveJob, LiveSolution, LiveValues } from "./live-messages";

/** The whole program of the bench's workers: the very core that the server runs, one job in, its answer out. */
addEventListener("message", ({ data: job }: MessageEvent<LiveJob>) => {
  const tell = (answer: LiveAnswer, transfer: ArrayBuffer[] = []) => postMessage(answer, { transfer });
  try {
    const value = work(job, (done) => tell({ id: job.id, outcome: "progress", done }));
    tell({ id: job.id, outcome: "done", value }, "curves" in value ? buffersOf(value) : []);
  } catch (error) {
    tell({ id: job.id, outcome: "failed", message: error instanceof Error ? error.message : String(error) });
  }
});

function work(job: LiveJob, progress: (done: number) => void): LiveValues[LiveJob["kind"]] {
  if (job.kind === "design") return solution(job.model, job.recipe);
  if (job.kind === "effects") return weightEffects(job.model, job.recipe);
  return job.recipes.map((recipe, index) => {
    const figures = recipeFigures(job.model, recipe);
    progress(index + 1);
    return figures;
  });
}

const ROLES = ["commanded", "output", "state", "estimate", "input"] as const;

function solution(model: PlantModel, recipe: Recipe): LiveSolution {
  const started = performance.now();
  const evidence = computeDesign(model, recipe);
  const records = evidence.responses.state === "computed" ? evidence.responses.value.records : [];
  const curves = records.map((record) => namedCurves(record, model, ROLES));
  const milliseconds = performance.now() - started;
  return { evidence: evidenceInWords(evidence, model), curves, milliseconds };
}

/** The columns are handed over instead of copied; several share one buffer. */
function buffersOf({ curves }: LiveSolution): ArrayBuffer[] {
  const buffers = curves.flatMap(({ values }) => values.map(({ buffer }) => buffer));
  return [...new Set(buffers)].filter((buffer) => buffer instanceof ArrayBuffer);
}
