import { afterAll, beforeEach, describe, expect, test } from "vitest";
import type { ObserverRecipe, PoleEntry, Recipe } from "@/control/design/recipe";
import { closePool } from "@/db/client";
import { withClient } from "@/lib/commands/databases.mjs";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import type { Computation } from "@/lib/schemas/design";
import type { PlantContent } from "@/lib/schemas/plant";
import { apiOf, member } from "../helpers/api";
import { problemIn } from "../helpers/call-route";
import { twoCarriages } from "../helpers/plant-content";
import { byPoles, byWeights, observers } from "../helpers/recipes";
import { testDatabase } from "../helpers/test-database";

const { adminUrl } = await testDatabase();
const { api } = await member();
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});
beforeEach(() => withClient(adminUrl, (client) => client.query("delete from rate_limits")));

const typed = twoCarriages();
const plain: PlantContent = twoCarriages();
/** Two carriages that know nothing of each other, so that each mode is one carriage's own. */
const apart = twoCarriages({ A: [typed.A[0], typed.A[1], ["0", "0", "-0.4", "0"], ["0", "0", "0", "-0.4"]] });
const secondForceLost = { ...apart, B: [typed.B[0], typed.B[1], typed.B[2], ["0", "0"]] };
const speedsOnly = twoCarriages({
  C: [
    ["0", "0", "1", "-1"],
    ["0", "0", "0", "1"],
  ],
});
const sampled = twoCarriages({ timeBase: { kind: "sampled", period: 0.1 } });

const diagonal = (...values: number[]) => values.map((value, i) => values.map((_, j) => (i === j ? value : 0)));
const matrices = (state: number[][], input: number[][], more = {}) =>
  byWeights({ weights: { form: "matrices", state, input }, ...more });
const real = (...values: number[]): PoleEntry[] => values.map((value) => ({ kind: "real", value }));
const withObserver = (observer: ObserverRecipe) => byWeights({ observer });
const noise = (process: number[][], measurement: number[][]) => withObserver({ kind: "noise", process, measurement });
const ONES = diagonal(1, 1, 1, 1);

/** Code as the API tells it; what the words must name: the assumption, the signal or pole; what to try. */
type Case = readonly [
  name: string,
  content: PlantContent,
  recipe: Recipe,
  code: string,
  names: readonly RegExp[],
  change: RegExp,
];

