import { dictionary } from "@zxcvbn-ts/language-common";
import { afterAll, describe, expect, test } from "vitest";
import { POST } from "@/app/api/v1/sign-up/route";
import { closePool } from "@/db/client";
import { withClient } from "@/lib/commands/databases.mjs";
import { NewPassword, SignUp } from "@/lib/schemas/account";
import { hashPassword, passwordMatches } from "@/lib/services/account/password-hash";
import { isCommonPassword } from "@/lib/services/account/refuse-weak-password";
import { signIn } from "@/lib/services/account/sign-in";
import { signUp } from "@/lib/services/account/sign-up";
import { call, ORIGIN, problemIn } from "../helpers/call-route";
import { newEmail, PASSWORD, refusalOf, someone, visitor } from "../helpers/people";
import { testDatabase } from "../helpers/test-database";

const { adminUrl } = await testDatabase();
afterAll(closePool);

describe("what may be chosen", () => {
  test.each([
    "eight ch",
    "correct horse",
    " blanks at the ends ",
    "пароль из слов",
    "🦭🦭🦭🦭🌊🌊🌊🌊",
    "a'; drop table users;--",
    "y".repeat(65),
  ])("%j is taken as it is", (password) => {
    expect(NewPassword.parse(password)).toBe(password);
  });

  test("seven characters are too few and 257 too many, and both say so", () => {
    expect(NewPassword.safeParse("seven c").error?.issues[0].message).toMatch(/At least 8 characters; 15 or more/);
    expect(NewPassword.safeParse("x".repeat(257)).success).toBe(false);
    expect(NewPassword.safeParse("x".repeat(256)).success).toBe(true);
  });

  test("the 3,000 most common of those that are long enough are refused, in capitals and with a digit or two behind them as well", () => {
    const common = dictionary["passwords-common"].filter((password) => password.length >= 8).slice(0, 3000);
    expect(common).toHaveLength(3000);
    for (const password of common) {
      for (const variant of [password, password.toUpperCase(), `${password}1`, `${password}7!`]) {
        expect(isCommonPassword(variant), variant).toBe(true);
      }
    }
  });

  test.each(["aaaaaaaa", "abcabcabcabc", "12341234", "Dragon12", "zxzxzxzxz"])("%j is as good as common", (password) => {
    expect(isCommonPassword(password)).toBe(true);
  });

  test.each([PASSWORD, "four coupled axes", "gantry-17-levitates", "Vq8#kLm2wz"])("%j is not common", (password) => {
    expect(isCommonPassword(password)).toBe(false);
  });

  test("signing up with a common password, or one's own name, address or team, is refused at the field", async () => {
    const email = newEmail();
    const input = { name: "Ottoline Brook", email, teamName: "Saltmarsh Motion" };
    for (const password of ["password123", "Ottoline Brook", email.split("@")[0], "saltmarsh motion1!"]) {
      const refusal = await refusalOf(signUp(visitor(), SignUp.parse({ ...input, password })));
      expect(refusal, password).toMatchObject({ code: "invalid", issues: [{ pointer: "/password" }] });
    }
  });
});

describe("what else is wrong beside a weak password", () => {
  const refused = async (body: unknown) => {
    const reply = await call(POST, { method: "POST", path: "/api/v1/sign-up", headers: { origin: ORIGIN }, body });
    expect(reply.status).toBe(422);
    const { errors = [] } = await problemIn(reply);
    return errors.map(({ pointer }) => pointer).toSorted();
  };

  test("is said in the same answer, each place once", async () => {
    const typed = { name: " ", email: "nobody", teamName: "Saltmarsh Motion", password: "password123" };
    expect(await refused(typed)).toEqual(["/email", "/name", "/password"]);
    expect(await refused({ ...typed, password: "saltmarsh motion1" })).toEqual(["/email", "/name", "/password"]);
    expect(await refused({ ...typed, password: "aaa" })).toEqual(["/email", "/name", "/password"]);
    expect(await refused({ ...typed, password: PASSWORD })).toEqual(["/email", "/name"]);
  });

  test.each([null, [], 12, { password: 12 }, { password: ["x"], name: {} }, { password: "x".repeat(100_000) }])(
    "and no shape of body upsets the judge: case %#",
    async (body) => {
      expect((await refused(body)).length).toBeGreaterThan(0);
    },
  );
});

describe("how it is kept", () => {
  test("as scrypt with N = 2^17, r = 8, p = 1 and a salt of 16 bytes, each time another", async () => {
    const [first, second] = [await hashPassword(PASSWORD), await hashPassword(PASSWORD)];
    expect(first).toMatch(/^scrypt\$17\$8\$1\$[\w-]{22}\$[\w-]{43}$/);
    expect(second).not.toBe(first);
    expect(await passwordMatches(PASSWORD, first)).toBe(true);
    expect(await passwordMatches(`${PASSWORD} `, first)).toBe(false);
  });

  test("whichever way a keyboard composes its letters", async () => {
    const stored = await hashPassword("Größe über alles".normalize("NFC"));
    expect(await passwordMatches("Größe über alles".normalize("NFD"), stored)).toBe(true);
  });

  test("a damaged hash, or none, matches nothing", async () => {
    const damaged = (await hashPassword("")).replace(/[\w-]{43}$/, "");
    expect(await passwordMatches("", damaged)).toBe(false);
    expect(await passwordMatches("", undefined)).toBe(false);
  });

  test("nowhere in the database in plain", async () => {
    const secret = "unrepeatable phrase 4711";
    const email = newEmail();
    await signUp(visitor(), { name: "Name", email, password: secret, teamName: "Team" });
    const found = await withClient(adminUrl, async (client) => {
      const { rows } = await client.query<{ all: string }>("select string_agg(u::text, '') as all from users u");
      return rows[0].all;
    });
    expect(found).toContain(email);
    expect(found).not.toContain(secret);
  });
});

describe("an unknown address and a wrong password", () => {
  test("are answered alike", async () => {
    const { email } = await someone();
    expect(await signIn(visitor(), { email, password: "not the password" })).toBeUndefined();
    expect(await signIn(visitor(), { email: newEmail(), password: "not the password" })).toBeUndefined();
  });

  test("cost the same work within ten percent", { timeout: 120_000 }, async () => {
    const { email } = await someone();
    const cost = async (address: string) => {
      const before = process.cpuUsage();
      await signIn(visitor(), { email: address, password: "not the password" });
      const used = process.cpuUsage(before);
      return used.user + used.system;
    };
    const known: number[] = [];
    const unknown: number[] = [];
    // Processor time, since what else runs on this machine is in the clock's; in turns, and the middle of nine.
    for (let round = 0; round < 9; round++) {
      known.push(await cost(email));
      unknown.push(await cost(newEmail()));
    }
    const middle = (costs: number[]) => costs.sort((a, b) => a - b)[4];
    const ratio = middle(unknown) / middle(known);
    expect(ratio).toBeGreaterThan(0.9);
    expect(ratio).toBeLessThan(1.1);
  });
});

test("a crowd that signs in at once waits in line, and beyond the line is turned away for now", { timeout: 60_000 }, async () => {
  const tries = Array.from({ length: 24 }, () => hashPassword("anything"));
  const outcomes = await Promise.allSettled(tries);
  const refused = outcomes.filter((outcome) => outcome.status === "rejected");
  expect(refused).toHaveLength(6);
  for (const { reason } of refused) expect(reason).toMatchObject({ code: "busy", data: { retryAfter: 5 } });
  expect(await passwordMatches("anything", await hashPassword("anything"))).toBe(true);
});
