import type { Recipe } from "@/control/design/recipe";
import type { PlantModel } from "@/control/plant/model";
import type { LiveAnswer, LiveJob, LiveSolution } from "./live-messages";

/** A worker that is at it for longer than this is ended when something newer is asked for: it cannot be interrupted otherwise. */
const PATIENCE_MS = 400;
const LONGEST_MS = 30_000;

export type LiveOutcome =
  | { readonly kind: "solved"; readonly solution: LiveSolution }
  /** Something newer was asked for, or somebody pressed Stop. */
  | { readonly kind: "dropped" }
  | { readonly kind: "too-long" }
  /** The browser runs no worker, or the worker itself failed. */
  | { readonly kind: "broken" };

type Asked = {
  readonly job: LiveJob;
  readonly answer: (outcome: LiveOutcome) => void;
};
type Running = Asked & { readonly since: number; readonly limit: ReturnType<typeof setTimeout> };

/** One worker, one recipe at a time: the newest request wins, those in between are dropped unsolved. */
export class LiveSolver {
  readonly #makeWorker: () => Worker;
  #worker: Worker | null = null;
  #running: Running | null = null;
  #waiting: Asked | null = null;
  #lastId = 0;

  constructor(makeWorker: () => Worker) {
    this.#makeWorker = makeWorker;
  }

  solve(model: PlantModel, recipe: Recipe): Promise<LiveOutcome> {
    return new Promise((answer) => {
      this.#waiting?.answer({ kind: "dropped" });
      this.#waiting = { job: { id: ++this.#lastId, model, recipe }, answer };
      if (this.#running && performance.now() - this.#running.since > PATIENCE_MS) this.#endRunning({ kind: "dropped" });
      this.#startNext();
    });
  }

  /** Gives up whatever is asked for and ends the worker; the next request starts another. */
  stop(): void {
    this.#waiting?.answer({ kind: "dropped" });
    this.#waiting = null;
    this.#endRunning({ kind: "dropped" });
  }

  #startNext(): void {
    const next = this.#waiting;
    if (this.#running || !next) return;
    this.#waiting = null;
    const worker = this.#workerOrNull();
    if (!worker) {
      next.answer({ kind: "broken" });
      return;
    }
    const limit = setTimeout(() => this.#endRunning({ kind: "too-long" }), LONGEST_MS);
    this.#running = { ...next, since: performance.now(), limit };
    worker.postMessage(next.job);
  }

  #workerOrNull(): Worker | null {
    if (this.#worker) return this.#worker;
    try {
      const worker = this.#makeWorker();
      worker.addEventListener("message", ({ data }: MessageEvent<LiveAnswer>) => this.#told(data));
      worker.addEventListener("error", () => this.#endRunning({ kind: "broken" }));
      this.#worker = worker;
    } catch {
      return null; // no workers here: the caller has another way
    }
    return this.#worker;
  }

  #told(answer: LiveAnswer): void {
    if (answer.id !== this.#running?.job.id) return;
    if (answer.outcome === "failed") this.#endRunning({ kind: "broken" });
    else this.#settle({ kind: "solved", solution: answer.solution });
  }

  /** Ends the worker with what it is doing. */
  #endRunning(outcome: LiveOutcome): void {
    this.#worker?.terminate();
    this.#worker = null;
    this.#settle(outcome);
  }

  #settle(outcome: LiveOutcome): void {
    const done = this.#running;
    this.#running = null;
    if (done) clearTimeout(done.limit);
    done?.answer(outcome);
    this.#startNext();
  }
}
