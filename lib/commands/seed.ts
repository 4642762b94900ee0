import { randomUUID } from "node:crypto";
import { inTransaction } from "@/db/client";
import { findPlant } from "@/db/queries/plants";
import { Criteria } from "@/lib/schemas/criteria";
import { CreatePlant, type PlantContent } from "@/lib/schemas/plant";
import { Recipe } from "@/lib/schemas/recipe";
import { TemplateContent } from "@/lib/schemas/template";
import { signUp } from "@/lib/services/account/sign-up";
import { saveComparison } from "@/lib/services/comparisons/save";
import type { Context, Visitor } from "@/lib/services/context";
import { createDesign } from "@/lib/services/designs/create";
import { addPlantRevision } from "@/lib/services/plants/add-revision";
import { createPlant } from "@/lib/services/plants/create";
import { setCriteria } from "@/lib/services/plants/set-criteria";
import { joinByInvitation } from "@/lib/services/team/accept-invitation";
import { issue } from "@/lib/services/team/invite";
import { publishTemplate } from "@/lib/services/templates/publish";
import gantry from "./demo/cross-beam-gantry.json";
import tanks from "./demo/heated-tanks.json";
import stage from "./demo/levitation-stage.json";
import platform from "./demo/tethered-platform.json";
import ladle from "./demo/tilting-ladle.json";
import web from "./demo/web-line.json";
import { demoAccounts, demoPassword, demoTeam } from "./demo-accounts.mjs";

type DemoPlant = {
  readonly name: string;
  readonly note: string;
  readonly criteria: unknown;
  readonly content: unknown;
  readonly designs: readonly DemoDesign[];
};
type DemoDesign = { readonly name: string; readonly note: string; readonly recipe: unknown };

const requestId = randomUUID();
const visitor: Visitor = { address: "127.0.0.1", requestId };

/** The lead starts the team and invites the others, through the same verbs as everybody. */
async function seedPeople(): Promise<Context> {
  const [lead, ...others] = demoAccounts;
  const { teamId, userId } = await signUp(visitor, {
    name: lead.name,
    email: lead.email,
    password: demoPassword,
    teamName: demoTeam,
  });
  const ctx: Context = { teamId, userId, role: "lead", scope: "write", requestId };
  for (const { name, email, role } of others) {
    const { secret } = await issue(ctx, { email, role });
    await joinByInvitation(visitor, { secret, name, password: demoPassword });
  }
  return ctx;
}

async function seedPlant(ctx: Context, { name, note, criteria, content, designs }: DemoPlant) {
  const plant = await createPlant(ctx, CreatePlant.parse({ name, note, content }));
  await setCriteria(ctx, plant.id, plant.version, Criteria.parse(criteria));
  const revisionIds: string[] = [];
  for (const design of designs) {
    const recipe = Recipe.parse(design.recipe);
    const plantRevisionId = plant.currentRevision.id;
    const made = await createDesign(ctx, plant.id, { name: design.name, note: design.note, plantRevisionId, recipe });
    revisionIds.push(made.currentRevision.id);
  }
  return { plantId: plant.id, revisionIds };
}

/** The carriage was weighed again after the designs were made: they stay, and are said to be outdated. */
async function weighCarriageAgain(ctx: Context, plantId: string) {
  const plant = await inTransaction(ctx, (tx) => findPlant(tx, { teamId: ctx.teamId, plantId }));
  if (!plant) throw new Error("The demo gantry is gone.");
  const { content } = CreatePlant.parse({ name: gantry.name, content: gantry.content });
  const parameters = content.parameters.map((parameter) =>
    parameter.name === "mc" ? { ...parameter, expression: "9.4" } : parameter,
  );
  await addPlantRevision(ctx, plantId, plant.version, {
    content: { ...content, parameters },
    note: "Carriage weighed with its cable chain",
  });
}

const open = (content: PlantContent, name: string, range: { lowest: number; highest: number; help: string }) => {
  const parameter = content.parameters.find((candidate) => candidate.name === name);
  if (!parameter) throw new Error(`The demo template has no parameter ${name}.`);
  return { name, unit: parameter.unit, suggested: Number(parameter.expression), ...range };
};

async function seedTemplate(ctx: Context) {
  const { content: plant } = CreatePlant.parse({ name: gantry.name, content: gantry.content });
  const content = TemplateContent.parse({
    plant,
    recipe: gantry.designs[1].recipe,
    criteria: gantry.criteria,
    openParameters: [
      open(plant, "Mb", { lowest: 20, highest: 80, help: "Cross beam without the carriage, weighed or from the drawing." }),
      open(plant, "mc", { lowest: 2, highest: 20, help: "Carriage with camera and its share of the cable chain." }),
      open(plant, "c", { lowest: 0, highest: 0.5, help: "Distance of the carriage from the beam centre in the worst position." }),
      open(plant, "kth", {
        lowest: 5000,
        highest: 200000,
        help: "Yaw stiffness of the guides, from the measured racking frequency.",
      }),
    ],
  });
  const description = "Two linear motors on one beam with an off-centre carriage. Fill in masses and guide stiffness.";
  await publishTemplate(ctx, { name: "Cross-beam gantry", description, content });
}

/** The demo team with its people, plants, designs, a template and a comparison. Runs once, on a database without it. */
export async function seedDemoData(): Promise<void> {
  const ctx = await seedPeople();
  const first = await seedPlant(ctx, gantry);
  for (const plant of [platform, web, stage, tanks, ladle]) await seedPlant(ctx, plant);
  await saveComparison(ctx, {
    plantId: first.plantId,
    title: "Which gantry weighting goes to review",
    note: "Same 0.5 mm move for all three.",
    designRevisionIds: first.revisionIds,
  });
  await weighCarriageAgain(ctx, first.plantId);
  await seedTemplate(ctx);
}
