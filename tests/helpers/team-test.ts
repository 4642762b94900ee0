import { randomUUID } from "node:crypto";
import { type APIRequestContext, type Page, type PlaywrightWorkerArgs, request as requests } from "@playwright/test";
import { defaultRecipe } from "@/control/design/default-recipe";
import { evaluatePlant } from "@/control/plant/evaluate-plant";
import type { PlantModel } from "@/control/plant/model";
import type { DesignSummary } from "@/lib/schemas/design";
import type { PlantContent, PlantRevision, PlantSummary } from "@/lib/schemas/plant";
import type { Role } from "@/lib/schemas/team";
import type { Template } from "@/lib/schemas/template";
import { mailedSecret, newAddress, signUpAs, told } from "./browser-requests";
import { expect, test as watched } from "./browser-test";
import { twoCarriages } from "./plant-content";

type Person = { readonly name: string; readonly email: string; readonly request: APIRequestContext };
type Team = { readonly id: string; readonly name: string; readonly lead: Person };

/** Requests that solve are limited for each person and minute: nobody is shared by more tests than that allows for. */
const TESTS_PER_PERSON = 3;

/** Hashing passwords is slow on purpose, so a worker's people serve a few tests; each test has a team of its own. */
class Staff {
  private readonly people = new Map<Role, { person: Promise<Person>; teams: number }>();

  /** Somebody to join one more team. */
  of(role: Role): Promise<Person> {
    const known = this.people.get(role);
    const one = known && known.teams < TESTS_PER_PERSON ? known : { person: this.hire(role), teams: 0 };
    one.teams += 1;
    this.people.set(role, one);
    return one.person;
  }

  private async hire(role: Role): Promise<Person> {
    const name = { lead: "Lena Thorsen", engineer: "Emil Varga", reviewer: "Rhea Olsson" }[role];
    const request = await requests.newContext({ baseURL: process.env.BASE_URL, extraHTTPHeaders: newAddress() });
    return { name, email: await signUpAs(request, name), request };
  }

  async end(): Promise<void> {
    for (const { person } of this.people.values()) await (await person).request.dispose();
  }
}

type TeamFixtures = {
  /** The page belongs to its lead. */
  team: Team;
  /** A page of somebody else of the team. */
  colleague: (role: Role) => Promise<Page>;
};

/** The watched test of `browser-test.ts`, signed in as the lead of a new, empty team. */
export const test = watched.extend<TeamFixtures, { staff: Staff }>({
  staff: [
    async ({ playwright: _ }: PlaywrightWorkerArgs, use) => {
      const staff = new Staff();
      await use(staff);
      await staff.end();
    },
    { scope: "worker" },
  ],
  team: [
    async ({ staff, context }, use) => {
      const lead = await staff.of("lead");
      const name = `Team ${randomUUID().slice(0, 8)}`;
      const { id } = await told<{ id: string }>(lead.request, "/api/v1/account/team", { data: { name } });
      await context.addCookies((await lead.request.storageState()).cookies);
      await use({ id, name, lead });
    },
    { auto: true },
  ],
  colleague: async ({ staff, team, anotherPerson }, use) => {
    await use(async (role) => {
      const { email, request } = await staff.of(role);
      await told(team.lead.request, "/api/v1/team/invitations", { data: { email, role } });
      const secret = await mailedSecret(email, new RegExp(`the team ${team.name}$`));
      await told(request, "/api/v1/invitations/accept", { data: { secret } });
      const page = await anotherPerson();
      await page.context().addCookies((await request.storageState()).cookies);
      return page;
    });
  },
});

/** A stored plant of the team that `request` is signed in to. */
export function storedPlant(
  request: APIRequestContext,
  { name = "Two carriages", ...content }: Partial<PlantContent> & { name?: string } = {},
): Promise<PlantSummary> {
  return told<PlantSummary>(request, "/api/v1/plants", { data: { name, content: twoCarriages(content), note: "" } });
}

/** A design by the recipe that a new design starts from. */
export async function storedDesign(
  request: APIRequestContext,
  plant: PlantSummary,
  name = "By deviations",
): Promise<DesignSummary> {
  const revision = await told<PlantRevision>(request, `/api/v1/plants/${plant.id}/revisions/${plant.currentRevision.id}`);
  const recipe = defaultRecipe(revision.model as PlantModel);
  const body = { name, plantRevisionId: revision.id, recipe, note: "" };
  return told<DesignSummary>(request, `/api/v1/plants/${plant.id}/designs`, { data: body });
}

/** A template of two carriages whose mass is left open. */
export function storedTemplate(request: APIRequestContext, name = "Two carriages on a beam"): Promise<Template> {
  const plant = twoCarriages();
  const { model } = evaluatePlant(plant);
  if (!model) throw new Error("the plant of the template cannot be evaluated");
  const mass = { name: "m", unit: "kg", lowest: 8, highest: 20, suggested: 12, help: "Weigh one carriage." };
  const content = { plant, recipe: defaultRecipe(model), openParameters: [mass] };
  return told<Template>(request, "/api/v1/templates", { data: { name, description: "For either drive.", content } });
}

export { expect };
