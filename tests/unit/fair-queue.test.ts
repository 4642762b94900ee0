import { expect, test } from "vitest";
import { FairQueue } from "@/lib/jobs/fair-queue";

const limits = { running: 2, waiting: 3, waitingInAll: 7 };
const task = (teamId: string, name: string) => ({ teamId, name });

test("teams take turns, each in the order of its own line", () => {
  const queue = new FairQueue<ReturnType<typeof task>>(limits);
  for (const name of ["a1", "a2", "a3"]) queue.join(task("a", name));
  for (const name of ["b1", "b2"]) queue.join(task("b", name));
  const names: string[] = [];
  for (let next = queue.next(); next; next = queue.next()) {
    names.push(next.name);
    queue.finished(next.teamId);
  }
  expect(names).toEqual(["a1", "b1", "a2", "b2", "a3"]);
});

test("a team runs no more at once than its share, and its line waits", () => {
  const queue = new FairQueue<ReturnType<typeof task>>(limits);
  for (const name of ["a1", "a2", "a3"]) queue.join(task("a", name));
  expect([queue.next()?.name, queue.next()?.name, queue.next()?.name]).toEqual(["a1", "a2", undefined]);
  queue.finished("a");
  expect(queue.next()?.name).toBe("a3");
});

test("a full line turns the next one away, and so does a full queue", () => {
  const queue = new FairQueue<ReturnType<typeof task>>(limits);
  expect(["1", "2", "3", "4"].map((name) => queue.join(task("a", name)))).toEqual([true, true, true, false]);
  expect(["1", "2", "3"].map((name) => queue.join(task("b", name)))).toEqual([true, true, true]);
  expect(["1", "2"].map((name) => queue.join(task("c", name)))).toEqual([true, false]);
});

test("who leaves the line is not served and makes room", () => {
  const queue = new FairQueue<ReturnType<typeof task>>(limits);
  const [first, second, third] = ["1", "2", "3"].map((name) => task("a", name));
  for (const one of [first, second, third]) queue.join(one);
  expect(queue.leave(second)).toBe(true);
  expect(queue.leave(second)).toBe(false);
  expect(queue.join(task("a", "4"))).toBe(true);
  expect(queue.next()).toBe(first);
  expect(queue.leave(first)).toBe(false);
  expect(queue.next()).toBe(third);
});
