import { gzipSync } from "node:zlib";
import { beforeAll, expect, test } from "vitest";
import { z } from "zod";
import { closePool } from "@/db/client";
import { route } from "@/lib/api/route";
import { call, problemIn, signedIn } from "../helpers/call-route";
import { newTeam } from "../helpers/people";
import { testDatabase } from "../helpers/test-database";

await testDatabase();
let headers: Record<string, string>;
beforeAll(async () => {
  headers = await signedIn(await newTeam());
  return closePool;
});

const Named = z.strictObject({ name: z.string().max(2_000_000), tags: z.record(z.string(), z.unknown()).optional() });
const take = route({ summary: "Take a name", body: Named, reply: z.strictObject({ length: z.int() }) }, async ({ body }) => ({
  body: { length: body.name.length },
}));
const send = (body: unknown, more: Record<string, string> = {}) =>
  call(take, { method: "POST", headers: { ...headers, ...more }, body });
const JSON_TYPE = { "content-type": "application/json" };

/** A body without a length that counts how much of it was asked for, and never ends by itself. */
function endless() {
  const state = { sent: 0, cancelled: false };
  const chunk = new Uint8Array(65_536).fill(0x20);
  const body = new ReadableStream<Uint8Array>({
    pull(controller) {
      state.sent += chunk.length;
      controller.enqueue(chunk);
    },
    cancel() {
      state.cancelled = true;
    },
  });
  return { body, state };
}

test("an ordinary body is taken, also without a length", async () => {
  expect((await send({ name: "gantry" })).status).toBe(200);
  const bytes = new TextEncoder().encode('{"name":"gantry"}');
  const body = new ReadableStream({
    start(controller) {
      for (const byte of bytes) controller.enqueue(new Uint8Array([byte]));
      controller.close();
    },
  });
  expect((await send(body, JSON_TYPE)).status).toBe(200);
});

test("reading stops at one megabyte, whatever the length header says", async () => {
  const lies: Record<string, string>[] = [{}, { "content-length": "10" }];
  for (const more of lies) {
    const { body, state } = endless();
    const began = performance.now();
    const response = await send(body, { ...JSON_TYPE, ...more });
    expect(await problemIn(response)).toMatchObject({ status: 413, code: "too-large" });
    expect(state.sent).toBeLessThan(1_400_000);
    expect(state.cancelled).toBe(true);
    expect(performance.now() - began).toBeLessThan(500);
  }
});

test("a length above the limit is refused before anything is read", async () => {
  const { body, state } = endless();
  expect((await send(body, { ...JSON_TYPE, "content-length": "1048577" })).status).toBe(413);
  expect(state.sent).toBeLessThan(200_000);
});

test("a compressed body is refused, so that a small one cannot grow", async () => {
  const packed = gzipSync(JSON.stringify({ name: "x".repeat(500_000) }));
  const body = new ReadableStream({
    start(controller) {
      controller.enqueue(new Uint8Array(packed));
      controller.close();
    },
  });
  expect(await problemIn(await send(body, { ...JSON_TYPE, "content-encoding": "gzip" }))).toMatchObject({ status: 415 });
  expect((await send('{"name":"x"}', { "content-encoding": "br" })).status).toBe(415);
});

test.each([
  "text/plain",
  "application/x-www-form-urlencoded",
  "multipart/form-data",
  "application/json; charset=latin1",
  "application/jsonp",
])("a body of the type %s is refused", async (type) => {
  expect(await problemIn(await send('{"name":"x"}', { "content-type": type }))).toMatchObject({ status: 415, code: "not-json" });
});

test("the JSON type may name its character set", async () => {
  expect((await send('{"name":"x"}', { "content-type": "application/json; charset=UTF-8" })).status).toBe(200);
});

test.each([
  ["nesting that would exhaust a stack", `{"name":"x","tags":{"a":${"[".repeat(200_000)}${"]".repeat(200_000)}}}`],
  ["nesting just too deep", `{"name":"x","tags":{"a":${"[".repeat(30)}${"]".repeat(30)}}}`],
  ["a prototype as a field", '{"name":"x","__proto__":{"role":"lead"}}'],
  ["a prototype deeper down", '{"name":"x","tags":{"a":[{"__proto__":{}}]}}'],
  ["a zero character", '{"name":"a\\u0000b"}'],
  ["half of a character", '{"name":"\\ud800"}'],
  ["a zero character in a name", '{"name":"x","tags":{"a\\u0000":1}}'],
  ["text after the end", '{"name":"x"} more'],
  ["nothing", ""],
])("%s is refused as unreadable", async (_, body) => {
  const response = await send(body, JSON_TYPE);
  expect(await problemIn(response)).toMatchObject({ status: 400, code: "unreadable" });
});

test("bytes that are no UTF-8 are refused", async () => {
  const body = new ReadableStream({
    start(controller) {
      controller.enqueue(new Uint8Array([0x7b, 0x22, 0xff, 0x22, 0x3a, 0x31, 0x7d]));
      controller.close();
    },
  });
  expect((await send(body, JSON_TYPE)).status).toBe(400);
});

test("what does not fit is told place by place with JSON pointers", async () => {
  const response = await send({ nam: "x", "a/b~c": 1 });
  expect(await problemIn(response)).toMatchObject({
    status: 422,
    code: "invalid",
    errors: expect.arrayContaining([
      { pointer: "/name", detail: "This is missing" },
      { pointer: "/nam", detail: "This field is not known here" },
      { pointer: "/a~1b~0c", detail: "This field is not known here" },
    ]),
  });
});

test("a body with a million unknown fields makes a small reply", async () => {
  const many = Object.fromEntries(Array.from({ length: 60_000 }, (_, index) => [`f${index}`, 1]));
  const text = await (await send({ name: "x", ...many })).text();
  expect(text.length).toBeLessThan(10_000);
});

test("a query that the route does not know, or a name twice, is refused", async () => {
  const asked = (path: string) => call(take, { method: "POST", path, headers, body: { name: "x" } });
  expect(await problemIn(await asked("/api/v1/tests?limit=5"))).toMatchObject({ status: 422, errors: [{ pointer: "/limit" }] });
  expect((await asked("/api/v1/tests?a=1&a=2")).status).toBe(422);
  expect((await asked("/api/v1/tests?a=%00")).status).toBe(400);
});

test("a change from another site, or from nowhere, is refused before anybody is asked who they are", async () => {
  const { cookie } = headers;
  const from = (more: Record<string, string>) =>
    call(take, { method: "POST", headers: { cookie, ...more }, body: { name: "x" } });
  expect((await from({})).status).toBe(403);
  expect((await from({ origin: "https://elsewhere.example" })).status).toBe(403);
  expect((await from({ origin: "null", "sec-fetch-site": "cross-site" })).status).toBe(403);
  expect((await from({ "sec-fetch-site": "same-site" })).status).toBe(403);
  expect((await from({ "sec-fetch-site": "same-origin" })).status).toBe(200);
  expect((await from({ origin: "http://localhost:3000" })).status).toBe(200);
});
