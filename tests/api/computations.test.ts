import { afterAll, expect, test } from "vitest";
import { POST } from "@/app/api/v1/computations/route";
import { CAUTIONS } from "@/control/words/cautions";
import { closePool } from "@/db/client";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import { createAccessToken } from "@/lib/services/account/access-tokens";
import { call, problemIn } from "../helpers/call-route";
import { newTeam } from "../helpers/people";
import { testDatabase } from "../helpers/test-database";

await testDatabase();
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});

async function tokenOf(scope: "read" | "write") {
  const { secret } = await createAccessToken(await newTeam(), { name: "Script", scope, expiresInDays: 1 });
  return { authorization: `Bearer ${secret}` };
}
const compute = (headers: Record<string, string>, body: unknown = POST.declaration.example) =>
  call(POST, { method: "POST", headers, body });

test("the worked request of the description is answered with checks, gains, responses and cautions, by token, without a page", async () => {
  const response = await compute(await tokenOf("read"));
  const reply = await response.json();
  expect([response.status, reply.detail]).toEqual([200, undefined]);
  expect(reply.evidence.gains.value.K).toHaveLength(2);
  expect(reply.evidence.gains.value.residual).toBeLessThanOrEqual(reply.evidence.gains.value.bound);
  expect(reply.checks.modes.value).toHaveLength(2);
  expect(reply.responses.length).toBeGreaterThan(0);
  expect(reply.cautions).toEqual([...CAUTIONS]);
});

test("more than thirty computations a minute of one person are answered 429 with the wait", async () => {
  const headers = await tokenOf("read");
  const statuses: number[] = [];
  let last = await compute(headers, {});
  for (let count = 1; count <= 30; count++) {
    statuses.push(last.status);
    last = await compute(headers, {});
  }
  expect(new Set(statuses)).toEqual(new Set([422]));
  expect(last.status).toBe(429);
  expect(Number(last.headers.get("retry-after"))).toBeGreaterThan(0);
  expect(await problemIn(last)).toMatchObject({ code: "too-many-requests" });
});

test("a token that is none is refused, whatever cookie comes with it", async () => {
  const response = await compute({ authorization: "Bearer gw_made-up", cookie: "gainwright-session=x" });
  expect(await problemIn(response)).toMatchObject({ status: 401, code: "no-session" });
  expect(response.headers.get("www-authenticate")).toBe("Bearer");
});
