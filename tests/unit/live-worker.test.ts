import { afterEach, beforeEach, expect, test, vi } from "vitest";
import type { LiveAnswer, LiveJob, LiveSolution } from "@/components/designs/live/live-messages";
import { LiveWorker } from "@/components/designs/live/live-worker";
import type { Recipe } from "@/control/design/recipe";
import type { PlantModel } from "@/control/plant/model";

/** A worker that answers when it is told to. */
class HeldWorker extends EventTarget {
  static all: HeldWorker[] = [];
  readonly jobs: LiveJob[] = [];
  ended = false;
  constructor() {
    super();
    HeldWorker.all.push(this);
  }
  postMessage(job: LiveJob): void {
    this.jobs.push(job);
  }
  recipes(): Recipe[] {
    return this.jobs.flatMap((job) => (job.kind === "design" ? [job.recipe] : []));
  }
  terminate(): void {
    this.ended = true;
  }
  answer(solution: LiveSolution, id = this.jobs.at(-1)?.id ?? 0): void {
    this.tell({ id, outcome: "done", value: solution });
  }
  tell(data: LiveAnswer): void {
    this.dispatchEvent(new MessageEvent("message", { data }));
  }
}

const model = {} as PlantModel;
const recipe = (name: string) => ({ name }) as unknown as Recipe;
const design = (asked: Recipe) => ({ kind: "design", model, recipe: asked }) as const;
const solution = (milliseconds: number) => ({ milliseconds }) as LiveSolution;
const worker = (index: number) => HeldWorker.all[index];
let live: LiveWorker;

beforeEach(() => {
  vi.useFakeTimers();
  HeldWorker.all = [];
  live = new LiveWorker(() => new HeldWorker() as unknown as Worker);
});
afterEach(() => vi.useRealTimers());

test("of many requests the first and the newest are solved, those in between are dropped", async () => {
  const asked = ["a", "b", "c", "d"].map((name) => live.run(design(recipe(name))));
  expect(HeldWorker.all).toHaveLength(1);
  expect(worker(0).recipes()).toEqual([recipe("a")]);
  worker(0).answer(solution(1));
  expect(worker(0).recipes()).toEqual([recipe("a"), recipe("d")]);
  worker(0).answer(solution(2));
  expect(await Promise.all(asked)).toEqual([
    { kind: "done", value: solution(1) },
    { kind: "dropped" },
    { kind: "dropped" },
    { kind: "done", value: solution(2) },
  ]);
});

test("a worker that is at it for long is ended as soon as something newer is asked for", async () => {
  const long = live.run(design(recipe("long")));
  vi.advanceTimersByTime(1_000);
  const newer = live.run(design(recipe("newer")));
  expect(await long).toEqual({ kind: "dropped" });
  expect(worker(0).ended).toBe(true);
  worker(1).answer(solution(3));
  expect(await newer).toEqual({ kind: "done", value: solution(3) });
});

test("stop ends the worker at once, and the next request starts another", async () => {
  const stopped = [live.run(design(recipe("a"))), live.run(design(recipe("b")))];
  live.stop();
  expect(await Promise.all(stopped)).toEqual([{ kind: "dropped" }, { kind: "dropped" }]);
  expect(worker(0).ended).toBe(true);
  const next = live.run(design(recipe("c")));
  worker(1).answer(solution(4));
  expect(await next).toEqual({ kind: "done", value: solution(4) });
});

test("an answer to something that was dropped is not taken for the newest", async () => {
  void live.run(design(recipe("a")));
  const first = worker(0).jobs[0].id;
  worker(0).answer(solution(1));
  const second = live.run(design(recipe("b")));
  worker(0).answer(solution(9), first);
  worker(0).answer(solution(2));
  expect(await second).toEqual({ kind: "done", value: solution(2) });
});

test("a late failure of a worker that was ended does not end the one after it", async () => {
  void live.run(design(recipe("a")));
  live.stop();
  const next = live.run(design(recipe("b")));
  worker(0).dispatchEvent(new Event("error"));
  worker(1).answer(solution(5));
  expect(await next).toEqual({ kind: "done", value: solution(5) });
});

test("what takes half a minute is given up", async () => {
  const asked = live.run(design(recipe("endless")));
  vi.advanceTimersByTime(30_000);
  expect(await asked).toEqual({ kind: "too-long" });
  expect(worker(0).ended).toBe(true);
});

test("a browser without workers, a worker that fails to load and one that fails in its work are said to be broken", async () => {
  const without = new LiveWorker(() => {
    throw new Error("no workers here");
  });
  expect(await without.run(design(recipe("a")))).toEqual({ kind: "broken" });
  const unloaded = live.run(design(recipe("b")));
  worker(0).dispatchEvent(new Event("error"));
  expect(await unloaded).toEqual({ kind: "broken" });
  const failing = live.run(design(recipe("c")));
  worker(1).tell({ id: worker(1).jobs[0].id, outcome: "failed", message: "a fault of ours" });
  expect(await failing).toEqual({ kind: "broken" });
});

test("work of many parts tells how far it is, and its value once", async () => {
  const seen: number[] = [];
  const asked = live.run({ kind: "figures", model, recipes: [recipe("a"), recipe("b")] }, (done) => seen.push(done));
  const { id } = worker(0).jobs[0];
  worker(0).tell({ id, outcome: "progress", done: 1 });
  worker(0).tell({ id, outcome: "progress", done: 2 });
  worker(0).tell({ id, outcome: "done", value: [] });
  expect(seen).toEqual([1, 2]);
  expect(await asked).toEqual({ kind: "done", value: [] });
});
