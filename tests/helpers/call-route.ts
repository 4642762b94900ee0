import { encode } from "next-auth/jwt";
import type { RouteContext } from "@/lib/api/read-input";
import { sessionCookieName } from "@/lib/auth/cookies";
import { env } from "@/lib/env";
import type { Problem } from "@/lib/schemas/problem";
import type { Context } from "@/lib/services/context";
import { sessionOfMember } from "./people";

export const ORIGIN = "http://localhost:3000";

export type Call = {
  readonly method?: string;
  /** Path and query; the ids of the path go into `params`, as the framework would find them. */
  readonly path?: string;
  readonly params?: Readonly<Record<string, string>>;
  readonly headers?: Readonly<Record<string, string>>;
  /** Sent as JSON; a stream or text is sent as it is. */
  readonly body?: unknown;
};

/** Headers of a page of ours on which this person is signed in. */
export async function signedIn(who: Pick<Context, "teamId" | "userId">): Promise<Record<string, string>> {
  const { userId, sessionId } = await sessionOfMember(who);
  const value = await encode({ token: { sub: userId, sid: sessionId }, secret: env().NEXTAUTH_SECRET });
  return { cookie: `${sessionCookieName()}=${value}`, origin: ORIGIN };
}

/** Calls a route handler as the server does. */
export function call(
  route: (request: Request, context: RouteContext) => Promise<Response>,
  { method = "GET", path = "/api/v1/tests", params = {}, headers = {}, body }: Call = {},
) {
  const sent = new Headers(headers);
  const raw = typeof body === "string" || body instanceof ReadableStream;
  if (body !== undefined && !sent.has("content-type")) sent.set("content-type", "application/json");
  const init = { method, headers: sent, body: raw || body === undefined ? body : JSON.stringify(body), duplex: "half" };
  return route(new Request(`${ORIGIN}${path}`, init as RequestInit), { params: Promise.resolve(params) });
}

export async function problemIn(response: Response): Promise<Problem> {
  if (response.headers.get("content-type") !== "application/problem+json") throw new Error("this is no problem document");
  return response.json();
}
