// @vitest-environment happy-dom
import { act, StrictMode, useMemo, useState } from "react";
import { createRoot, type Root } from "react-dom/client";
import { afterEach, beforeEach, expect, test, vi } from "vitest";
import type { RecipeDraft } from "@/components/designs/drafts/draft-store";
import { type Drafting, useKeptDraft } from "@/components/designs/drafts/use-kept-draft";
import type { RecipeForm } from "@/components/designs/recipe/recipe-form";
import type { Draft, KeepDraft } from "@/lib/schemas/draft";

// React's own switch for tests that drive it with act().
Object.assign(globalThis, { IS_REACT_ACT_ENVIRONMENT: true });

/** As much of a form as a text has; nothing here looks into it. */
const formOf = (text: string) => ({ reasons: { weights: text } }) as unknown as RecipeForm;
const STORED = formOf("stored");

/** The address of the API, as the service answers it. */
const server = { draft: null as Draft | null, reachable: true, puts: 0 };
const json = (status: number, body: unknown) =>
  new Response(status === 204 ? null : JSON.stringify(body), {
    status,
    headers: { "content-type": status < 400 ? "application/json" : "application/problem+json" },
  });
const stale = () => json(412, { code: "stale-version", status: 412, title: "", detail: "" });

async function answer(address: string, { method = "GET", body }: RequestInit = {}): Promise<Response> {
  await new Promise((resolve) => setTimeout(resolve, 30));
  if (!server.reachable) throw new TypeError("Failed to fetch");
  const { draft } = server;
  if (method === "GET") return json(200, { draft });
  if (method === "DELETE") {
    if (draft && !new URL(address, "http://localhost").searchParams.get("marks")?.includes(draft.mark)) return stale();
    server.draft = null;
    return json(204, null);
  }
  server.puts += 1;
  const { replaces = [], ...sent } = JSON.parse(String(body)) as KeepDraft;
  if (draft && !replaces.includes(draft.mark)) return stale();
  server.draft = { ...sent, updatedAt: new Date().toISOString() };
  return json(200, { mark: sent.mark, updatedAt: server.draft.updatedAt });
}

type Page = {
  text: string;
  found: RecipeDraft | null;
  drafting: Drafting;
  type: (text: string) => Promise<void>;
  save: () => Promise<void>;
};
const roots: Root[] = [];

function Bench({ page }: Readonly<{ page: Partial<Page> }>) {
  const [{ form, edited }, set] = useState({ form: STORED, edited: false });
  const unsaved = useMemo(() => (form === STORED ? null : { form, plantRevisionId: "p1", base: null }), [form]);
  const { drafting } = useKeptDraft({
    ...{ key: "gainwright:design:kept", subject: { plantId: "p", subjectId: "s" }, active: true, unsaved, edited },
    onFound: (draft) => {
      page.found = draft;
      set({ form: draft.form, edited: false });
    },
  });
  const { reasons } = form;
  page.text = reasons.weights;
  page.drafting = drafting;
  page.type = async (text) => act(async () => set({ form: formOf(text), edited: true }));
  page.save = async () => act(async () => set({ form: STORED, edited: false }));
  return null;
}

const pass = (ms: number) => act(() => vi.advanceTimersByTimeAsync(ms));

/** Opens a page and waits for what the server says, unless told otherwise. */
async function open(ms = 100): Promise<Page> {
  const page: Partial<Page> = { found: null };
  const root = createRoot(document.createElement("div"));
  roots.push(root);
  await act(async () =>
    root.render(
      <StrictMode>
        <Bench page={page} />
      </StrictMode>,
    ),
  );
  await pass(ms);
  return page as Page;
}

const serverText = () => (server.draft?.form as { reasons?: { weights: string } } | undefined)?.reasons?.weights;

