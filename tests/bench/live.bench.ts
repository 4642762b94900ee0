import type { Page } from "@playwright/test";
import { openDesign, untilSolved } from "../helpers/design-page";
import { storedPlant, test } from "../helpers/team-test";
import { coupledAxes } from "./coupled-axes";

const MOVES = 120;
/** Between two moves of a hand that does not rest. */
const PAUSE_MS = 50;

type Times = { readonly painted: number[]; readonly solved: number[]; readonly longTasks: number[] };

/** From a move of the slider to the frame in which curves have changed, and every task that kept the page from answering. */
async function watchCurves(page: Page): Promise<void> {
  await page.evaluate(() => {
    const times: Times = { painted: [], solved: [], longTasks: [] };
    let moved: number | null = null;
    addEventListener(
      "input",
      () => {
        moved ??= performance.now();
      },
      { capture: true },
    );
    new MutationObserver((changes) => {
      const drawn = changes.some(({ target, attributeName }) => attributeName === "d" && target.nodeName === "path");
      if (!drawn || moved === null) return;
      const since = moved;
      moved = null;
      // The frame is on its way once its callbacks have run and the next task begins.
      requestAnimationFrame(() => setTimeout(() => times.painted.push(performance.now() - since)));
    }).observe(document.body, { subtree: true, attributes: true, attributeFilter: ["d"] });
    new PerformanceObserver((list) => {
      for (const { duration } of list.getEntries()) times.longTasks.push(duration);
    }).observe({ type: "longtask" });
    Object.assign(window, { gainwrightTimes: times });
  });
}

const quantile = (values: readonly number[], share: number) =>
  [...values].sort((a, b) => a - b)[Math.min(values.length - 1, Math.floor(share * values.length))] ?? Number.NaN;
const shown = (value: number) => `${value.toFixed(1)} ms`;

async function drag(page: Page, label: string): Promise<void> {
  await watchCurves(page);
  const slider = page.getByRole("slider", { name: "Largest deviation of x1, slider" });
  await slider.focus();
  const solved: number[] = [];
  for (let move = 0; move < MOVES; move++) {
    await page.keyboard.press(move % 40 < 20 ? "ArrowLeft" : "ArrowRight");
    await page.waitForTimeout(PAUSE_MS);
    const said = await page
      .getByText(/Solved as it stands, in/)
      .textContent({ timeout: 1_000 })
      .catch(() => null);
    const milliseconds = Number(/in (\S+) ms/.exec(said ?? "")?.[1]);
    if (Number.isFinite(milliseconds)) solved.push(milliseconds);
  }
  await untilSolved(page);
  const times = await page.evaluate(() => (window as unknown as { gainwrightTimes: Times }).gainwrightTimes);
  console.log(
    [
      `${label}: ${times.painted.length} of ${MOVES} moves drawn`,
      `solved and simulated in ${shown(quantile(solved, 0.5))} (median)`,
      `from input to painted curves ${shown(quantile(times.painted, 0.5))} (median), ${shown(quantile(times.painted, 0.95))} (95 %)`,
      `tasks over 50 ms on the page: ${times.longTasks.length}${times.longTasks.length > 0 ? `, longest ${shown(Math.max(...times.longTasks))}` : ""}`,
    ].join("; "),
  );
}

for (const [label, content] of [
  ["12 states, 4 inputs, 4 commanded axes", coupledAxes(4, false)],
  ["30 states, 6 inputs, 4 commanded axes", coupledAxes(6, true)],
] as const) {
  test(`curves follow a slider: ${label}`, async ({ page, team }) => {
    test.setTimeout(180_000);
    const plant = await storedPlant(team.lead.request, { name: label, ...content });
    await openDesign(page, `/plants/${plant.id}/designs/new`);
    await untilSolved(page);
    await drag(page, label);
  });
}
