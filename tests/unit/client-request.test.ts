import { createServer, type IncomingMessage, type Server, type ServerResponse } from "node:http";
import type { AddressInfo } from "node:net";
import { afterAll, beforeAll, expect, test } from "vitest";
import { newKey, RequestProblem, request } from "@/lib/client/request";

let server: Server;
let base: string;
let respond: (asked: IncomingMessage & { text: string }, reply: ServerResponse) => void;

beforeAll(async () => {
  server = createServer(async (asked, reply) => {
    const parts: Buffer[] = [];
    for await (const part of asked) parts.push(part);
    respond(Object.assign(asked, { text: Buffer.concat(parts).toString() }), reply);
  });
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  base = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
});
afterAll(() => new Promise((resolve) => server.close(resolve)));

const refusal = (promise: Promise<unknown>) =>
  promise.then(
    () => undefined,
    (error: unknown) => error,
  );
const problem = {
  type: "/docs/problems#invalid",
  title: "Some values cannot be taken",
  status: 422,
  detail: "Some of what was sent cannot be taken as it is.",
  instance: "/api/v1/plants",
  code: "invalid",
  requestId: "request-1",
  errors: [
    { pointer: "/name", detail: "Write a name here" },
    { pointer: "/content/A/0/1", detail: "An entry has at most 200 characters" },
  ],
};

test("a change sends its version, key and JSON, and gets data, version and location", async () => {
  let seen: unknown;
  respond = (asked, reply) => {
    const { "if-match": match, "idempotency-key": key, "content-type": type } = asked.headers;
    seen = { method: asked.method, url: asked.url, match, key, type, text: asked.text };
    reply
      .writeHead(201, { "content-type": "application/json", etag: '"8.0123456789abcdef"', location: "/api/v1/plants/p" })
      .end('{"id":"p"}');
  };
  const query = { limit: 5, search: "a&b", none: undefined };
  const reply = await request("/api/v1/plants", {
    base,
    method: "POST",
    query,
    body: { name: "x" },
    version: 7,
    key: "key-12345",
  });
  expect(reply).toEqual({ data: { id: "p" }, version: 8, location: "/api/v1/plants/p" });
  const url = "/api/v1/plants?limit=5&search=a%26b";
  expect(seen).toEqual({ method: "POST", url, match: '"7"', key: "key-12345", type: "application/json", text: '{"name":"x"}' });
});

test("a reply without a body gives no data", async () => {
  respond = (_, reply) => reply.writeHead(204).end();
  expect(await request("/x", { base, method: "DELETE" })).toEqual({ data: undefined, version: null, location: null });
});

test("a problem becomes an error that knows what to correct and where", async () => {
  respond = (_, reply) => reply.writeHead(422, { "content-type": "application/problem+json" }).end(JSON.stringify(problem));
  const error = await refusal(request("/x", { base }));
  if (!(error instanceof RequestProblem)) throw new Error("no problem");
  expect(error).toMatchObject({
    code: "invalid",
    status: 422,
    requestId: "request-1",
    message: problem.detail,
    needsSignIn: false,
  });
  expect(error.at("/name")).toEqual(["Write a name here"]);
  expect(error.at("/content")).toEqual(["An entry has at most 200 characters"]);
  expect(error.at("/cont")).toEqual([]);
});

test("an ended session, a stale version and a wait can be told apart", async () => {
  const sent = { ...problem, errors: undefined };
  const answers = [
    { ...sent, status: 401, code: "no-session" },
    { ...sent, status: 412, code: "stale-version", given: 3, current: 5 },
    { ...sent, status: 429, code: "too-many-requests", retryAfter: 12 },
  ];
  const errors: unknown[] = [];
  for (const answer of answers) {
    respond = (_, reply) =>
      reply.writeHead(answer.status, { "content-type": "application/problem+json" }).end(JSON.stringify(answer));
    errors.push(await refusal(request("/x", { base })));
  }
  expect(errors[0]).toMatchObject({ needsSignIn: true });
  expect(errors[1]).toMatchObject({ current: 5, needsSignIn: false });
  expect(errors[2]).toMatchObject({ retryAfter: 12 });
});

test.each([
  ["a page of a proxy", 502, "text/html", "<h1>Bad gateway</h1>"],
  ["a page where JSON was due", 200, "text/html", "<h1>Welcome</h1>"],
  ["broken JSON", 200, "application/json", '{"id":'],
])("%s is told in our words", async (_, status, type, text) => {
  respond = (_asked, reply) => reply.writeHead(status, { "content-type": type }).end(text);
  const error = await refusal(request("/x", { base }));
  expect(error).toMatchObject({ name: "RequestProblem", code: "unexpected-reply", status });
  expect(String(error)).not.toContain("<h1>");
});

test("a service that does not answer is offline, an abort stays an abort", async () => {
  expect(await refusal(request("/x", { base: "http://127.0.0.1:1" }))).toMatchObject({ code: "offline", status: 0 });
  const controller = new AbortController();
  respond = () => controller.abort(new Error("left the page"));
  expect(await refusal(request("/x", { base, signal: controller.signal }))).toMatchObject({ message: "left the page" });
});

test("keys for creates are long, plain and never the same", () => {
  const keys = new Set(Array.from({ length: 100 }, newKey));
  expect(keys.size).toBe(100);
  for (const key of keys) expect(key).toMatch(/^[0-9a-f]{32}$/);
});
