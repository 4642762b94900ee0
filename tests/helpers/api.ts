import { randomUUID } from "node:crypto";
import { catalogue } from "@/app/api/v1/openapi.json/catalogue";
import type { Method } from "@/lib/api/openapi";
import type { Role } from "@/lib/schemas/team";
import type { Context } from "@/lib/services/context";
import { call, signedIn } from "./call-route";
import { memberOf, newTeam } from "./people";

export type Sent = {
  readonly body?: unknown;
  /** The version the change starts from. */
  readonly version?: number;
  readonly headers?: Readonly<Record<string, string>>;
};

const addresses = Object.entries(catalogue).map(([template, load]) => ({
  names: [...template.matchAll(/\{(\w+)\}/g)].map(([, name]) => name),
  shape: new RegExp(`^${template.replace(/\{\w+\}/g, "([^/]+)")}$`),
  load,
}));

/** Finds the handler of an address as the framework does, and calls it. Creates carry a key of their own unless one is given. */
export async function ask(
  headers: Readonly<Record<string, string>>,
  method: Method,
  path: string,
  { body, version, headers: more = {} }: Sent = {},
): Promise<Response> {
  const [pathname] = path.split("?");
  const found = addresses.find(({ shape }) => shape.test(pathname));
  const route = (await found?.load())?.[method];
  const [, ...ids] = found?.shape.exec(pathname) ?? [];
  if (!found || !route) throw new Error(`nothing answers ${method} ${path}`);
  const params = Object.fromEntries(found.names.map((name, index) => [name, ids[index]]));
  const all: Record<string, string> = { ...headers };
  if (route.declaration.idempotent) all["idempotency-key"] = randomUUID();
  if (version !== undefined) all["if-match"] = `"${version}"`;
  return call(route, { method, path, params, headers: { ...all, ...more }, body });
}

/** What somebody does through the API. Each method gives the body of a reply that is no refusal, and throws one that is. */
export function apiOf(headers: Readonly<Record<string, string>>) {
  const taken = async <T>(method: Method, path: string, sent?: Sent): Promise<T> => {
    const response = await ask(headers, method, path, sent);
    const text = await response.text();
    if (response.status >= 300) throw new Error(`${method} ${path} was answered ${response.status}: ${text}`);
    return JSON.parse(text);
  };
  return {
    headers,
    ask: (method: Method, path: string, sent?: Sent) => ask(headers, method, path, sent),
    get: <T>(path: string) => taken<T>("GET", path),
    post: <T>(path: string, body: unknown, version?: number) => taken<T>("POST", path, { body, version }),
    patch: <T>(path: string, body: unknown, version?: number) => taken<T>("PATCH", path, { body, version }),
    put: <T>(path: string, body: unknown, version?: number) => taken<T>("PUT", path, { body, version }),
    remove: <T>(path: string, version?: number) => taken<T>("DELETE", path, { version }),
  };
}
export type Api = ReturnType<typeof apiOf>;

/** Somebody of a team, by default the lead of a new one, on a page of ours. */
export async function member(teamId?: string, role: Role = "lead"): Promise<{ ctx: Context; api: Api }> {
  const ctx = teamId === undefined ? await newTeam() : await memberOf(teamId, role);
  return { ctx, api: apiOf(await signedIn(ctx)) };
}
