import { describe, expect, test } from "vitest";
import { checkPlant } from "@/control/plant/check-plant";
import type { PlantModel, Rows } from "@/control/plant/model";
import { CAUTIONS } from "@/control/words/cautions";
import { describeChecks } from "@/control/words/describe-checks";
import { describeMode, describePole } from "@/control/words/describe-mode";
import { smallPlant } from "../helpers/small-plant";

function finding(model: PlantModel, key: string) {
  const found = describeChecks(checkPlant(model), model).find((one) => one.key === key);
  if (!found) throw new Error(`no finding ${key}`);
  return found;
}

const labels = (model: PlantModel) => {
  const { modes } = checkPlant(model);
  if (modes.state !== "computed") throw new Error(modes.code);
  return modes.value.map((mode) => describeMode(mode, model));
};

function named(parts: { A: Rows; B: Rows; C: Rows }, names: readonly string[], changes: Partial<PlantModel> = {}): PlantModel {
  const plain = smallPlant(parts, changes);
  return { ...plain, states: plain.states.map((state, i) => ({ ...state, name: names[i] })) };
}

const frame = named(
  {
    A: [
      [0, 1, 0],
      [-9801, -1.8, 0],
      [0, 0, 0],
    ],
    B: [[0], [1], [1]],
    C: [[1, 0, 1]],
  },
  ["th", "om", "y"],
);

test("a mode is labelled by what it does and by the states that take part", () => {
  expect(labels(frame)).toEqual(["free drift of y", "oscillation of th and om at 15.8 Hz"]);
  const mixed = named(
    {
      A: [
        [-1, 0.5],
        [0.2, -4],
      ],
      B: [[1], [0]],
      C: [[1, 0]],
    },
    ["level", "heat"],
  );
  expect(labels(mixed)[0]).toMatch(/^decay with time constant 1\.03 s, mostly level$/);
});

test.each([
  [{ re: 2, im: 0 }, "growth with time constant 0.5 s"],
  [{ re: 0, im: 0 }, "free drift"],
  [{ re: 0, im: 6 }, "undamped oscillation at 0.955 Hz"],
  [{ re: 0.5, im: 6 }, "growing oscillation at 0.958 Hz"],
  [{ re: -1, im: 0 }, "decay with time constant 1 s"],
])("a bare pole %o is called %s", (pole, words) => {
  expect(describePole(pole, { kind: "continuous" })).toBe(words);
});

test.each([
  [{ re: 0, im: 0 }, "motion that is gone after a few samples"],
  [{ re: -0.5, im: 0 }, "alternation from sample to sample that decays with time constant 14.4 ms"],
  [{ re: -2, im: 0 }, "alternation from sample to sample that grows"],
  [{ re: 1, im: 0 }, "free drift"],
  [{ re: 0.99, im: 0 }, "decay with time constant 0.995 s"],
])("a sampled pole %o is called %s", (pole, words) => {
  expect(describePole(pole, { kind: "sampled", period: 0.01 })).toBe(words);
});

