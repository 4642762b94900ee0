import { afterAll, expect, test } from "vitest";
import { twoTanks } from "@/app/api/v1/computations/example";
import { POST } from "@/app/api/v1/computations/route";
import { GET } from "@/app/api/v1/plants/route";
import { closePool } from "@/db/client";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import { call, problemIn, signedIn } from "../helpers/call-route";
import { newTeam } from "../helpers/people";
import { testDatabase } from "../helpers/test-database";

await testDatabase();
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});

const compute = (headers: Record<string, string>, body: unknown) => call(POST, { method: "POST", headers, body });

/** Thirty masses in a row on springs, pushed at four of them: the largest plant that is accepted. */
function sixtyStates() {
  const masses = 30;
  const pushed = [0, 8, 16, 24];
  const row = (entry: (column: number) => number, columns = 2 * masses) =>
    Array.from({ length: columns }, (_, column) => String(entry(column)));
  const names = (letter: string, count: number) =>
    Array.from({ length: count }, (_, index) => ({ name: `${letter}${index + 1}`, unit: "mm", axis: null, scale: 1 }));
  const spring = (mass: number) => (column: number) =>
    column === mass ? -2 : Math.abs(column - mass) === 1 && column < masses ? 1 : column === mass + masses ? -0.05 : 0;
  const rates = Array.from({ length: masses }, (_, mass) => row((column) => (column === mass + masses ? 1 : 0)));
  const { recipe } = twoTanks;
  return {
    plant: {
      content: {
        version: 1,
        timeBase: { kind: "continuous" },
        ...{
          axes: [],
          parameters: [],
          disturbances: [],
          commanded: null,
          D: null,
          E: null,
          H: null,
          J: null,
          operatingPoint: null,
          source: "",
        },
        states: names("x", 2 * masses),
        inputs: names("u", 4).map((input) => ({ ...input, lower: null, upper: null })),
        outputs: names("y", 4),
        A: [...rates, ...Array.from({ length: masses }, (_, mass) => row(spring(mass)))],
        B: Array.from({ length: 2 * masses }, (_, state) => row((input) => (state === masses + pushed[input] ? 1 : 0), 4)),
        C: pushed.map((mass) => row((column) => (column === mass ? 1 : 0))),
      },
    },
    recipe: {
      ...recipe,
      weights: { form: "deviations", states: Array.from({ length: 2 * masses }, () => 1), inputs: [1, 1, 1, 1] },
      test: { horizon: null, initialState: Array.from({ length: 2 * masses }, () => 0), inputDisturbance: [0, 0, 0, 0] },
    },
  };
}

test("twenty of the largest computations of one team are no outage for anybody else", { timeout: 120_000 }, async () => {
  const greedy = await signedIn(await newTeam());
  const other = await signedIn(await newTeam());
  const large = Array.from({ length: 20 }, () => compute(greedy, sixtyStates()));
  await Promise.race(large);

  const began = performance.now();
  const [read, small] = await Promise.all([call(GET, { path: "/api/v1/plants", headers: other }), compute(other, twoTanks)]);
  const waited = performance.now() - began;
  expect([read.status, small.status]).toEqual([200, 200]);

  const replies = await Promise.all(large);
  const refused = replies.filter(({ status }) => status === 503);
  expect(replies.filter(({ status }) => status === 200).length).toBe(12);
  expect(refused.length).toBe(8);
  expect(Number(refused[0].headers.get("retry-after"))).toBeGreaterThan(0);
  expect(await problemIn(refused[0])).toMatchObject({ code: "busy" });
  // The other team waited for one turn each for its checks and its design, not for the ten large ones before it.
  expect(waited).toBeLessThan((performance.now() - began) * 0.8);
});

test("sizes are refused before any work starts", async () => {
  const headers = await signedIn(await newTeam());
  const { plant, recipe } = sixtyStates();
  const tooMany = Array.from({ length: 61 }, () => plant.content.states[0]);
  const began = performance.now();
  const response = await compute(headers, { plant: { content: { ...plant.content, states: tooMany } }, recipe });
  expect(await problemIn(response)).toMatchObject({
    status: 422,
    errors: expect.arrayContaining([{ pointer: "/plant/content/states", detail: "At most 60 states" }]),
  });
  expect(performance.now() - began).toBeLessThan(2_000);
});
