import { afterEach, beforeEach, describe, expect, test, vi } from "vitest";
import { APART_MS, Autosave, type AutosaveStatus, SOON_MS } from "@/components/designs/drafts/autosave";
import { noConnection, RequestProblem } from "@/lib/client/request";

type Content = { readonly text: string };
type Write = { readonly at: number; readonly text: string; readonly mark: string; readonly replaces: readonly string[] };

const problem = (status: number, code: string, more: { retryAfter?: number } = {}) =>
  new RequestProblem({ status, code, title: "", detail: "", ...more });

/** A server that keeps one draft as ours does, and can be cut off. */
class Fake {
  readonly writes: Write[] = [];
  readonly removals: (readonly string[])[] = [];
  readonly statuses: AutosaveStatus[] = [];
  mark: string | null = null;
  text: string | null = null;
  takesMs = 50;
  atOnce = 0;
  most = 0;
  /** Thrown before anything is stored; `lost` is thrown afterwards, when only the answer went missing. */
  refusal: Error | null = null;
  lost = false;
  private count = 0;

  readonly autosave = new Autosave<Content>(
    {
      newMark: () => `m${++this.count}`,
      keep: async (content, mark, replaces) => {
        this.writes.push({ at: Date.now(), text: content.text, mark, replaces });
        await this.working();
        if (this.mark !== null && this.mark !== mark && !replaces.includes(this.mark)) throw problem(412, "stale-version");
        [this.mark, this.text] = [mark, content.text];
        if (this.lost) throw noConnection();
      },
      remove: async (marks) => {
        this.removals.push(marks);
        await this.working();
        if (this.mark !== null && !marks.includes(this.mark)) throw problem(412, "stale-version");
        [this.mark, this.text] = [null, null];
      },
    },
    (status) => this.statuses.push(status),
  );

  get state() {
    return this.statuses.at(-1)?.state ?? "nothing";
  }

  private async working(): Promise<void> {
    this.most = Math.max(this.most, ++this.atOnce);
    await new Promise((resolve) => setTimeout(resolve, this.takesMs));
    this.atOnce -= 1;
    if (this.refusal) throw this.refusal;
  }
}

let fake: Fake;
beforeEach(() => {
  vi.useFakeTimers({ now: 0 });
  fake = new Fake();
});
afterEach(() => {
  vi.useRealTimers();
});
const pass = (ms: number) => vi.advanceTimersByTimeAsync(ms);
const texts = () => fake.writes.map(({ text }) => text);
const began = () => fake.writes.map(({ at }) => at);

/** A key every 100 ms. */
async function type(keys: number, from = 0): Promise<void> {
  for (let key = 0; key < keys; key++) {
    fake.autosave.offer({ text: String(from + key) });
    await pass(100);
  }
}

describe("while somebody types", () => {
  test("the newest is on the server within two seconds of the last key, and writes keep their distance", async () => {
    fake.autosave.release([]);
    await type(80);
    const lastKey = Date.now() - 100;
    while (fake.state !== "saved") await pass(10);
    expect(Date.now() - lastKey).toBeLessThanOrEqual(2_000);
    expect(fake.text).toBe("79");
    const gaps = began()
      .slice(1)
      .map((at, i) => at - began()[i]);
    expect(Math.min(...gaps)).toBeGreaterThanOrEqual(APART_MS);
    expect(fake.writes.length).toBeLessThanOrEqual(7);
  });

  test("one request runs at a time, however slow, and what was overtaken is never sent", async () => {
    fake.takesMs = 4_000;
    fake.autosave.release([]);
    await type(50);
    await pass(20_000);
    expect(fake.most).toBe(1);
    expect(texts().length).toBeLessThanOrEqual(3);
    expect([fake.text, fake.state]).toEqual(["49", "saved"]);
  });

  test("nothing is sent before it is known what the server has", async () => {
    fake.mark = "theirs";
    fake.autosave.offer({ text: "a" });
    await pass(60_000);
    expect(fake.writes).toEqual([]);
    fake.autosave.release(["theirs"]);
    await pass(SOON_MS + 50);
    expect(fake.writes[0].replaces).toEqual(["theirs"]);
    expect(fake.state).toBe("saved");
  });

  test("the same content is sent once", async () => {
    const content = { text: "a" };
    fake.autosave.release([]);
    fake.autosave.offer(content);
    await pass(5_000);
    fake.autosave.offer(content);
    fake.autosave.tryNow();
    await pass(5_000);
    expect(texts()).toEqual(["a"]);
  });
});

