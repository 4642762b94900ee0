import type { CDPSession, Page } from "@playwright/test";
import { untilSettled } from "../helpers/axe-page";
import { openPlant, untilTakenOver } from "../helpers/matrix-page";
import { type Listed, PUBLIC_PAGES, teamPages } from "../helpers/page-list";
import { expect, test } from "../helpers/team-test";

const KILOBYTE = 1_024;
const SMALL = 180 * KILOBYTE;
const LARGE = 260 * KILOBYTE;
/** A word that the minifier leaves in what it marks: a node of the formula parser, an entry of the chart library's configuration. */
const MARKS = { "formula parser": "ParenthesisNode", "chart library": "plotlyServerURL" } as const;

type Script = { readonly path: string; readonly bytes: number; readonly first: boolean };

/** Scripts a page has fetched since `listen`, at their size on the wire; `first` are those that its document itself names. */
async function listen(page: Page) {
  const session: CDPSession = await page.context().newCDPSession(page);
  await session.send("Network.enable");
  await session.send("Network.setCacheDisabled", { cacheDisabled: true });
  const urls = new Map<string, string>();
  const sizes = new Map<string, number>();
  session.on("Network.responseReceived", ({ requestId, type, response }) => {
    if (type === "Script") urls.set(requestId, response.url);
  });
  session.on("Network.loadingFinished", ({ requestId, encodedDataLength }) => sizes.set(requestId, encodedDataLength));
  return async (html: string): Promise<Script[]> => {
    const scripts = [...urls].map(([requestId, url]) => {
      const path = new URL(url).pathname;
      return { path, bytes: sizes.get(requestId) ?? 0, first: html.includes(`src="${path}`) };
    });
    return scripts.filter(({ path }, index) => scripts.findIndex((other) => other.path === path) === index);
  };
}

const sum = (scripts: readonly Script[]) => scripts.reduce((bytes, script) => bytes + script.bytes, 0);

async function holds(page: Page, scripts: readonly Script[], mark: string): Promise<string[]> {
  const found: string[] = [];
  for (const { path } of scripts) if ((await (await page.request.get(path)).text()).includes(mark)) found.push(path);
  return found;
}

async function weigh(page: Page, { name, path }: Listed) {
  const loaded = await listen(page);
  const reply = await page.goto(path);
  await untilTakenOver(page);
  await untilSettled(page);
  const html = (await reply?.text()) ?? "";
  const scripts = await loaded(html);
  const first = scripts.filter((script) => script.first);
  console.log(
    `${name}: ${Math.round(sum(first) / KILOBYTE)} kB of script at first, ${Math.round(sum(scripts) / KILOBYTE)} kB in all`,
  );
  expect(first.length, name).toBeGreaterThan(3);
  return { first, now: () => loaded(html) };
}

test("pages for visitors and lists load at most 180 kB of script, pages of plants and designs 260 kB", async ({
  context,
  team,
  anotherPerson,
}) => {
  test.setTimeout(240_000);
  const visitor = (await anotherPerson()).context();
  const own = await teamPages(team.lead.request);
  /** Everything below one plant. */
  const isLarge = ({ path }: Listed) => /^\/plants\/./.test(path);
  for (const [seenBy, pages] of [
    [visitor, PUBLIC_PAGES],
    [context, own],
  ] as const) {
    for (const listed of pages) {
      const page = await seenBy.newPage();
      const { first } = await weigh(page, listed);
      expect.soft(sum(first) / KILOBYTE, listed.name).toBeLessThanOrEqual((isLarge(listed) ? LARGE : SMALL) / KILOBYTE);
      await page.close();
    }
  }
});

test("the formula parser comes with the plant editor alone, after its first load", async ({ context, team }) => {
  test.setTimeout(120_000);
  const wanted = new Set(["new plant", "plant"]);
  const others = new Set(["plants", "new design", "design", "templates", "template", "team", "account"]);
  for (const listed of await teamPages(team.lead.request)) {
    if (!wanted.has(listed.name) && !others.has(listed.name)) continue;
    const page = await context.newPage();
    const { first, now } = await weigh(page, listed);
    expect.soft(await holds(page, first, MARKS["formula parser"]), `${listed.name} at first`).toEqual([]);
    const held = async () => (await holds(page, await now(), MARKS["formula parser"])).length;
    // Fetched once the page is usable, whenever that is on this machine.
    if (wanted.has(listed.name)) await expect.poll(held, { message: listed.name, timeout: 30_000 }).toBe(1);
    else expect.soft(await held(), listed.name).toBe(0);
    await page.close();
  }
});

test("the chart library comes only where a chart is seen", async ({ context, team }) => {
  test.setTimeout(120_000);
  const pages = await teamPages(team.lead.request);
  for (const name of ["plants", "plant", "design", "side-by-side"]) {
    const listed = pages.find((one) => one.name === name);
    if (!listed) throw new Error(`no page called ${name}`);
    const page = await context.newPage();
    await page.setViewportSize({ width: 1280, height: 500 });
    const loaded = await listen(page);
    await page.goto(listed.path);
    await untilTakenOver(page);
    await untilSettled(page);
    expect(await holds(page, await loaded(""), MARKS["chart library"]), `${name} at its top`).toEqual([]);
    if (name === "side-by-side") {
      await page
        .getByRole("heading", { name: /respon/i })
        .first()
        .scrollIntoViewIfNeeded();
      await page.mouse.wheel(0, 400);
      await expect(page.locator(".js-plotly-plot").first()).toBeVisible({ timeout: 30_000 });
      expect(await holds(page, await loaded(""), MARKS["chart library"])).toHaveLength(1);
    }
    await page.close();
  }
});

test("going from the list to a plant and back fetches nothing twice", async ({ page, team }) => {
  const [plant] = (await teamPages(team.lead.request)).filter(({ name }) => name === "plant");
  await openPlant(page, plant.path);
  const fetched: string[] = [];
  page.on("request", (request) => request.resourceType() === "script" && fetched.push(new URL(request.url()).pathname));
  await page.getByRole("navigation", { name: "You are here" }).getByRole("link", { name: "Plants" }).click();
  await expect(page.getByRole("heading", { level: 1, name: "Plants" })).toBeVisible();
  await page.getByRole("link", { name: "Two carriages", exact: true }).click();
  await expect(page.getByRole("heading", { level: 1, name: "Two carriages" })).toBeVisible();
  expect(fetched.filter((path, index) => fetched.indexOf(path) !== index)).toEqual([]);
});
