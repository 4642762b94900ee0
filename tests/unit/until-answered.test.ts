import { afterEach, beforeEach, expect, test, vi } from "vitest";
import { untilAnswered } from "@/components/designs/saving/until-answered";
import { noConnection, RequestProblem } from "@/lib/client/request";

let page: EventTarget;
beforeEach(() => {
  vi.useFakeTimers({ now: 0 });
  page = new EventTarget();
  vi.stubGlobal("window", page);
});
afterEach(() => {
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

/** Sends that find no connection until `answer` is set. */
function cutOff() {
  const stop = new AbortController();
  const told: boolean[] = [];
  const sent: number[] = [];
  const line: { answer: string | RequestProblem | null } = { answer: null };
  const outcome = untilAnswered(
    async () => {
      sent.push(Date.now());
      if (line.answer === null) throw noConnection();
      if (line.answer instanceof RequestProblem) throw line.answer;
      return line.answer;
    },
    { signal: stop.signal, onWaiting: (waiting) => told.push(waiting) },
  ).catch((error: RequestProblem) => error.code);
  return { stop, told, sent, line, outcome };
}

test("what is saved without a connection is sent again with growing pauses until it is answered", async () => {
  const { told, sent, line, outcome } = cutOff();
  await vi.advanceTimersByTimeAsync(100_000);
  expect(sent).toEqual([0, 1, 3, 7, 15, 31, 61, 91].map((seconds) => 1_000 * seconds));
  line.answer = "saved";
  await vi.advanceTimersByTimeAsync(30_000);
  expect(await outcome).toBe("saved");
  expect([told[0], told.at(-1)]).toEqual([true, false]);
});

test("the network's return sends it at once", async () => {
  const { sent, line, outcome } = cutOff();
  await vi.advanceTimersByTimeAsync(20_000);
  line.answer = "saved";
  page.dispatchEvent(new Event("online"));
  await vi.advanceTimersByTimeAsync(0);
  expect(await outcome).toBe("saved");
  expect(sent.at(-1)).toBe(20_000);
});

test("given up, it ends with the refusal and is never sent again", async () => {
  const { stop, sent, outcome } = cutOff();
  await vi.advanceTimersByTimeAsync(4_000);
  stop.abort();
  expect(await outcome).toBe("offline");
  await vi.advanceTimersByTimeAsync(100_000);
  expect(sent.length).toBe(3);
});

test("a refusal that was answered is not sent again", async () => {
  const { sent, line, outcome } = cutOff();
  line.answer = new RequestProblem({ status: 412, code: "stale-version", title: "", detail: "" });
  await vi.advanceTimersByTimeAsync(1_000);
  expect(await outcome).toBe("stale-version");
  expect(sent.length).toBe(2);
});
