import { fileURLToPath } from "node:url";
import { afterEach, beforeEach, expect, test } from "vitest";
import type { PlantModel } from "@/control/plant/model";
import type { ChecksJob } from "@/lib/jobs/numeric-job";
import { NumericPool } from "@/lib/jobs/numeric-pool";

const script = fileURLToPath(new URL("../helpers/odd-worker.mjs", import.meta.url));
const team = { teamId: "team-1" };

/** What the odd worker is to do stands where a plant stands; the pool never looks at it. */
const job = (deed: string | number): ChecksJob => ({ kind: "checks", model: deed as unknown as PlantModel });

let pool: NumericPool;
beforeEach(() => {
  pool = new NumericPool(2, script);
});
afterEach(() => pool.close());

test("a job is answered, and the same thread takes the next one", async () => {
  expect(await pool.run(job("first"), team)).toEqual({ answered: "first" });
  expect(await pool.run(job("second"), team)).toEqual({ answered: "second" });
});

test("a refusal of the core arrives as the error it was, with code and data", async () => {
  const refusal = await pool.run(job("refuse"), team).catch((error: unknown) => error);
  expect(refusal).toMatchObject({ name: "NumericalError", code: "pole-count", data: { expected: 4, given: 3 } });
});

test("an endless computation is stopped at its time limit with a typed refusal, and the pool goes on", async () => {
  const before = performance.now();
  const refusal = await pool.run(job("endless"), { ...team, timeoutMs: 150 }).catch((error: unknown) => error);
  expect(refusal).toMatchObject({
    name: "DomainError",
    code: "unsolvable",
    data: { code: "time-limit", data: { seconds: 0.15 } },
  });
  expect(performance.now() - before).toBeLessThan(5_000);
  expect(await pool.run(job("after"), team)).toEqual({ answered: "after" });
});

test("a thread that ends or throws fails its own job only, and a new one takes its place", async () => {
  await expect(pool.run(job("crash"), team)).rejects.toThrow("ended while it computed");
  await expect(pool.run(job("throw"), team)).rejects.toThrow("a fault of the worker");
  await expect(pool.run(job("fail"), team)).rejects.toThrow("a fault of the core");
  const answers = await Promise.all(["a", "b", "c"].map((name) => pool.run(job(name), team)));
  expect(answers).toEqual([{ answered: "a" }, { answered: "b" }, { answered: "c" }]);
});

test("a computation that devours memory is refused, and the process lives on", async () => {
  const refusal = await pool.run(job("devour"), team).catch((error: unknown) => error);
  expect(refusal).toMatchObject({ name: "DomainError", code: "unsolvable", data: { code: "too-large" } });
  expect(await pool.run(job("after"), team)).toEqual({ answered: "after" });
});

test("ten jobs of a team wait behind two running ones; the next is told to come again", async () => {
  const jobs = Array.from({ length: 12 }, () => pool.run(job(20), team));
  await expect(pool.run(job(20), team)).rejects.toMatchObject({ code: "busy", data: { retryAfter: expect.any(Number) } });
  expect(await pool.run(job("other team"), { teamId: "team-2" })).toEqual({ answered: "other team" });
  expect(await Promise.all(jobs)).toHaveLength(12);
});

test("another team's job does not wait for the whole line of a busy team", async () => {
  const order: string[] = [];
  const busy = Array.from({ length: 8 }, () => pool.run(job(30), team).then(() => order.push("busy team")));
  const other = pool.run(job(30), { teamId: "team-2" }).then(() => order.push("other team"));
  await Promise.all([...busy, other]);
  expect(order.indexOf("other team")).toBeLessThanOrEqual(3);
});

test("an aborted job frees its place, whether it waits or runs", async () => {
  const [running, waiting] = [new AbortController(), new AbortController()];
  const first = pool.run(job("endless"), { ...team, signal: running.signal }).catch((error: unknown) => error);
  const second = pool
    .run(job("endless"), { ...team, timeoutMs: 10_000, signal: running.signal })
    .catch((error: unknown) => error);
  const third = pool.run(job("never"), { ...team, signal: waiting.signal }).catch((error: unknown) => error);
  waiting.abort(new Error("left the line"));
  expect(await third).toMatchObject({ message: "left the line" });
  running.abort(new Error("left the bench"));
  expect(await first).toMatchObject({ message: "left the bench" });
  expect(await second).toMatchObject({ message: "left the bench" });
  expect(await pool.run(job("after"), team)).toEqual({ answered: "after" });
  await expect(pool.run(job("late"), { ...team, signal: running.signal })).rejects.toThrow("left the bench");
});

test("closing ends every thread and answers whoever runs or waits", async () => {
  const jobs = Array.from({ length: 4 }, () => pool.run(job("endless"), team).catch((error: unknown) => error));
  await pool.close();
  for (const answer of await Promise.all(jobs)) expect(answer).toMatchObject({ code: "busy" });
});
