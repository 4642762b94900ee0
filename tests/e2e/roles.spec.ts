import type { Page } from "@playwright/test";
import { RIGHTS, type Right } from "@/lib/permissions/rights";
import type { DesignSummary } from "@/lib/schemas/design";
import type { PlantSummary } from "@/lib/schemas/plant";
import type { Role } from "@/lib/schemas/team";
import type { Template } from "@/lib/schemas/template";
import { ask, mailedSecret, newEmail, signUpAs, told } from "../helpers/browser-requests";
import { openPlant, untilTakenOver } from "../helpers/matrix-page";
import { twoCarriages } from "../helpers/plant-content";
import { expect, storedDesign, storedPlant, storedTemplate, test } from "../helpers/team-test";

type Things = { readonly plant: PlantSummary; readonly design: DesignSummary; readonly template: Template };

/** Whether what a right offers is on the page; undefined where nothing of it is shown. */
type Offer = {
  readonly right: Right;
  readonly path: (things: Things) => string;
  readonly seen: (page: Page) => ReturnType<Page["locator"]>;
};
const button = (name: string | RegExp) => (page: Page) => page.getByRole("button", { name });
const link = (name: string) => (page: Page) => page.getByRole("main").getByRole("link", { name, exact: true });
const plantPage = ({ plant }: Things) => `/plants/${plant.id}`;
const designPage = ({ plant, design }: Things) => `/plants/${plant.id}/designs/${design.id}`;

const OFFERS: readonly Offer[] = [
  { right: "plant:write", path: () => "/plants", seen: link("New plant") },
  { right: "plant:write", path: () => "/plants/new", seen: button("Save plant") },
  { right: "plant:write", path: plantPage, seen: button("Save revision 2") },
  { right: "plant:write", path: plantPage, seen: button(/^More for/) },
  { right: "plant:write", path: (things) => `${plantPage(things)}?tab=signals`, seen: button("Add state") },
  { right: "plant:write", path: (things) => `${plantPage(things)}?tab=parameters`, seen: button("Add parameter") },
  { right: "plant:write", path: (things) => `${plantPage(things)}?tab=criteria`, seen: button("Add criterion") },
  { right: "design:write", path: plantPage, seen: link("New design") },
  { right: "design:write", path: (things) => `${plantPage(things)}/designs/new`, seen: button("Save design") },
  { right: "design:write", path: designPage, seen: button("Save revision 2") },
  { right: "design:write", path: designPage, seen: button(/^Design: rename/) },
  { right: "template:publish", path: plantPage, seen: button("Save as template") },
  { right: "template:publish", path: ({ template }) => `/templates/${template.id}`, seen: button("Archive") },
  { right: "template:use", path: ({ template }) => `/templates/${template.id}`, seen: button("Start the plant and its design") },
  { right: "team:manage", path: () => "/team", seen: button("Rename the team") },
  { right: "team:manage", path: () => "/team", seen: button("Invite") },
  { right: "team:manage", path: () => "/team", seen: (page) => page.getByLabel(/^Role of/).first() },
  { right: "outbox:read", path: () => "/outbox", seen: button("Look again") },
  { right: "audit:read", path: () => "/team?tab=trail", seen: (page) => page.getByRole("table", { name: "Audit trail" }) },
  { right: "token:own", path: () => "/account", seen: button("Make an access token") },
  { right: "account:own", path: () => "/account", seen: button("Change the password") },
  { right: "team:read", path: () => "/team", seen: (page) => page.getByRole("table", { name: "Members of the team" }) },
  { right: "plant:read", path: plantPage, seen: (page) => page.getByRole("table", { name: "Modes of the plant" }) },
  { right: "design:read", path: designPage, seen: (page) => page.getByRole("heading", { name: "Coupled response" }) },
  { right: "template:read", path: () => "/templates", seen: link("Two carriages on a beam") },
];

async function makeThings(request: Parameters<typeof storedPlant>[0]): Promise<Things> {
  const plant = await storedPlant(request);
  return { plant, design: await storedDesign(request, plant), template: await storedTemplate(request) };
}

