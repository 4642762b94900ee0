import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { closePool } from "@/db/client";
import { withClient } from "@/lib/commands/databases.mjs";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import type { DesignSummary } from "@/lib/schemas/design";
import type { PlantSummary } from "@/lib/schemas/plant";
import { type Api, member } from "../helpers/api";
import { problemIn } from "../helpers/call-route";
import { lastMailTo } from "../helpers/last-mail";
import { newEmail } from "../helpers/people";
import { twoCarriages } from "../helpers/plant-content";
import { byWeights } from "../helpers/recipes";
import { testDatabase } from "../helpers/test-database";

const { adminUrl } = await testDatabase();
let api: Api;
beforeAll(async () => {
  ({ api } = await member());
});
beforeEach(() => withClient(adminUrl, (client) => client.query("delete from rate_limits")));
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});

const content = twoCarriages();
async function download(name: string): Promise<string> {
  const plant = await api.post<PlantSummary>("/api/v1/plants", { name, content });
  const body = { name, plantRevisionId: plant.currentRevision.id, recipe: byWeights() };
  const { currentRevision } = await api.post<DesignSummary>(`/api/v1/plants/${plant.id}/designs`, body);
  const response = await api.ask("GET", `/api/v1/design-revisions/${currentRevision.id}/gains`);
  return response.headers.get("content-disposition") ?? "";
}

describe("a line break or control character in a name is refused, wherever a name is written", () => {
  const breaks = ["\r\nset-cookie: a=b", "\n", "\r", "\u2028x", "\u2029x", "\u0085x", "\u007fx", "\tx", "\u001b[31m"];
  const places: [string, string, (name: string) => unknown][] = [
    ["a plant", "/api/v1/plants", (name) => ({ name, content })],
    ["a team", "/api/v1/account/team", (name) => ({ name })],
    ["an access token", "/api/v1/account/tokens", (name) => ({ name, scope: "read", expiresInDays: 1 })],
    ["a signal", "/api/v1/checks", (name) => ({ content: { ...content, states: [{ ...content.states[0], name }] } })],
    ["a unit", "/api/v1/checks", (unit) => ({ content: { ...content, states: [{ ...content.states[0], unit }] } })],
    ["a person", "/api/v1/sign-up", (name) => ({ name, email: newEmail(), password: "twelve long words", teamName: "T" })],
    ["a new team", "/api/v1/sign-up", (teamName) => ({ name: "N", email: newEmail(), password: "twelve long words", teamName })],
  ];
  test.each(places)("%s", async (_, path, body) => {
    for (const sign of breaks) {
      const response = await api.ask("POST", path, { body: body(`name${sign}more`) });
      expect([(await problemIn(response)).status, JSON.stringify(sign)]).toEqual([422, JSON.stringify(sign)]);
    }
  });
});

test.each([
  ["quotes", 'a"; filename="evil.exe'],
  ["a path", "../../etc/passwd"],
  ["a backslash path", "..\\..\\boot.ini"],
  ["a percent sign", "100%22 %0d%0a"],
  ["another script", "龍 ☃ Ω"],
  ["a mark that turns the reading direction", "gain\u202Etxt.exe"],
  ["nothing that a file name may hold", '/\\:*?"<>|'],
  ["a half-width dot first", ".hidden"],
])("a file name made of %s is one quoted name, and one in UTF-8 where that loses something", async (_, name) => {
  const disposition = await download(name);
  expect(disposition).toMatch(/^attachment; filename="[^"\\/\r\n]+"(; filename\*=UTF-8''[A-Za-z0-9!#$&+.^_`|~%-]+)?$/);
  expect(disposition).toMatch(/^[\x20-\x7e]*$/);
  const [, utf8] = /filename\*=UTF-8''(.+)$/.exec(disposition) ?? [];
  if (utf8) expect(decodeURIComponent(utf8)).not.toMatch(/[\p{Cc}\p{Cf}/\\]/u);
  expect(disposition).not.toMatch(/filename="\./);
});

test("names of 120 signs still leave the revision and the kind of file to be read", async () => {
  expect(await download("x".repeat(120))).toMatch(/="x+ x+ r1 gain\.csv"$/);
});

test("what the caller sends comes back in no header but a harmless request id", async () => {
  const headers = { "x-request-id": "bench-7f3a_0001", "x-odd": "odd-value", referer: "https://odd.example/" };
  const response = await api.ask("GET", "/api/v1/plants?search=odd-value", { headers });
  expect(response.headers.get("x-request-id")).toBe("bench-7f3a_0001");
  for (const [name, value] of response.headers) expect(`${name}: ${value}`).not.toContain("odd");
});

test("names in a mail make neither a second header nor a tag", async () => {
  const { api: lead } = await member();
  const odd = "Ann <b>Bcc: x@y.example</b> =?utf-8?q?=0ABcc?=";
  await lead.patch("/api/v1/team", { name: odd });
  const email = newEmail();
  await lead.post("/api/v1/team/invitations", { email, role: "engineer" });
  const mail = await lastMailTo(adminUrl, email);
  expect(mail?.subject).toBe(`Test Lead invites you to the team ${odd}`);
  expect(mail?.subject).not.toMatch(/[\r\n]/);
  expect(mail?.html).not.toContain("<b>");
  for (const address of ["a@b.example\r\nBcc: c@d.example", "a@b.example,c@d.example", "a b@c.example", "<a@b.example>"]) {
    const response = await lead.ask("POST", "/api/v1/team/invitations", { body: { email: address, role: "engineer" } });
    expect([(await problemIn(response)).status, address]).toEqual([422, address]);
  }
});
