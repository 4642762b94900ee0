import { parentPort } from "node:worker_threads";

/** Stands where the bundled worker stands and misbehaves as `job.model` asks: what the pool does about it is under test. */
parentPort.on("message", async ({ model }) => {
  if (model === "endless") for (;;);
  if (model === "crash") process.exit(3);
  if (model === "throw") throw new Error("a fault of the worker");
  if (model === "devour") for (const kept = []; ; ) kept.push(new Array(100_000).fill(kept.length + 0.5));
  if (model === "refuse")
    return parentPort.postMessage({ outcome: "refused", code: "pole-count", data: { expected: 4, given: 3 } });
  if (model === "fail") return parentPort.postMessage({ outcome: "failed", message: "a fault of the core", stack: "" });
  if (typeof model === "number") await new Promise((resolve) => setTimeout(resolve, model));
  parentPort.postMessage({ outcome: "done", value: { answered: model } });
});