beforeEach(() => {
  vi.useFakeTimers({ now: Date.parse("2031-04-05T06:07:08Z") });
  vi.stubGlobal("fetch", answer);
  localStorage.clear();
  Object.assign(server, { draft: null, reachable: true, puts: 0 });
});
afterEach(async () => {
  for (const root of roots.splice(0)) await act(async () => root.unmount());
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

test("what is typed is in this browser at once, on the server within two seconds, and back on the next page", async () => {
  const page = await open();
  await page.type("half");
  expect(page.drafting.state).toBe("waiting");
  await pass(400);
  expect(localStorage.getItem("gainwright:design:kept")).toContain("half");
  await pass(1_600);
  expect([serverText(), page.drafting.state]).toEqual(["half", "saved"]);
  // The first page is not closed: it was killed.
  const again = await open();
  expect([again.text, again.found?.where, again.drafting.other]).toEqual(["half", "server", null]);
});

test("another browser, which kept nothing, is given the server's", async () => {
  await (await open()).type("half");
  await pass(2_000);
  localStorage.clear();
  expect((await open()).text).toBe("half");
});

test("without a connection the browser's copy comes back at once and goes to the server when the network returns", async () => {
  const page = await open();
  server.reachable = false;
  await page.type("in the tunnel");
  await pass(5_000);
  expect([page.drafting.state, page.drafting.keptHere, serverText()]).toEqual(["offline", true, undefined]);
  const again = await open(0);
  expect([again.text, again.found?.where]).toEqual(["in the tunnel", "browser"]);
  server.reachable = true;
  await act(async () => window.dispatchEvent(new Event("online")));
  await pass(2_000);
  expect([serverText(), again.drafting.state]).toEqual(["in the tunnel", "saved"]);
});

test("once it is saved, nothing is left in either place", async () => {
  const page = await open();
  await page.type("done");
  await pass(2_000);
  await page.save();
  await pass(100);
  expect([server.draft, localStorage.getItem("gainwright:design:kept")]).toEqual([null, null]);
  expect((await open()).found).toBeNull();
});

test("what was saved in another browser does not come back here", async () => {
  await (await open()).type("done elsewhere");
  await pass(2_000);
  server.draft = null;
  expect((await open()).found).toBeNull();
  expect(localStorage.getItem("gainwright:design:kept")).toBeNull();
});

test("of two pages neither writes over the other: the later one is told, and shows or replaces the other's", async () => {
  const [one, two] = [await open(), await open()];
  await one.type("one");
  await pass(2_000);
  await two.type("two");
  await pass(2_000);
  expect([serverText(), two.text, two.drafting.state]).toEqual(["one", "two", "elsewhere"]);
  const { other } = two.drafting;
  expect(other?.draft.form.reasons.weights).toBe("one");
  if (other) await act(async () => two.drafting.decide(false, other));
  await pass(2_000);
  expect([serverText(), two.drafting.state, two.drafting.other]).toEqual(["two", "saved", null]);
  await one.type("one again");
  await pass(2_000);
  const { other: theirs } = one.drafting;
  if (theirs) await act(async () => one.drafting.decide(true, theirs));
  await pass(2_000);
  expect([one.text, serverText(), one.drafting.state]).toEqual(["two", "two", "saved"]);
});

test("somebody who types before the server's draft arrives keeps what they typed and is offered the draft", async () => {
  await (await open()).type("yesterday");
  await pass(2_000);
  localStorage.clear();
  const page = await open(0);
  await page.type("today");
  await pass(3_000);
  expect([page.text, page.drafting.other?.draft.form.reasons.weights, serverText()]).toEqual(["today", "yesterday", "yesterday"]);
});

test("leaving asks only while the work is neither here nor on the server", async () => {
  const asks = () => {
    const event = new Event("beforeunload", { cancelable: true });
    act(() => void window.dispatchEvent(event));
    return event.defaultPrevented;
  };
  const page = await open();
  expect(asks()).toBe(false);
  await page.type("kept here");
  expect(asks()).toBe(false);
  const full = () => {
    throw new DOMException("full", "QuotaExceededError");
  };
  vi.stubGlobal("localStorage", { getItem: () => null, setItem: full, removeItem: () => undefined });
  server.reachable = false;
  await page.type("nowhere");
  await pass(3_000);
  expect([asks(), page.drafting.keptHere]).toEqual([true, false]);
  server.reachable = true;
  await pass(5_000);
  expect([asks(), page.drafting.state]).toEqual([false, "saved"]);
});
