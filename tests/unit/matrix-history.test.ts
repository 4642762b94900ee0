import { expect, test } from "vitest";
import { advance, HISTORY_STEPS, startHistory, stepBack, stepForward } from "@/components/matrix/history";
import { seededUniform } from "../helpers/seeded";

test("a hundred random edits can all be taken back and all be done again", () => {
  const draw = seededUniform(7);
  const start = [
    ["0", "0"],
    ["0", "0"],
  ];
  let history = startHistory(start);
  const states = [start];
  for (let step = 0; step < 100; step++) {
    const [r, c] = [Math.floor(draw() * 2), Math.floor(draw() * 2)];
    const next = history.present.map((row, i) => row.map((entry, j) => (i === r && j === c ? String(draw()) : entry)));
    states.push(next);
    history = advance(history, next);
  }
  for (let step = 99; step >= 0; step--) {
    history = stepBack(history);
    expect(history.present).toBe(states[step]);
  }
  expect(stepBack(history)).toBe(history);
  for (let step = 1; step <= 100; step++) {
    history = stepForward(history);
    expect(history.present).toBe(states[step]);
  }
  expect(stepForward(history)).toBe(history);
});

test("a new edit after an undo forgets what was undone", () => {
  const edited = advance(stepBack(advance(advance(startHistory("a"), "b"), "c")), "d");
  expect(edited).toEqual({ past: ["a", "b"], present: "d", future: [] });
});

test("the same state again is no step", () => {
  const history = startHistory("a");
  expect(advance(history, "a")).toBe(history);
});

test("the history keeps more than fifty steps and is bounded", () => {
  let history = startHistory(0);
  for (let step = 1; step <= 1000; step++) history = advance(history, step);
  expect(history.past).toHaveLength(HISTORY_STEPS);
  expect(HISTORY_STEPS).toBeGreaterThanOrEqual(50);
});
