import { expect, test } from "vitest";
import { NumericalError } from "@/control/errors";
import { PROBLEMS, type ProblemCode } from "@/lib/api/problem-catalogue";
import { problemOf, problemReply } from "@/lib/api/problems";
import { DomainError, NotFound, StaleVersion } from "@/lib/errors";
import { Problem } from "@/lib/schemas/problem";

const mapped = (error: unknown) => problemOf(error, "request-1", "/api/v1/plants");
const entries = Object.entries(PROBLEMS) as [ProblemCode, (typeof PROBLEMS)[ProblemCode]][];

test.each(entries)("%s has a title, a meaning and a next step in whole sentences, without its raw code", (code, entry) => {
  expect(entry.title).toMatch(/^[A-Z][^.]*[^.]$/);
  for (const sentence of [entry.meaning, entry.nextStep]) expect(sentence).toMatch(/^[A-Z].*\.$/s);
  if (code.includes("-")) for (const text of Object.values(entry)) expect(String(text)).not.toContain(code);
  expect(entry.status).toBeGreaterThanOrEqual(400);
});

test.each([
  ["unreadable", 400],
  ["no-session", 401],
  ["forbidden", 403],
  ["not-found", 404],
  ["conflict", 409],
  ["stale-version", 412],
  ["too-large", 413],
  ["not-json", 415],
  ["invalid", 422],
  ["unsolvable", 422],
  ["precondition-required", 428],
  ["too-many-requests", 429],
  ["busy", 503],
  ["unavailable", 503],
] as const)("the refusal %s is answered %i with the message of the service", (code, status) => {
  const problem = mapped(new DomainError(code, "Said by the service."));
  expect(problem).toMatchObject({ code, status, detail: "Said by the service.", type: `/docs/problems#${code}` });
  expect(Problem.parse(problem)).toEqual(problem);
});

test("a refusal of the core is answered 422 with its code and its facts, without those that are no finite numbers", () => {
  const nested = { re: 0, im: Number.NEGATIVE_INFINITY };
  const facts = { pole: { re: 1, im: 0 }, state: 2, distance: Number.NaN, left: undefined, nested, limits: [1, Number.NaN] };
  const error = new NumericalError("not-stabilizable", facts);
  expect(error.data).toEqual({ pole: { re: 1, im: 0 }, state: 2, left: undefined });
  const problem = mapped(error);
  expect(problem).toMatchObject({ code: "not-stabilizable", status: 422, type: "/docs/problems#not-stabilizable" });
  expect(problem.data).toStrictEqual({ pole: { re: 1, im: 0 }, state: 2 });
  expect(problem.detail).toBe(PROBLEMS["not-stabilizable"].meaning);
});

test("a refusal that a service put into the plant's words keeps them, under the core's code", () => {
  const error = new DomainError("unsolvable", "No input moves the beam's sway.", {
    code: "not-stabilizable",
    data: { state: 2 },
  });
  expect(mapped(error)).toMatchObject({
    code: "not-stabilizable",
    detail: "No input moves the beam's sway.",
    data: { state: 2 },
  });
  expect(mapped(new DomainError("unsolvable", "x", { code: "__proto__" })).code).toBe("unsolvable");
});

test("places to correct, both versions and the wait are told", () => {
  const issues = [{ pointer: "/A/0/1", detail: "A finite number is needed here" }];
  expect(mapped(new DomainError("invalid", "x", {}, issues)).errors).toEqual(issues);
  expect(mapped(new StaleVersion(3, 5))).toMatchObject({ given: 3, current: 5 });
  const reply = problemReply(mapped(new DomainError("too-many-requests", "x", { retryAfter: 12.2 })));
  expect(reply.headers.get("retry-after")).toBe("13");
  expect(problemReply(mapped(new StaleVersion(3, 5))).headers.get("etag")).toBe('"5"');
  expect(problemReply(mapped(new NotFound("Plant"))).headers.get("content-type")).toBe("application/problem+json");
});

test.each([
  ["a refused connection", Object.assign(new Error("connect"), { code: "ECONNREFUSED", syscall: "connect" })],
  ["an administrator's shutdown", Object.assign(new Error("terminating"), { code: "57P01" })],
  ["a server that starts up", Object.assign(new Error("starting"), { code: "57P03" })],
  ["too many clients", Object.assign(new Error("too many"), { code: "53300" })],
  ["a statement that took too long", Object.assign(new Error("cancel"), { code: "57014" })],
  ["an empty pool", new Error("timeout exceeded when trying to connect")],
  ["a cut connection", new Error("Connection terminated unexpectedly")],
])("%s, also wrapped by the query layer, is answered 503 with a wait and without its words", (_, cause) => {
  for (const error of [cause, new Error("Failed query: select secret", { cause })]) {
    const problem = mapped(error);
    expect(problem).toMatchObject({ code: "unavailable", status: 503, detail: PROBLEMS.unavailable.meaning });
    expect(problem.retryAfter).toBeGreaterThan(0);
  }
});

test.each([
  ["an error", new Error("relation secret_table does not exist at /srv/app.ts")],
  ["a missing file", Object.assign(new Error("open"), { code: "ENOENT", syscall: "open" })],
  ["a broken constraint", Object.assign(new Error("duplicate key"), { code: "23505" })],
  ["a text", "secret_table"],
  ["nothing", undefined],
])("%s that nobody expected shows nothing but the request id", (_, error) => {
  const problem = mapped(error);
  expect(problem).toEqual({
    type: "/docs/problems#internal",
    title: PROBLEMS.internal.title,
    status: 500,
    detail: PROBLEMS.internal.meaning,
    instance: "/api/v1/plants",
    code: "internal",
    requestId: "request-1",
  });
});
