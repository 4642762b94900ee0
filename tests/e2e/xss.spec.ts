import type { Page } from "@playwright/test";
import { untilSettled } from "../helpers/axe-page";
import { newEmail, signUpAs, told } from "../helpers/browser-requests";
import { waitForMail } from "../helpers/mailbox";
import { openPlant, untilTakenOver } from "../helpers/matrix-page";
import { twoCarriages } from "../helpers/plant-content";
import { expect, storedDesign, storedPlant, test } from "../helpers/team-test";

/** Each would set `planted` if any part of a page took it for markup or script; none is longer than a signal's name may be. */
const PAYLOADS = [
  "<script>planted=1</script>",
  "<img src=x onerror=planted=1>",
  "<svg onload=planted=1>",
  "<svg><script>planted=1</script>",
  '"><img src=x onerror=planted=1>',
  "'><svg/onload=planted=1>",
  "</title><img src=x onerror=planted=1>",
  "</textarea><svg onload=planted=1>",
  "<iframe srcdoc='<p onclick=planted=1>'>",
  "<a href=javascript:planted=1>x</a>",
  "<body onload=planted=1>",
  "<details open ontoggle=planted=1>",
  "<input autofocus onfocus=planted=1>",
  "<math><mtext><img src=x onerror=planted=1>".slice(0, 40),
  "<style>*{display:none}</style>",
  "<b>bold</b><sub>2</sub>",
  "{{planted=1}}#{planted=1}[planted=1]",
  "javascript:planted=1",
  "&lt;img src=x&gt; &amp; %3Cb%3E",
  "--><!--<img src=x onerror=planted=1>",
] as const;

async function expectPlainText(page: Page, texts: readonly string[]) {
  for (const text of texts) expect.soft(await page.getByText(text, { exact: false }).count(), text).toBeGreaterThan(0);
  const made = await page.evaluate(() => ({
    ran: "planted" in window,
    elements: document.querySelectorAll(
      "img[src=x], iframe, svg[onload], [onerror], [onload], [ontoggle], [onfocus], a[href^=javascript]",
    ).length,
  }));
  expect(made).toEqual({ ran: false, elements: 0 });
}

test("twenty names that are markup or script stand as text on every page that shows them", async ({ anotherPerson }) => {
  test.setTimeout(180_000);
  expect(new Set(PAYLOADS).size).toBe(20);
  const page = await anotherPerson();
  const lead = page.request;
  await signUpAs(lead, PAYLOADS[2]);
  await told(lead, "/api/v1/team", { method: "PATCH", data: { name: PAYLOADS[1] } });
  const states = PAYLOADS.map((name, index) => ({ name, unit: name.slice(0, 24), axis: index % 2, scale: null }));
  const size = states.length;
  const zeros = (rows: number, columns: number) => Array.from({ length: rows }, () => new Array<string>(columns).fill("0"));
  const plant = await storedPlant(lead, {
    name: PAYLOADS[6],
    axes: [
      { name: PAYLOADS[0], tag: "<b>" },
      { name: PAYLOADS[4], tag: "<i>" },
    ],
    states,
    inputs: PAYLOADS.slice(0, 2).map((name) => ({ name, unit: "<i>", axis: 0, scale: 1, lower: null, upper: null })),
    outputs: PAYLOADS.slice(15, 17).map((name) => ({ name, unit: "<i>", axis: 1, scale: 1 })),
    A: zeros(size, size).map((row, r) => row.map((_, c) => (r === c ? "-1" : c === r + 1 ? "1" : "0"))),
    B: zeros(size, 2).map((_, r) => (r === size - 1 ? ["1", "0"] : r === size - 2 ? ["0", "1"] : ["0", "0"])),
    C: zeros(2, size).map((row, r) => row.map((_, c) => (c === r ? "1" : "0"))),
    parameters: PAYLOADS.map((note, index) => ({ name: `p${index}`, expression: "1", unit: note.slice(0, 24), note })),
    source: PAYLOADS.join("\n"),
  });
  const { content } = await told<{ content: ReturnType<typeof twoCarriages> }>(
    lead,
    `/api/v1/plants/${plant.id}/revisions/${plant.currentRevision.id}`,
  );
  await told(lead, `/api/v1/plants/${plant.id}/revisions`, {
    data: { content: { ...content, source: "changed" }, note: PAYLOADS[3] },
    version: plant.version,
  });
  await openPlant(page, `/plants/${plant.id}`);
  await untilSettled(page);
  await expectPlainText(page, [...PAYLOADS, "changed"]);
  await expect(page).toHaveTitle(`${PAYLOADS[6]} · Gainwright`);
  for (const [tab, texts] of [
    [/^Signals/, [PAYLOADS[0]]],
    [/^Parameters/, []],
    [/^History/, [PAYLOADS[3], PAYLOADS[2]]],
  ] as const) {
    await page.getByRole("tab", { name: tab }).click();
    await untilSettled(page);
    await expectPlainText(page, texts);
  }
  const notes = page.getByLabel(/^Note of parameter/);
  expect(await notes.evaluateAll((fields) => fields.map((field) => (field as HTMLInputElement).value))).toEqual([...PAYLOADS]);
  for (const path of ["/plants", "/team", "/team?tab=trail", "/account"]) {
    await page.goto(path);
    await untilTakenOver(page);
    await untilSettled(page);
    await expectPlainText(page, path === "/plants" ? [PAYLOADS[1], PAYLOADS[6]] : [PAYLOADS[1]]);
  }
});