describe("without a connection", () => {
  test("tries again after 1, 2, 4 … 30 s", async () => {
    fake.takesMs = 0;
    fake.refusal = noConnection();
    fake.autosave.release([]);
    fake.autosave.offer({ text: "a" });
    await pass(200_000);
    const pauses = began()
      .slice(1)
      .map((at, i) => Math.round((at - began()[i]) / 1_000));
    expect(pauses.slice(0, 8)).toEqual([1.5, 2, 4, 8, 16, 30, 30, 30].map(Math.round));
    expect(fake.state).toBe("offline");
    fake.refusal = null;
    await pass(31_000);
    expect([fake.text, fake.state]).toEqual(["a", "saved"]);
  });

  test("typing does not shorten the pause, and the network's return ends it at once with the newest alone", async () => {
    fake.refusal = noConnection();
    fake.autosave.release([]);
    await type(400);
    const tried = fake.writes.length;
    expect(tried).toBeLessThanOrEqual(7);
    fake.refusal = null;
    fake.autosave.tryNow();
    await pass(SOON_MS + APART_MS);
    expect(texts().slice(tried)).toEqual(["399"]);
    expect(fake.state).toBe("saved");
  });

  test("a write whose answer was lost is replaced by the next one", async () => {
    fake.lost = true;
    fake.autosave.release([]);
    fake.autosave.offer({ text: "a" });
    await pass(SOON_MS + 60);
    expect([fake.text, fake.state]).toEqual(["a", "offline"]);
    fake.lost = false;
    fake.autosave.offer({ text: "b" });
    await pass(5_000);
    expect([fake.text, fake.state]).toEqual(["b", "saved"]);
  });

  test("many lost answers are all remembered in few marks, the first known one among them", async () => {
    fake.mark = "first";
    fake.autosave.release(["first"]);
    fake.refusal = noConnection();
    fake.autosave.offer({ text: "a" });
    await pass(1_200_000);
    expect(fake.writes.length).toBeGreaterThan(30);
    for (const { replaces } of fake.writes) {
      expect(replaces.length).toBeLessThanOrEqual(16);
      expect(replaces[0]).toBe("first");
    }
    fake.refusal = null;
    await pass(31_000);
    expect([fake.text, fake.state]).toEqual(["a", "saved"]);
  });
});

describe("what the server refuses", () => {
  test("a newer draft of another page stops writing until somebody decides, whatever is typed", async () => {
    fake.mark = "theirs";
    fake.autosave.release([]);
    await type(30);
    expect([fake.state, fake.writes.length]).toEqual(["elsewhere", 1]);
    await type(30, 30);
    expect(fake.writes.length).toBe(1);
    fake.autosave.release(["theirs"]);
    await pass(3_000);
    expect([fake.text, fake.state]).toEqual(["59", "saved"]);
  });

  test("what is never taken is not sent again, but the next content is", async () => {
    fake.refusal = problem(413, "too-large");
    fake.autosave.release([]);
    fake.autosave.offer({ text: "large" });
    await pass(120_000);
    expect([fake.state, fake.writes.length]).toEqual(["refused", 1]);
    fake.refusal = null;
    fake.autosave.offer({ text: "small" });
    await pass(2_000);
    expect(fake.state).toBe("saved");
  });

  test("too many requests are tried again when the server says", async () => {
    fake.refusal = problem(429, "too-many-requests", { retryAfter: 20 });
    fake.autosave.release([]);
    fake.autosave.offer({ text: "a" });
    await pass(15_000);
    expect([fake.state, fake.writes.length]).toEqual(["failing", 1]);
    fake.refusal = null;
    await pass(10_000);
    expect(fake.state).toBe("saved");
  });
});

describe("once nothing is unsaved", () => {
  test("the server's draft is removed at once, after a write that is still under way", async () => {
    fake.takesMs = 500;
    fake.autosave.release([]);
    fake.autosave.offer({ text: "a" });
    await pass(SOON_MS + 100);
    fake.autosave.offer(null);
    fake.autosave.stop();
    await pass(2_000);
    expect([fake.mark, fake.removals.length, fake.state]).toEqual([null, 1, "nothing"]);
  });

  test("nothing is asked of the server where it never had anything", async () => {
    fake.autosave.release([]);
    fake.autosave.offer({ text: "a" });
    fake.autosave.offer(null);
    await pass(5_000);
    expect([fake.writes, fake.removals]).toEqual([[], []]);
  });

  test("a newer draft of another page stays", async () => {
    fake.autosave.release(["mine"]);
    fake.autosave.offer({ text: "a" });
    fake.mark = "theirs";
    fake.autosave.offer(null);
    await pass(60_000);
    expect([fake.mark, fake.removals.length]).toEqual(["theirs", 1]);
  });
});

test("a page that is left sends what is due once more and then rests", async () => {
  fake.autosave.release([]);
  fake.autosave.offer({ text: "a" });
  fake.refusal = noConnection();
  fake.autosave.stop();
  await pass(120_000);
  expect(texts()).toEqual(["a"]);
});

test("what is told knows the mark of a write before it is sent, and whether the newest is stored", async () => {
  fake.autosave.release(["old"]);
  fake.mark = "old";
  fake.autosave.offer({ text: "a" });
  await pass(5_000);
  const told = fake.statuses.map(({ state, marks, synced }) => [state, marks.join(" "), synced]);
  expect(told).toEqual([
    ["nothing", "old", false],
    ["waiting", "old", false],
    ["saving", "old m1", false],
    ["saved", "m1", true],
  ]);
});
