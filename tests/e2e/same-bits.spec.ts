import { join } from "node:path";
import { build } from "esbuild";
import { root } from "../../lib/commands/paths.mjs";
import { expect, test } from "../helpers/browser-test";
import { bitsOfDesigns, type DesignBits } from "../helpers/same-bits";

const DESIGNS = 100;

/** The helper and the core behind it, as a script that a page runs before its own. */
async function coreAsScript(): Promise<string> {
  const { outputFiles } = await build({
    entryPoints: [join(root, "tests/helpers/same-bits.ts")],
    bundle: true,
    write: false,
    format: "iife",
    globalName: "sameBits",
    logLevel: "warning",
  });
  return `${outputFiles[0].text};globalThis.bitsOfDesigns = sameBits.bitsOfDesigns;`;
}

type Window = { bitsOfDesigns: (count: number, accelerated: boolean) => DesignBits };

test("Chromium and Node agree on every bit of a hundred designs, with the accelerator and without", async ({ page }) => {
  await page.addInitScript({ content: await coreAsScript() });
  await page.goto("/");
  const inPage = await page.evaluate((count) => {
    const { bitsOfDesigns: run } = globalThis as unknown as Window;
    return [run(count, true), run(count, false)];
  }, DESIGNS);
  const here = [bitsOfDesigns(DESIGNS, true), bitsOfDesigns(DESIGNS, false)];
  // Under the policy of our own pages the kernel compiles, and nothing is reported.
  expect(inPage.map(({ accelerated }) => accelerated)).toEqual([true, false]);
  expect(here.map(({ accelerated }) => accelerated)).toEqual([true, false]);
  for (const { designs } of [...here, inPage[1]]) expect(designs).toEqual(inPage[0].designs);
  const computed = here[0].designs.map((parts) => Object.values(parts).filter((part) => part.startsWith("computed")).length);
  expect(computed.filter((count) => count >= 3).length).toBeGreaterThan(0.9 * DESIGNS);
  expect(new Set(here[0].designs.map(({ gains }) => gains)).size).toBe(DESIGNS);
});
