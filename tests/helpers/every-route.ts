import { randomUUID } from "node:crypto";
import { readdirSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { twoTanks } from "@/app/api/v1/computations/example";
import { METHODS, type Method } from "@/lib/api/openapi";
import { requestReset } from "@/lib/services/account/request-reset";
import { issue } from "@/lib/services/team/invite";
import { type Call, call } from "./call-route";
import { lastSecretTo } from "./last-mail";
import { memberOf, newEmail, newTeam, PASSWORD, someone, visitor } from "./people";
import { twoCarriages } from "./plant-content";
import { byWeights } from "./recipes";
import type { Stock } from "./stocked-team";

const folder = fileURLToPath(new URL("../../app/api/", import.meta.url));

type Handler = (request: Request, context: { readonly params: Promise<unknown> }) => Promise<Response>;
export type Served = { readonly name: string; readonly method: Method; readonly address: string; readonly handler: Handler };

/** Every method of every route file under `app/api`, found by walking the folders. */
export async function everyRoute(): Promise<Served[]> {
  const files = readdirSync(folder, { recursive: true, encoding: "utf8" }).filter((file) => file.endsWith("route.ts"));
  const served: Served[] = [];
  for (const file of files.sort()) {
    const module: Partial<Record<Method, Handler>> = await import(/* @vite-ignore */ `${folder}${file}`);
    const address = `/api/${file.replace(/\/route\.ts$/, "").replace(/\[(\.*\w+)\]/g, "{$1}")}`;
    for (const method of METHODS) {
      const handler = module[method];
      if (handler) served.push({ name: `${method} ${address}`, method, address, handler });
    }
  }
  return served;
}

/** Whom a request is made for: whose own things it may have to name. */
export type Asker = { readonly teamId: string; readonly userId: string; readonly email: string };
export type Sent = Pick<Call, "body"> & {
  readonly query?: string;
  readonly ids?: Readonly<Record<string, string>>;
  readonly headers?: Readonly<Record<string, string>>;
};
type Make = (stock: Stock, asker: Asker) => Sent | Promise<Sent>;

const nothing: Make = () => ({});
const body =
  (sent: unknown): Make =>
  () => ({ body: sent });
/** A change of what is stored as it stands now. */
const change =
  (address: string, sent?: unknown): Make =>
  async ({ api, addressOf }) => {
    const { version } = await api.get<{ version: number }>(addressOf(address));
    return { body: sent, headers: { "if-match": `"${version}"` } };
  };
const freshMember: Make = async ({ ctx }) => {
  const { userId } = await memberOf(ctx.teamId, "engineer");
  return { body: { role: "reviewer" }, ids: { userId } };
};

const recipe = byWeights();
const content = twoCarriages();
/** The same for each draft, so that whoever kept one removes it. */
const draftMark = randomUUID();

/** A request to each route that its stocked team's lead would have carried out; those left out need nothing but their address. */
const REQUESTS: Readonly<Record<string, Make>> = {
  "PATCH /api/v1/account": body({ name: "Renamed Person" }),
  "POST /api/v1/account/password": body({ currentPassword: PASSWORD, newPassword: "eleven gimbals at dawn" }),
  "DELETE /api/v1/account/sessions": body({ which: "others" }),
  "POST /api/v1/account/team": body({ name: "Second team" }),
  "PUT /api/v1/account/team": (_, { teamId }) => ({ body: { teamId } }),
  "POST /api/v1/account/tokens": body({ name: "Script", scope: "read", expiresInDays: 1 }),
  "DELETE /api/v1/account/tokens/{tokenId}": async ({ tokenOf, ctx }, asker) => ({
    ids: { tokenId: await tokenOf(asker.teamId === ctx.teamId ? asker : ctx) },
  }),
  "POST /api/v1/checks": body({ content }),
  "POST /api/v1/comparisons": ({ ids, designRevisionIds }) => ({
    body: { plantId: ids.plantId, title: "Both", designRevisionIds },
  }),
  "DELETE /api/v1/comparisons/{comparisonId}": change("/api/v1/comparisons/{comparisonId}"),
  "POST /api/v1/computations": body(twoTanks),
  "PATCH /api/v1/designs/{designId}": change("/api/v1/designs/{designId}", { name: "Renamed" }),
  "POST /api/v1/designs/{designId}/archive": change("/api/v1/designs/{designId}", { archived: false }),
  "POST /api/v1/designs/{designId}/duplicate": body({ name: "Copy" }),
  "POST /api/v1/designs/{designId}/revisions": (stock, asker) =>
    change("/api/v1/designs/{designId}", { plantRevisionId: stock.ids.revisionId, recipe })(stock, asker),
  "POST /api/v1/invitations/accept": async (_, { email }) => {
    const { secret } = await issue(await newTeam(), { email, role: "engineer" });
    return { body: { secret } };
  },
  "POST /api/v1/invitations/join": async ({ ctx }) => {
    const { secret } = await issue(ctx, { email: newEmail(), role: "engineer" });
    return { body: { secret, name: "Joiner", password: PASSWORD } };
  },
  "POST /api/v1/password-resets": () => ({ body: { email: newEmail() } }),
  "POST /api/v1/password-resets/use": async ({ adminUrl }) => {
    const { email } = await someone();
    await requestReset(visitor(), { email });
    return { body: { secret: await lastSecretTo(adminUrl, email), password: "twelve stages at noon" } };
  },
  "POST /api/v1/plants": body({ name: "New", content }),
  "PATCH /api/v1/plants/{plantId}": change("/api/v1/plants/{plantId}", { name: "Renamed" }),
  "POST /api/v1/plants/{plantId}/archive": change("/api/v1/plants/{plantId}", { archived: false }),
  "PUT /api/v1/plants/{plantId}/criteria": change("/api/v1/plants/{plantId}", { criteria: [] }),
  "POST /api/v1/plants/{plantId}/designs": ({ ids }) => ({
    body: { name: "New", plantRevisionId: ids.revisionId, recipe },
  }),
  "GET /api/v1/plants/{plantId}/difference": ({ ids }) => ({ query: `?from=${ids.revisionId}&to=${ids.revisionId}` }),
  "PUT /api/v1/plants/{plantId}/drafts/{subjectId}": ({ ids }) => ({
    body: { mark: draftMark, plantRevisionId: ids.revisionId, base: null, form: {} },
  }),
  "DELETE /api/v1/plants/{plantId}/drafts/{subjectId}": () => ({ query: `?marks=${draftMark}` }),
  "POST /api/v1/plants/{plantId}/duplicate": body({ name: "Copy" }),
  "POST /api/v1/plants/{plantId}/revisions": change("/api/v1/plants/{plantId}", { content }),
  "GET /api/v1/plants/{plantId}/side-by-side": ({ designRevisionIds }) => ({ query: `?designs=${designRevisionIds.join(",")}` }),
  "POST /api/v1/sign-up": () => ({ body: { name: "New", email: newEmail(), password: PASSWORD, teamName: "New team" } }),
  "PATCH /api/v1/team": body({ name: "Renamed Team" }),
  "POST /api/v1/team/invitations": () => ({ body: { email: newEmail(), role: "reviewer" } }),
  "DELETE /api/v1/team/invitations/{invitationId}": async ({ ctx }) => {
    const { invitation } = await issue(ctx, { email: newEmail(), role: "engineer" });
    return { ids: { invitationId: invitation.id } };
  },
  "PATCH /api/v1/team/members/{userId}": freshMember,
  "DELETE /api/v1/team/members/{userId}": async (stock, asker) => ({ ids: (await freshMember(stock, asker)).ids }),
  "POST /api/v1/templates": ({ template }) => ({ body: { name: "New", content: template } }),
  "POST /api/v1/templates/{templateId}/archive": change("/api/v1/templates/{templateId}", { archived: false }),
  "POST /api/v1/templates/{templateId}/start": body({ plantName: "Started", designName: "First", values: {} }),
};

export const requestTo = ({ name }: Served, stock: Stock, asker: Asker): Sent | Promise<Sent> =>
  (REQUESTS[name] ?? nothing)(stock, asker);

/** Calls a route for somebody, with the ids of the stocked team but for those that the request brings. */
export function send(route: Served, stock: Stock, headers: Readonly<Record<string, string>>, sent: Sent): Promise<Response> {
  const { method, address, handler } = route;
  const named = stock.idsIn(address, sent.ids);
  const path = address.replace(/\{(\w+)\}/g, (_, name: string) => named[name] ?? name);
  const more = { "idempotency-key": crypto.randomUUID(), ...headers, ...sent.headers };
  return call(handler, { method, path: `${path}${sent.query ?? ""}`, params: named, headers: more, body: sent.body });
}
