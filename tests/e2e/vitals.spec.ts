import type { Page } from "@playwright/test";
import { untilSettled } from "../helpers/axe-page";
import { designPath, figure, openDesign } from "../helpers/design-page";
import { cellOf, openPlant, pasteAt, untilTakenOver } from "../helpers/matrix-page";
import { changeEntry, untilKept } from "../helpers/plant-page";
import { expect, storedDesign, storedPlant, test } from "../helpers/team-test";

type Vitals = { readonly ttfb: number; readonly fcp: number; readonly lcp: number; readonly cls: number; readonly inp: number };

/**
 * The bars for a machine with nothing else to do. Here other tests share its cores with the server and the browser, so the times
 * are printed beside their bars and judged by whoever reads them; what does not depend on the clock is judged here.
 */
const BARS: Vitals = { ttfb: 800, fcp: 1_800, lcp: 2_500, cls: 0.1, inp: 200 };
const RUNS = 3;

/** A phone's processor and a slow line: 1.6 Mbit/s, 150 ms. */
async function slowDown(page: Page) {
  const session = await page.context().newCDPSession(page);
  await session.send("Network.enable");
  await session.send("Network.setCacheDisabled", { cacheDisabled: true });
  await session.send("Network.emulateNetworkConditions", {
    offline: false,
    latency: 150,
    downloadThroughput: 200_000,
    uploadThroughput: 94_000,
  });
  await session.send("Emulation.setCPUThrottlingRate", { rate: 4 });
}

async function observe(page: Page) {
  await page.addInitScript(() => {
    const seen = { lcp: 0, cls: 0, inp: 0, moved: "" };
    let most = 0;
    Object.assign(window, { seenVitals: seen });
    const on = (
      type: string,
      take: (
        entry: PerformanceEntry & {
          value: number;
          hadRecentInput: boolean;
          sources: { node: Node | null }[];
          interactionId: number;
        },
      ) => void,
      more = {},
    ) =>
      new PerformanceObserver((list) => {
        for (const entry of list.getEntries()) take(entry as Parameters<typeof take>[0]);
      }).observe({ type, buffered: true, ...more });
    on("largest-contentful-paint", (entry) => {
      seen.lcp = entry.startTime;
    });
    on("layout-shift", (entry) => {
      if (entry.hadRecentInput) return;
      seen.cls += entry.value;
      if (entry.value <= most) return;
      most = entry.value;
      const nodes = entry.sources.map(({ node }) => node?.textContent?.slice(0, 30) ?? "");
      seen.moved = `${entry.value.toFixed(3)} at ${Math.round(entry.startTime)} ms: ${nodes.join(" | ")}`;
    });
    on(
      "event",
      (entry) => {
        if (entry.interactionId > 0) seen.inp = Math.max(seen.inp, entry.duration);
      },
      { durationThreshold: 16 },
    );
  });
}

const read = (page: Page) =>
  page.evaluate(() => {
    const [navigation] = performance.getEntriesByType("navigation") as PerformanceNavigationTiming[];
    const fcp = performance.getEntriesByName("first-contentful-paint")[0]?.startTime ?? 0;
    const { seenVitals } = window as unknown as { seenVitals: { lcp: number; cls: number; inp: number; moved: string } };
    return { ttfb: navigation.responseStart, fcp, ...seenVitals };
  });

const median = (values: readonly number[]) => values.toSorted((a, b) => a - b)[Math.floor(values.length / 2)];

/** The median of several loads, each in a tab of its own without a cache. */
async function measure(
  name: string,
  open: () => Promise<Page>,
  path: string | (() => Promise<string>),
  act?: (page: Page) => Promise<void>,
) {
  const all: (Vitals & { readonly moved: string })[] = [];
  for (let run = 0; run < RUNS; run++) {
    const page = await open();
    await observe(page);
    await slowDown(page);
    await page.goto(typeof path === "string" ? path : await path());
    await untilTakenOver(page);
    await untilSettled(page);
    await act?.(page);
    all.push(await read(page));
    await page.close();
  }
  const keys = ["ttfb", "fcp", "lcp", "cls", "inp"] as const;
  const middle = Object.fromEntries(keys.map((key) => [key, median(all.map((one) => one[key]))])) as Vitals;
  const figure = (key: (typeof keys)[number]) => `${key} ${middle[key].toFixed(key === "cls" ? 3 : 0)} (bar ${BARS[key]})`;
  console.log(`${name}: ${keys.map(figure).join(", ")}`);
  const moved = all.map((one) => one.moved).join("; ");
  expect.soft(middle.cls, `${name}: what moved most: ${moved}`).toBeLessThanOrEqual(BARS.cls);
  expect(middle.lcp, `${name}: LCP was seen`).toBeGreaterThan(0);
}

test("pages appear soon and stay in place on a slow machine and a slow line", async ({ context, team, anotherPerson }) => {
  test.setTimeout(300_000);
  const visitor = (await anotherPerson()).context();
  const plant = await storedPlant(team.lead.request);
  const design = await storedDesign(team.lead.request, plant);
  await measure("front door", () => visitor.newPage(), "/");
  await measure("sign-in", () => visitor.newPage(), "/sign-in");
  await measure("plants", () => context.newPage(), "/plants");
  await measure("design", () => context.newPage(), `/plants/${plant.id}/designs/${design.id}`);
});

test("typing and pasting into a matrix answer at once on a slow machine", async ({ context, team }) => {
  test.setTimeout(200_000);
  await context.grantPermissions(["clipboard-read", "clipboard-write"]);
  // A plant for each load: what was typed before would come back.
  const path = async () => `/plants/${(await storedPlant(team.lead.request)).id}`;
  await measure(
    "plant, typing",
    () => context.newPage(),
    path,
    async (page) => {
      await cellOf(page, "A", 1, 1).click();
      for (const entry of ["1.5", "-2", "k/m", "0.25"]) {
        await page.keyboard.type(entry);
        await page.keyboard.press("ArrowRight");
      }
      await expect(cellOf(page, "A", 1, 4)).toHaveText("0.25");
      await pasteAt(page, cellOf(page, "A", 1, 1), "1 2 3 4\n5 6 7 8\n9 1 2 3\n4 5 6 7");
      await expect(cellOf(page, "A", 4, 4)).toHaveText("7");
    },
  );
});

test("unsaved work comes back without moving the page", async ({ context, team }) => {
  test.setTimeout(300_000);
  const plant = await storedPlant(team.lead.request);
  const design = await storedDesign(team.lead.request, plant);
  const isBack = (page: Page) => expect(page.getByText("Your unsaved changes are back.")).toBeInViewport();
  const [first, second] = [await context.newPage(), await context.newPage()];
  await openPlant(first, `/plants/${plant.id}`);
  await changeEntry(first, 3, 3, "-0.77");
  await untilKept(first, "-0.77");
  await openDesign(second, designPath(design));
  await figure(second, "Largest deviation of x1, m").fill("0.00077");
  await untilKept(second, "0.00077");
  await Promise.all([first.close(), second.close()]);
  await measure("plant, work back", () => context.newPage(), `/plants/${plant.id}`, isBack);
  await measure("design, work back", () => context.newPage(), designPath(design), isBack);
});