for (const role of ["lead", "engineer", "reviewer"] as const satisfies readonly Role[]) {
  test(`${role === "engineer" ? "an" : "a"} ${role} is offered exactly what the table of rights allows`, async ({
    page: own,
    team,
    colleague,
  }) => {
    test.setTimeout(180_000);
    const things = await makeThings(team.lead.request);
    const page = role === "lead" ? own : await colleague(role);
    for (const { right, path, seen } of OFFERS) {
      const allowed = (RIGHTS[right].roles as readonly Role[]).includes(role);
      const address = path(things);
      await test.step(`${right} at ${address}: ${allowed}`, async () => {
        if (new URL(page.url(), "http://none").pathname + new URL(page.url(), "http://none").search !== address) {
          await page.goto(address);
          await untilTakenOver(page);
        }
        await expect(page.getByRole("heading", { level: 1 })).toBeVisible();
        if (allowed) await expect(seen(page)).toBeVisible({ timeout: 20_000 });
        else await expect(seen(page)).toHaveCount(0);
      });
    }
  });
}

/** One change for each right, sent as the page would send it. */
const changes = ({
  plant,
  design,
  template,
}: Things): readonly { right: Right; path: string; sent: Parameters<typeof ask>[2] }[] => [
  { right: "plant:write", path: "/api/v1/plants", sent: { data: { name: "Refused", content: twoCarriages(), note: "" } } },
  {
    right: "plant:write",
    path: `/api/v1/plants/${plant.id}`,
    sent: { method: "PATCH", data: { name: "Refused" }, version: plant.version },
  },
  {
    right: "plant:write",
    path: `/api/v1/plants/${plant.id}/archive`,
    sent: { data: { archived: true }, version: plant.version },
  },
  { right: "plant:write", path: `/api/v1/plants/${plant.id}/duplicate`, sent: { data: { name: "Refused" } } },
  {
    right: "plant:write",
    path: `/api/v1/plants/${plant.id}/revisions`,
    sent: { data: { content: twoCarriages(), note: "" }, version: plant.version },
  },
  {
    right: "design:write",
    path: `/api/v1/designs/${design.id}`,
    sent: { method: "PATCH", data: { name: "Refused" }, version: design.version },
  },
  {
    right: "design:write",
    path: `/api/v1/designs/${design.id}/archive`,
    sent: { data: { archived: true }, version: design.version },
  },
  { right: "design:write", path: `/api/v1/designs/${design.id}/duplicate`, sent: { data: { name: "Refused" } } },
  { right: "template:publish", path: "/api/v1/templates", sent: { data: { name: "Refused", content: template.content } } },
  {
    right: "template:publish",
    path: `/api/v1/templates/${template.id}/archive`,
    sent: { data: { archived: true }, version: template.version },
  },
  {
    right: "template:use",
    path: `/api/v1/templates/${template.id}/start`,
    sent: { data: { plantName: "Refused", designName: "Refused", values: { m: 12 } } },
  },
  { right: "team:manage", path: "/api/v1/team", sent: { method: "PATCH", data: { name: "Refused" } } },
  { right: "team:manage", path: "/api/v1/team/invitations", sent: { data: { email: newEmail(), role: "lead" } } },
  { right: "team:manage", path: "/api/v1/team/invitations", sent: {} },
  { right: "outbox:read", path: "/api/v1/team/outbox", sent: {} },
];

for (const role of ["engineer", "reviewer"] as const) {
  test(`what ${role === "engineer" ? "an" : "a"} ${role} is not offered the service refuses too, and nothing has changed afterwards`, async ({
    team,
    colleague,
  }) => {
    const things = await makeThings(team.lead.request);
    const page = await colleague(role);
    const refused = changes(things).filter(({ right }) => !(RIGHTS[right].roles as readonly Role[]).includes(role));
    expect(refused.length).toBeGreaterThanOrEqual(5);
    for (const { path, sent } of refused) {
      const reply = await ask(page.request, path, sent);
      expect(reply.status(), path).toBe(403);
      expect((await reply.json()).detail, path).toMatch(/^This needs the role lead.*; yours is/);
    }
    const lead = team.lead.request;
    expect(await (await ask(lead, "/api/v1/plants?archived=all")).json()).toMatchObject({
      items: [{ id: things.plant.id, version: things.plant.version, name: "Two carriages" }],
    });
    expect((await (await ask(lead, "/api/v1/templates")).json()).items).toHaveLength(1);
    expect((await (await ask(lead, "/api/v1/team")).json()).name).toBe(team.name);
  });
}

