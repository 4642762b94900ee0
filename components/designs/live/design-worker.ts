import { computeDesign } from "@/control/design/compute-design";
import { namedCurves } from "@/control/response/named-curves";
import { evidenceInWords } from "@/control/words/evidence-in-words";
import type { LiveAnswer, LiveJob, LiveSolution } from "./live-messages";

/** The whole program of the bench's worker: the very core that the server runs, one recipe in, its evidence and curves out. */
addEventListener("message", ({ data }: MessageEvent<LiveJob>) => {
  const answer = answerTo(data);
  postMessage(answer, { transfer: answer.outcome === "solved" ? buffersOf(answer.solution) : [] });
});

const ROLES = ["commanded", "output", "state", "estimate", "input"] as const;

function answerTo({ id, model, recipe }: LiveJob): LiveAnswer {
  const started = performance.now();
  try {
    const evidence = computeDesign(model, recipe);
    const records = evidence.responses.state === "computed" ? evidence.responses.value.records : [];
    const curves = records.map((record) => namedCurves(record, model, ROLES));
    const milliseconds = performance.now() - started;
    return { id, outcome: "solved", solution: { evidence: evidenceInWords(evidence, model), curves, milliseconds } };
  } catch (error) {
    return { id, outcome: "failed", message: error instanceof Error ? error.message : String(error) };
  }
}

/** The columns are handed over instead of copied; several share one buffer. */
function buffersOf({ curves }: LiveSolution): ArrayBuffer[] {
  const buffers = curves.flatMap(({ values }) => values.map(({ buffer }) => buffer));
  return [...new Set(buffers)].filter((buffer) => buffer instanceof ArrayBuffer);
}