const regulators: readonly Case[] = [
  [
    "a carriage that no force moves",
    secondForceLost,
    byWeights(),
    "not-stabilizable",
    [/No input moves the free drift/, /\bv2\b/, /F1 and F2/],
    /Add an input/,
  ],
  [
    "a decay slower than the degree of stability that no force moves",
    { ...secondForceLost, A: [...apart.A.slice(0, 1), ["0", "-1", "0", "1"], ...apart.A.slice(2)] },
    byWeights({ degreeOfStability: 3 }),
    "not-stabilizable",
    [/decays more slowly than the degree of stability/, /\b(x2|v2)\b/],
    /smaller degree of stability/,
  ],
  [
    "a state weight below zero",
    plain,
    matrices(diagonal(1, 1, -1, 1), diagonal(1, 1)),
    "not-positive-semidefinite",
    [/state weight is negative/, /\bv1\b/],
    /diagonal larger/,
  ],
  [
    "a state weight with too large a neighbour",
    plain,
    matrices(
      [
        [1, 2, 0, 0],
        [2, 1, 0, 0],
        [0, 0, 1, 0],
        [0, 0, 0, 1],
      ],
      diagonal(1, 1),
    ),
    "not-positive-semidefinite",
    [/state weight is negative/, /\bx2\b/],
    /entries beside it smaller/,
  ],
  [
    "a cross weight that outweighs both",
    plain,
    matrices(ONES, diagonal(1, 1), {
      crossWeight: [
        [5, 0],
        [0, 0],
        [0, 0],
        [0, 0],
      ],
    }),
    "not-positive-semidefinite",
    [/state, cross and input weight/, /\bF1\b/],
    /must outweigh it/,
  ],
  [
    "an input without weight",
    plain,
    matrices(ONES, diagonal(1, 0)),
    "not-positive-definite",
    [/input weight must cost/, /\bF2\b/],
    /larger than zero/,
  ],
  [
    "an input weight below zero in one direction",
    plain,
    matrices(ONES, [
      [1, 2],
      [2, 1],
    ]),
    "not-positive-definite",
    [/input weight must cost/, /\bF2\b/],
    /larger than zero/,
  ],
  [
    "a drift without weight",
    apart,
    byWeights({ weights: { form: "deviations", states: [0.001, null, 0.05, null], inputs: [40, 40] } }),
    "unweighted-boundary-mode",
    [/no price on the free drift/, /\bx2\b/],
    /a weight, however small/,
  ],
  [
    "an undamped oscillation without weight",
    twoCarriages({ A: [typed.A[0], typed.A[1], ["-9", "0", "0", "0"], ["0", "-4", "0", "0"]] }),
    byWeights({ weights: { form: "deviations", states: [0.001, null, 0.05, null], inputs: [40, 40] } }),
    "unweighted-boundary-mode",
    [/undamped oscillation at 0\.318 Hz/, /\bx2\b/],
    /degree of stability/,
  ],
  [
    "a pole repeated more often than forces are independent",
    plain,
    byPoles({ poles: real(-5, -5, -5, -6) }),
    "pole-multiplicity",
    [/wanted pole −5 is asked for 3 times/, /F1 and F2, 2 independent inputs/],
    /apart by a few percent/,
  ],
  [
    "a wanted pole that grows",
    plain,
    byPoles({ poles: real(-5, -4, 5, -6) }),
    "unstable-pole",
    [/wanted pole 5 \(entry 3\)/, /left of the imaginary axis/],
    /Choose a pole left/,
  ],
  [
    "a wanted pole outside the unit circle",
    sampled,
    byPoles({ poles: real(0.1, 0.2, 1.2, 0.3) }),
    "unstable-pole",
    [/wanted pole 1\.2/, /unit circle/],
    /inside the unit circle/,
  ],
  [
    "a wanted oscillation that samples cannot tell",
    sampled,
    byPoles({ poles: [{ kind: "damping", frequency: 400, damping: 0.1 }, ...real(0.1, 0.2)] }),
    "bad-option",
    [/Entry 1 of the pole list/, /half the sampling rate/],
    /lower frequency/,
  ],
  [
    "a pole wanted elsewhere that no force moves",
    secondForceLost,
    byPoles(),
    "not-controllable",
    [/No input moves/, /\b(x2|v2)\b/],
    /Design by weights instead|Add an input/,
  ],
  [
    "a deviation too small to square",
    plain,
    byWeights({ weights: { form: "deviations", states: [1e-200, 1, 1, 1], inputs: [1, 1] } }),
    "bad-option",
    [/acceptable deviation of x1/],
    /positive, finite value/,
  ],
];

const estimators: readonly Case[] = [
  [
    "a drift that no sensor sees",
    speedsOnly,
    withObserver(observers.noise),
    "not-detectable",
    [/No output shows the free drift/, /\bx[12]\b/, /enc1 and enc2/],
    /Add a sensor/,
  ],
  [
    "a drift that no sensor sees, by poles",
    speedsOnly,
    withObserver(observers.poles),
    "not-observable",
    [/No output shows the free drift/, /\bx[12]\b/],
    /Add a sensor/,
  ],
  [
    "a drift that no sensor sees, by a reduced observer",
    speedsOnly,
    withObserver(observers.reduced),
    "not-observable",
    [/No output shows the free drift/, /\bx[12]\b/],
    /Add a sensor/,
  ],
  [
    "a sensor without noise",
    plain,
    noise(ONES, diagonal(1, 0)),
    "not-positive-definite",
    [/measurement noise/, /\benc2\b/],
    /larger than zero/,
  ],
  [
    "process noise below zero",
    plain,
    noise(diagonal(1, 1, 1, -1), diagonal(1, 1)),
    "not-positive-semidefinite",
    [/process noise is negative/, /\bv2\b/],
    /diagonal larger/,
  ],
  [
    "a drift that no noise stirs",
    plain,
    noise(diagonal(0, 0, 0, 0), diagonal(1, 1)),
    "unweighted-boundary-mode",
    [/process noise never stirs the free drift/, /\b[xv][12]\b/],
    /some process noise/,
  ],
  [
    "an observer pole repeated more often than sensors are independent",
    plain,
    withObserver({ kind: "poles", poles: real(-2, -2, -2, -4) }),
    "pole-multiplicity",
    [/enc1 and enc2, 2 independent outputs/],
    /apart by a few percent/,
  ],
  [
    "an observer pole that grows",
    plain,
    withObserver({ kind: "poles", poles: real(1, -2, -3, -4) }),
    "unstable-pole",
    [/wanted pole 1 \(entry 1\)/, /the estimate would not come to rest/],
    /Choose a pole left/,
  ],
  [
    "too few poles of a reduced observer",
    plain,
    withObserver({ kind: "reduced", poles: real(-1) }),
    "pole-count",
    [/needs 2 poles, and 1 is given/],
    /Add poles/,
  ],
];