test("a reviewer who follows a link to a form is told who may, or is led to what there is to read", async ({
  team,
  colleague,
}) => {
  const things = await makeThings(team.lead.request);
  const page = await colleague("reviewer");
  await page.goto("/plants/new");
  await expect(page.getByText("Reviewers read plants and do not enter them.")).toBeVisible();
  await page.goto(`/plants/${things.plant.id}/designs/new`);
  await expect(page).toHaveURL(new RegExp(`/plants/${things.plant.id}\\?tab=designs$`));
  await expect(page.getByRole("link", { name: "By deviations" })).toBeVisible();
  await page.goto("/outbox");
  await expect(page.getByText("Only a lead reads these mails.")).toBeVisible();
  await openPlant(page, `/plants/${things.plant.id}?tab=model`);
  await expect(page.getByLabel("Time base")).toBeDisabled();
  await page.getByRole("button", { name: /account menu$/ }).click();
  await expect(page.getByRole("menuitem", { name: /outbox|mail/i })).toHaveCount(0);
});

test.describe("a role that changes", () => {
  test.use({ expectedProblems: [/status of 403/] });

  test("acts at once on a page that is already open", async ({ page, team, colleague }) => {
    const plant = await storedPlant(team.lead.request);
    const engineer = await colleague("engineer");
    await openPlant(engineer, `/plants/${plant.id}`);
    await page.goto("/team");
    await untilTakenOver(page);
    await page.getByLabel("Role of Emil Varga").selectOption("reviewer");
    await expect(page.getByText("Emil Varga is a reviewer now.")).toBeVisible();
    await engineer.getByRole("button", { name: /^More for/ }).click();
    await engineer.getByRole("menuitem", { name: "Archive" }).click();
    await expect(engineer.getByText(/This needs the role lead or engineer; yours is reviewer\./).first()).toBeVisible();
    await page.getByRole("button", { name: "Undo", exact: true }).click();
    await expect(page.getByText("Emil Varga is an engineer now.")).toBeVisible();
    await engineer.getByRole("button", { name: /^More for/ }).click();
    await engineer.getByRole("menuitem", { name: "Archive" }).click();
    await expect(engineer.getByText("Two carriages is archived.")).toBeVisible();
  });

  test("a member who is removed by name is out with the next request", async ({ page, team, anotherPerson }) => {
    const engineer = await anotherPerson();
    const email = await signUpAs(engineer.request, "Udo Sander");
    await told(team.lead.request, "/api/v1/team/invitations", { data: { email, role: "engineer" } });
    const secret = await mailedSecret(email, new RegExp(`the team ${team.name}$`));
    await told(engineer.request, "/api/v1/invitations/accept", { data: { secret } });
    const plant = await storedPlant(team.lead.request);
    expect((await ask(engineer.request, `/api/v1/plants/${plant.id}`)).status()).toBe(200);
    await page.goto("/team");
    await untilTakenOver(page);
    await page.getByRole("button", { name: "Remove Udo Sander" }).click();
    const dialog = page.getByRole("dialog", { name: "Remove Udo Sander?" });
    const remove = dialog.getByRole("button", { name: "Remove from the team" });
    await expect(remove).toBeDisabled();
    await dialog.getByRole("textbox").fill("Udo Sander");
    await remove.click();
    await expect(page.getByText("Udo Sander is no longer in the team.")).toBeVisible();
    expect((await ask(engineer.request, `/api/v1/plants/${plant.id}`)).status()).toBe(401);
    await engineer.goto(`/plants/${plant.id}`);
    await expect(engineer.getByRole("heading", { level: 1, name: "Sign in" })).toBeVisible();
    await page.getByRole("tab", { name: "Audit trail" }).click();
    await expect(page.getByRole("table", { name: "Audit trail" })).toContainText(/removed the member Udo Sander/);
  });
});
