import { expect, type Page } from "@playwright/test";
import axe from "axe-core";

type Finding = {
  readonly id: string;
  readonly nodes: readonly { readonly target: readonly string[]; readonly failureSummary?: string }[];
};
type Result = { readonly violations: readonly Finding[]; readonly incomplete: readonly Finding[] };

/** What axe cannot decide by itself, each with the reason why it holds all the same. */
const EXPLAINED: readonly { readonly rule: string; readonly summary: RegExp }[] = [
  // Coupling is hatched by a gradient; its contrast is computed from the palette in the unit tests.
  { rule: "color-contrast", summary: /due to a background gradient/ },
  // An open menu covers what stands below it.
  { rule: "color-contrast", summary: /overlapped by another element/ },
  // A dash, an infinity sign, a dot or a single digit.
  { rule: "color-contrast", summary: /only non-text characters|too short to determine/ },
  // Names and figures of curves are text in an image; their colours are those of the palette.
  { rule: "color-contrast", summary: /contains an image node/ },
  // A dialog over another one; names of curves beside their plot.
  { rule: "color-contrast", summary: /partially overlaps other elements/ },
  // A heading over rows of a table that have their own.
  { rule: "th-has-data-cells", summary: /cells are missing or empty/ },
  // Cells are named by row and column, and the name ends with what is shown.
  { rule: "label-content-name-mismatch", summary: /Unable to determine if the visible text is part of the accessible name/ },
];

const TAGS = ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa", "best-practice"];

const told = (findings: readonly Finding[]) =>
  findings.flatMap(({ id, nodes }) =>
    nodes.map(({ target, failureSummary = "" }) => `${id} at ${target.join(" ")}: ${failureSummary}`),
  );

/** Nothing that axe finds against WCAG 2.2 AA or its own best practice, and nothing left to look at. */
export async function expectAccessible(page: Page, what: string, only: "everything" | "colours" = "everything"): Promise<void> {
  const loaded = await page.evaluate(() => "axe" in window);
  if (!loaded) await page.evaluate(axe.source);
  const { violations, incomplete } = await page.evaluate(
    async (runOnly) => {
      const { axe: inPage } = window as unknown as { axe: { run: (where: Document, options: object) => Promise<Result> } };
      return inPage.run(document, { runOnly, resultTypes: ["violations", "incomplete"] });
    },
    only === "colours" ? { type: "rule", values: ["color-contrast"] } : { type: "tag", values: TAGS },
  );
  const open = incomplete
    .map((finding) => ({
      ...finding,
      nodes: finding.nodes.filter(
        ({ failureSummary = "" }) => !EXPLAINED.some(({ rule, summary }) => rule === finding.id && summary.test(failureSummary)),
      ),
    }))
    .filter(({ nodes }) => nodes.length > 0);
  expect.soft(told(violations), `${what}: violations`).toEqual([]);
  expect.soft(told(open), `${what}: left to look at`).toEqual([]);
}

/** Colours are all that the second theme can change. */
export async function inBothThemes(page: Page, what: string): Promise<void> {
  await page.emulateMedia({ colorScheme: "light" });
  await expectAccessible(page, `${what}, light`);
  await page.emulateMedia({ colorScheme: "dark" });
  await expectAccessible(page, `${what}, dark`, "colours");
}

/** Until nothing on the page says that it is still loading or solving. */
export async function untilSettled(page: Page): Promise<void> {
  await expect(page.getByRole("heading", { level: 1 }).first()).toBeVisible();
  await expect(page.locator(".skeleton:visible")).toHaveCount(0, { timeout: 30_000 });
}
