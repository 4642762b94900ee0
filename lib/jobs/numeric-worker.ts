import { parentPort } from "node:worker_threads";
import { computeDesign } from "@/control/design/compute-design";
import { NumericalError } from "@/control/errors";
import { checkPlant } from "@/control/plant/check-plant";
import { evaluatePlant } from "@/control/plant/evaluate-plant";
import type { NumericAnswer, NumericJob, NumericValue } from "./numeric-job";

/** The whole program of a numeric worker thread: one job in, one answer out. Bundled into `dist/numeric-worker.mjs`. */
parentPort?.on("message", (job: NumericJob) => {
  const answer = answerTo(job);
  parentPort?.postMessage(answer, answer.outcome === "done" ? columnsOf(answer.value) : []);
});

function answerTo(job: NumericJob): NumericAnswer {
  try {
    return { outcome: "done", value: computed(job) };
  } catch (error) {
    if (error instanceof NumericalError) return { outcome: "refused", code: error.code, data: error.data };
    if (error instanceof Error) return { outcome: "failed", message: error.message, stack: error.stack ?? "" };
    return { outcome: "failed", message: String(error), stack: "" };
  }
}

function computed(job: NumericJob): NumericValue {
  if (job.kind === "checks") return checkPlant(job.model);
  if (job.kind === "design") return computeDesign(job.model, job.recipe);
  const { model, problems } = evaluatePlant(job.content);
  return { model, problems };
}

/** The columns of the responses are handed over instead of copied; several may share one buffer. */
function columnsOf(value: NumericValue): ArrayBuffer[] {
  if (!("responses" in value) || value.responses.state !== "computed") return [];
  const buffers = value.responses.value.records.map(({ values }) => values.buffer);
  return [...new Set(buffers)].filter((buffer) => buffer instanceof ArrayBuffer);
}
