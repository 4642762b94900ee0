import { createAccessToken } from "@/lib/services/account/access-tokens";
import { saveComparison } from "@/lib/services/comparisons/save";
import type { Context } from "@/lib/services/context";
import { createDesign } from "@/lib/services/designs/create";
import { createPlant } from "@/lib/services/plants/create";
import { publishTemplate } from "@/lib/services/templates/publish";
import { type Api, apiOf } from "./api";
import { signedIn } from "./call-route";
import { newTeam } from "./people";
import { twoCarriages } from "./plant-content";
import { byWeights } from "./recipes";

const content = twoCarriages();
// As the schema reads it: its types are not read-only.
const recipe = JSON.parse(JSON.stringify(byWeights()));
const mass = { name: "m", unit: "kg", lowest: 5, highest: 40, suggested: 12, help: "" };
const template = { plant: content, recipe, openParameters: [mass] };

export type Ids = Readonly<Record<string, string>>;
export type Stock = {
  readonly ctx: Context;
  readonly api: Api;
  readonly adminUrl: string;
  /** `revisionId` is the plant's; an address of a design revision takes `designRevisionId` for it. */
  readonly ids: Ids;
  readonly designRevisionIds: string[];
  readonly template: typeof template;
  /** A new access token of somebody's, by its id. */
  readonly tokenOf: (who: Pick<Context, "teamId" | "userId">) => Promise<string>;
  /** What stands for the names in an address, such as `{plantId}`. */
  readonly idsIn: (address: string, others?: Ids) => Ids;
  readonly addressOf: (address: string) => string;
};

/** A team with its lead, a plant, two designs, a comparison and a template. */
export async function stockedTeam(adminUrl: string): Promise<Stock> {
  const ctx = await newTeam();
  const plant = await createPlant(ctx, { name: "Gantry", content, note: "" });
  const pinned = { plantRevisionId: plant.currentRevision.id, recipe, note: "" };
  const one = await createDesign(ctx, plant.id, { name: "One", ...pinned });
  const two = await createDesign(ctx, plant.id, { name: "Two", ...pinned });
  const designRevisionIds = [one.currentRevision.id, two.currentRevision.id];
  const comparison = await saveComparison(ctx, { plantId: plant.id, title: "Both", note: "", designRevisionIds });
  const published = await publishTemplate(ctx, { name: "Two carriages", description: "", content: template });
  const ids: Ids = {
    plantId: plant.id,
    revisionId: plant.currentRevision.id,
    designId: one.id,
    subjectId: one.id,
    designRevisionId: one.currentRevision.id,
    comparisonId: comparison.id,
    templateId: published.id,
    userId: ctx.userId,
  };
  const idsIn = (address: string, others: Ids = {}) => {
    const known: Ids = { ...ids, ...(address.includes("design-revisions") && { revisionId: ids.designRevisionId }), ...others };
    return Object.fromEntries([...address.matchAll(/\{(\w+)\}/g)].map(([, name]) => [name, known[name] ?? ""]));
  };
  const addressOf = (address: string) => address.replace(/\{(\w+)\}/g, (_, name: string) => idsIn(address)[name]);
  const tokenOf = async (who: Pick<Context, "teamId" | "userId">) => {
    const owner = { ...ctx, ...who };
    return (await createAccessToken(owner, { name: "Script", scope: "read", expiresInDays: 1 })).id;
  };
  return { ctx, api: apiOf(await signedIn(ctx)), adminUrl, ids, designRevisionIds, template, tokenOf, idsIn, addressOf };
}