test("twenty names and notes of designs stand as text on the pages of designs and over their curves", async ({ page, team }) => {
  test.setTimeout(180_000);
  const lead = team.lead.request;
  const { states, inputs, outputs, axes } = twoCarriages();
  const plant = await storedPlant(lead, {
    axes: axes.map((axis, index) => ({ ...axis, name: PAYLOADS[8 + index] })),
    states: states.map((state, index) => ({ ...state, name: PAYLOADS[index] })),
    inputs: inputs.map((input, index) => ({ ...input, name: PAYLOADS[4 + index], unit: PAYLOADS[15].slice(0, 24) })),
    outputs: outputs.map((output, index) => ({ ...output, name: PAYLOADS[index === 0 ? 1 : 15], unit: "<i>m</i>" })),
  });
  const first = await storedDesign(lead, plant, PAYLOADS[9]);
  const second = await storedDesign(lead, plant, PAYLOADS[13]);
  const compared = [first.currentRevision.id, second.currentRevision.id];
  await told(lead, "/api/v1/comparisons", {
    data: { plantId: plant.id, title: PAYLOADS[11], note: PAYLOADS[12], designRevisionIds: compared },
  });
  for (const [path, texts] of [
    [`/plants/${plant.id}?tab=designs`, [PAYLOADS[9], PAYLOADS[13]]],
    [`/plants/${plant.id}/designs/${first.id}`, [PAYLOADS[9], PAYLOADS[0], PAYLOADS[4], PAYLOADS[15]]],
    [`/plants/${plant.id}/side-by-side?designs=${compared.join(",")}`, [PAYLOADS[9], PAYLOADS[13], PAYLOADS[11]]],
  ] as const) {
    await page.goto(path);
    await untilTakenOver(page);
    await untilSettled(page);
    await expectPlainText(page, texts);
  }
  const chart = page.locator(".js-plotly-plot").first();
  await page
    .getByRole("heading", { name: /response/i })
    .first()
    .scrollIntoViewIfNeeded();
  await expect(chart).toBeVisible({ timeout: 30_000 });
  await expectPlainText(page, []);
  expect(await chart.locator("svg tspan[style*='font-weight'], svg tspan[style*='font-style']").count()).toBe(0);
});

test("mails carry a team's and a person's name as text", async ({ anotherPerson }) => {
  const lead = (await anotherPerson()).request;
  await signUpAs(lead, PAYLOADS[5]);
  await told(lead, "/api/v1/team", { method: "PATCH", data: { name: PAYLOADS[4] } });
  const email = newEmail();
  await told(lead, "/api/v1/team/invitations", { data: { email, role: "engineer" } });
  const mail = await waitForMail(email, /invites you to the team/);
  expect(mail.subject).toBe(`${PAYLOADS[5]} invites you to the team ${PAYLOADS[4]}`);
  expect(mail.html).not.toMatch(/<img|<svg|<script/i);
  expect(mail.html).toContain("&lt;img src=x onerror=planted=1&gt;");
  expect(mail.text).toContain(PAYLOADS[4]);
});