/** Whole sentences, with no code, no number that is none and nothing of ours in them. */
function speaksPlainly(text: string, code: string): void {
  expect(text).toMatch(/^[A-Z].*\.$/s);
  expect(text).not.toContain(code);
  expect(text).not.toMatch(/undefined|null|NaN|Infinity|\[object|control\/|Error/);
}
/** Facts are finite all the way down. */
const hasNull = (facts: unknown) => /null/.test(JSON.stringify(facts ?? {}));

describe("what cannot be solved names the broken assumption in the plant's own words and one change to try", () => {
  test.each(regulators)("%s", async (_, content, recipe, code, names, change) => {
    const problem = await problemIn(await api.ask("POST", "/api/v1/computations", { body: { plant: { content }, recipe } }));
    expect(problem).toMatchObject({ status: 422, code, type: `/docs/problems#${code}` });
    speaksPlainly(problem.detail, code);
    for (const name of [...names, change]) expect(problem.detail).toMatch(name);
    expect(hasNull(problem.data)).toBe(false);
  });

  test.each(estimators)("%s, which leaves the gain as it is", async (_, content, recipe, code, names, change) => {
    const { evidence } = await api.post<Computation>("/api/v1/computations", { plant: { content }, recipe });
    expect(evidence.gains.state).toBe("computed");
    const { observer } = evidence;
    if (observer.state !== "refused") throw new Error(`the observer was ${observer.state}`);
    expect(observer.code).toBe(code);
    for (const text of [observer.sentence, observer.nextStep]) speaksPlainly(text, code);
    expect(observer.title).toMatch(/^[A-Z][^.]{3,60}$/);
    for (const name of names) expect(observer.sentence).toMatch(name);
    expect(observer.nextStep).toMatch(change);
    expect(hasNull(observer.data)).toBe(false);
  });

  test("counts, shapes and mirrored entries that do not fit are told at their places before anything is computed", async () => {
    const wrong: [Recipe, string, RegExp][] = [
      [byPoles({ poles: real(-1, -2, -3) }), "/recipe/poles", /4 poles are needed, one for each state; 3 are given/],
      [byPoles({ poles: real(-1, -2, -3, -4, -5) }), "/recipe/poles", /4 poles are needed.*5 are given/],
      [withObserver({ kind: "poles", poles: real(-1) }), "/recipe/observer/poles", /4 poles are needed/],
      [
        matrices(
          [
            [1, 2, 0, 0],
            [3, 1, 0, 0],
            [0, 0, 1, 0],
            [0, 0, 0, 1],
          ],
          diagonal(1, 1),
        ),
        "/recipe/weights/state/1/0",
        /x2, x1 and x1, x2 differ/,
      ],
      [
        matrices(ONES, [
          [1, 2],
          [3, 9],
        ]),
        "/recipe/weights/input/1/0",
        /F2, F1 and F1, F2 differ/,
      ],
    ];
    for (const [recipe, pointer, words] of wrong) {
      const problem = await problemIn(
        await api.ask("POST", "/api/v1/computations", { body: { plant: { content: plain }, recipe } }),
      );
      expect(problem).toMatchObject({
        status: 422,
        code: "invalid",
        errors: [{ pointer, detail: expect.stringMatching(words) }],
      });
    }
    const half = { ...byPoles(), poles: [{ kind: "pair", re: -1, im: 0 }, ...real(-2, -3)] };
    const alone = await problemIn(
      await api.ask("POST", "/api/v1/computations", { body: { plant: { content: plain }, recipe: half } }),
    );
    expect(alone.errors).toEqual([{ pointer: "/recipe/poles/0/im", detail: "A number above zero is needed here" }]);
  });
});

test("nothing of it is stored, and a design that is refused says the same", async () => {
  const plant = await api.post<{ id: string; currentRevision: { id: string } }>("/api/v1/plants", {
    name: "Stuck",
    content: secondForceLost,
  });
  const path = `/api/v1/plants/${plant.id}/designs`;
  const body = { name: "None", plantRevisionId: plant.currentRevision.id, recipe: byWeights() };
  const refused = await problemIn(await apiOf(api.headers).ask("POST", path, { body }));
  const computed = await problemIn(
    await api.ask("POST", "/api/v1/computations", {
      body: { plant: { revisionId: plant.currentRevision.id }, recipe: byWeights() },
    }),
  );
  expect(refused).toMatchObject({ status: 422, code: "not-stabilizable", detail: computed.detail, data: computed.data });
  expect(await api.get(`${path}?archived=all`)).toEqual({ items: [], nextCursor: null });
});
