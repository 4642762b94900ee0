import { type BrowserContext, type BrowserContextOptions, test as base, expect, type Page } from "@playwright/test";
import { newAddress } from "./browser-requests";

type Watch = {
  /** What a test provokes on purpose, such as a 401: `test.use({ expectedProblems: [/status of 401/] })`. */
  expectedProblems: RegExp[];
  problems: string[];
  /** A page of somebody else, with cookies of their own, watched like the first. */
  anotherPerson: (options?: BrowserContextOptions) => Promise<Page>;
};

/** Puts everything a clean page never says into `problems`. */
async function watch(context: BrowserContext, problems: string[]) {
  await context.setExtraHTTPHeaders(newAddress());
  await context.exposeBinding("gainwrightReportViolation", (_source, text: string) => problems.push(`content policy: ${text}`));
  await context.addInitScript(() => {
    document.addEventListener("securitypolicyviolation", ({ effectiveDirective, blockedURI, sourceFile, lineNumber }) => {
      const report = (window as unknown as { gainwrightReportViolation: (text: string) => void }).gainwrightReportViolation;
      report(`${effectiveDirective} refused ${blockedURI} at ${sourceFile}:${lineNumber}`);
    });
  });
  context.on("console", (message) => {
    const text = message.text();
    if (message.type() === "error" || /hydrat/i.test(text)) problems.push(`console ${message.type()}: ${text}`);
  });
  context.on("weberror", (error) => problems.push(`page error: ${error.error().message}`));
}

/** Playwright's test, which also fails on a violated content policy, a console error, a page error or a hydration warning. */
export const test = base.extend<Watch>({
  expectedProblems: [[], { option: true }],
  problems: async ({ expectedProblems }, use) => {
    const problems: string[] = [];
    await use(problems);
    const unexpected = problems.filter((problem) => !expectedProblems.some((expected) => expected.test(problem)));
    expect(unexpected, "what the browser complained about").toEqual([]);
  },
  context: async ({ context, problems }, use) => {
    await watch(context, problems);
    await use(context);
  },
  anotherPerson: async ({ browser, baseURL, problems }, use) => {
    const contexts: BrowserContext[] = [];
    await use(async (options) => {
      const context = await browser.newContext({ baseURL, ...options });
      contexts.push(context);
      await watch(context, problems);
      return context.newPage();
    });
    for (const context of contexts) await context.close();
  },
});

export { expect };
