import type { APIRequestContext } from "@playwright/test";
import { told } from "./browser-requests";
import { storedDesign, storedPlant, storedTemplate } from "./team-test";

export type Listed = { readonly name: string; readonly path: string };

export const PUBLIC_PAGES: readonly Listed[] = [
  { name: "front door", path: "/" },
  { name: "sign-in", path: "/sign-in" },
  { name: "sign-up", path: "/sign-up" },
  { name: "forgotten password", path: "/forgotten-password" },
  { name: "new password", path: `/reset-password/${"x".repeat(43)}` },
  { name: "spent invitation", path: `/invitations/${"x".repeat(43)}` },
  { name: "cautions", path: "/docs/cautions" },
  { name: "API description", path: "/docs/api" },
  { name: "problems", path: "/docs/problems" },
];

/** Every page of a team that has something of everything. */
export async function teamPages(request: APIRequestContext): Promise<readonly Listed[]> {
  const plant = await storedPlant(request);
  const [first, second] = [await storedDesign(request, plant), await storedDesign(request, plant, "The same again")];
  const template = await storedTemplate(request);
  const criteria = [
    { kind: "settling", signal: null, limit: 1000 },
    { kind: "cross-peak", signal: "enc1", limit: 0.001 },
    { kind: "effort", signal: "gone", limit: 80 },
  ];
  await told(request, `/api/v1/plants/${plant.id}/criteria`, { method: "PUT", data: { criteria }, version: plant.version });
  await told(request, `/api/v1/team/invitations`, { data: { email: `guest-${plant.id}@saltmarsh.example`, role: "engineer" } });
  const at = `/plants/${plant.id}`;
  const both = `${first.currentRevision.id},${second.currentRevision.id}`;
  await told(request, "/api/v1/comparisons", {
    data: { plantId: plant.id, title: "Twins", note: "", designRevisionIds: both.split(",") },
  });
  return [
    { name: "plants", path: "/plants" },
    { name: "plants without hits", path: "/plants?search=nothing-like-it" },
    { name: "new plant", path: "/plants/new" },
    { name: "plant", path: at },
    { name: "signals", path: `${at}?tab=signals` },
    { name: "parameters", path: `${at}?tab=parameters` },
    { name: "designs", path: `${at}?tab=designs` },
    { name: "acceptance criteria", path: `${at}?tab=criteria` },
    { name: "history", path: `${at}?tab=history` },
    { name: "new design", path: `${at}/designs/new` },
    { name: "design", path: `${at}/designs/${first.id}` },
    { name: "side-by-side", path: `${at}/side-by-side?designs=${both}` },
    { name: "choice for side-by-side", path: `${at}/side-by-side` },
    { name: "templates", path: "/templates" },
    { name: "template", path: `/templates/${template.id}` },
    { name: "team", path: "/team" },
    { name: "audit trail", path: "/team?tab=trail" },
    { name: "account", path: "/account" },
    { name: "outbox", path: "/outbox" },
  ];
}