describe("findings", () => {
  test("come once each, in the reviewer's order, with headline and sentence", () => {
    const all = describeChecks(checkPlant(frame), frame);
    expect(all.map(({ key }) => key)).toEqual(["stability", "steering", "sight", "zeros", "coupling", "scaling"]);
    for (const { headline, sentence } of all) {
      expect(headline).toMatch(/^[A-Z0-9]/);
      expect(sentence).toMatch(/^[A-Z].*\.$/);
    }
  });

  test("steering names the weakest mode, the way to it and how little would cut it off", () => {
    const { tone, headline, sentence } = finding(frame, "steering");
    expect([tone, headline]).toEqual(["met", "Every mode can be steered"]);
    expect(sentence).toContain("reached through u1");
    expect(sentence).toMatch(/a change of [\d.]+ % of the scaled model would cut it off from the inputs/);
  });

  test("a drift out of reach is not met, a decaying mode out of reach is a caution", () => {
    const drift = named(
      {
        A: [
          [0, 0],
          [0, -1],
        ],
        B: [[0], [1]],
        C: [[1, 1]],
      },
      ["belt", "motor"],
    );
    expect(finding(drift, "steering")).toMatchObject({ tone: "not-met", headline: "1 mode cannot be steered" });
    expect(finding(drift, "steering").sentence).toMatch(/^Free drift of belt\. No state feedback can stabilise/);
    const decay = named(
      {
        A: [
          [-2, 0],
          [0, -1],
        ],
        B: [[0], [1]],
        C: [[1, 1]],
      },
      ["belt", "motor"],
    );
    expect(finding(decay, "steering")).toMatchObject({ tone: "caution" });
    expect(finding(decay, "steering").sentence).toContain("decays by itself");
    expect(finding(decay, "steering").sentence).toContain("Rank 1 of 2");
  });

  test("a mode that no sensor sees, and a plant without sensors, are told by sight", () => {
    const blind = named(
      {
        A: [
          [0, 0],
          [0, -1],
        ],
        B: [[1], [1]],
        C: [[0, 1]],
      },
      ["belt", "motor"],
    );
    expect(finding(blind, "sight")).toMatchObject({ tone: "not-met", headline: "1 mode cannot be seen" });
    const bare = smallPlant({ A: [[-1]], B: [[1]], C: [] });
    expect(finding(bare, "sight")).toMatchObject({ tone: "caution", headline: "Nothing is measured" });
  });

  test("a mode held by a thread is a caution although the rank is full", () => {
    const thread = named(
      {
        A: [
          [-2, 1e-6],
          [0, -1],
        ],
        B: [[0], [1]],
        C: [[1, 1]],
      },
      ["belt", "motor"],
    );
    expect(finding(thread, "steering")).toMatchObject({
      tone: "caution",
      headline: "Every mode can be steered, one only weakly",
    });
    expect(finding(thread, "steering").sentence).toContain("Hardest to move: belt");
  });

  test("an unstable plant says how many modes grow", () => {
    const maglev = named(
      {
        A: [
          [8, 0],
          [0, -3],
        ],
        B: [[1], [1]],
        C: [[1, 1]],
      },
      ["gap", "coil"],
    );
    expect(finding(maglev, "stability")).toMatchObject({ tone: "caution", headline: "Unstable without feedback" });
    expect(finding(maglev, "stability").sentence).toContain("1 mode of 2 grows when the inputs are held: growth of gap");
  });

  test("zeros at rest, on the boundary and beyond it are told apart", () => {
    const integrators = [
      [0, 1],
      [0, 0],
    ];
    const at = (C: number[][]) => finding(smallPlant({ A: integrators, B: [[0], [1]], C }), "zeros");
    expect(at([[1, 0]])).toMatchObject({ tone: "met", headline: "No zeros" });
    expect(at([[2, 1]])).toMatchObject({ tone: "met", headline: "1 zero, none in the way" });
    expect(at([[0, 1]])).toMatchObject({ tone: "caution", headline: "1 zero in the way" });
    expect(at([[0, 1]]).sentence).toContain("A zero at rest");
    expect(at([[-3, 1]]).sentence).toContain("Right of the imaginary axis 3:");
    expect(at([[-3, 1]]).sentence).toContain("beyond about 0.24 Hz");
    const notch = smallPlant({
      A: [
        [0, 1, 0],
        [0, 0, 1],
        [0, 0, 0],
      ],
      B: [[0], [0], [1]],
      C: [[4, 0, 1]],
    });
    expect(finding(notch, "zeros").sentence).toContain("On the stability boundary");
  });

  test("coupling names the axes and the best pairs at rest", () => {
    const plain = smallPlant({
      A: [
        [-1, 0.5],
        [0.1, -1],
      ],
      B: [
        [0, 1],
        [1, 0],
      ],
      C: [
        [1, 0],
        [0, 1],
      ],
    });
    const tanks = {
      ...plain,
      axes: [
        { name: "upper", tag: "U" },
        { name: "lower", tag: "L" },
      ],
      states: plain.states.map((state, i) => ({ ...state, axis: i })),
    };
    const { headline, sentence } = finding(tanks, "coupling");
    expect(headline).toBe("Coupling between axes: 34 % of the plant");
    expect(sentence).toContain("lower acts on upper");
    expect(sentence).toContain("y1 with u2 (1.05) and y2 with u1 (1.05) pair best");
  });

  test("a zero in the way names the joint motion of the inputs that it blocks and the outputs that feel it", () => {
    // [1/(s+1), 2/(s+3); 1/(s+1), 1/(s+1)] has a zero at 1 that no element shows.
    const hidden = smallPlant({
      A: [
        [-1, 0, 0],
        [0, -1, 0],
        [0, 0, -3],
      ],
      B: [
        [1, 0],
        [0, 1],
        [0, 1],
      ],
      C: [
        [1, 0, 2],
        [1, 1, 0],
      ],
    });
    expect(finding(hidden, "zeros").sentence).toContain(
      "At 1, u1 and u2 moving as 1 : −1 of their largest acceptable deviations are blocked, and y1 and y2 feel it most.",
    );
    const single = smallPlant({
      A: [
        [0, 1],
        [0, 0],
      ],
      B: [[0], [1]],
      C: [[-3, 1]],
    });
    expect(finding(single, "zeros").sentence).not.toContain("blocked");
  });

  test("an integrating plant is paired by its limit, and one whose relative gains have none says why", () => {
    const tables = smallPlant({
      A: [
        [0, 0],
        [0, 0],
      ],
      B: [
        [2, 1],
        [1, 3],
      ],
      C: [
        [1, 0],
        [0, 1],
      ],
    });
    expect(finding(tables, "coupling").sentence).toContain(
      "By relative gain towards low frequencies, y1 with u1 (1.2) and y2 with u2 (1.2) pair best",
    );
    const masses = smallPlant({
      A: [
        [0, 0, 1, 0],
        [0, 0, 0, 1],
        [-1, 1, 0, 0],
        [1, -1, 0, 0],
      ],
      B: [
        [0, 0],
        [0, 0],
        [1, 0],
        [0, 1],
      ],
      C: [
        [1, 0, 0, 0],
        [0, 1, 0, 0],
      ],
    });
    expect(finding(masses, "coupling").sentence).toContain("Relative gains have no value at rest");
  });

  test("a suspicious time base is asked about first", () => {
    const sampled = smallPlant({
      A: [
        [0.99, 0.01],
        [0, 0.97],
      ],
      B: [[0], [0.01]],
      C: [[1, 0]],
    });
    const all = describeChecks(checkPlant(sampled), sampled);
    expect(all[0]).toMatchObject({ key: "time-base", tone: "caution", headline: "Is this a sampled model?" });
  });

  test("a part that was refused is told with its reason and a next step", () => {
    const checks = { ...checkPlant(frame), zeros: { state: "refused", code: "no-convergence", data: {} } } as const;
    const zeros = describeChecks(checks, frame).find(({ key }) => key === "zeros");
    expect(zeros).toMatchObject({ tone: "not-met", headline: "The computation did not settle" });
  });
});

test("the cautions name the model's limits, the first closing of the loop and the standards for safety", () => {
  const all = CAUTIONS.join(" ");
  for (const words of ["linear model", "travel stops", "emergency stop", "ISO 13849-1", "IEC 61508", "IEC 61800-5-2"]) {
    expect(all).toContain(words);
  }
});
