import "server-only";
import { headers } from "next/headers";
import { redirect } from "next/navigation";
import { decode } from "next-auth/jwt";
import { cache } from "react";
import { z } from "zod";
import { requestIdOf } from "@/lib/api/request-id";
import { env } from "@/lib/env";
import { DomainError } from "@/lib/errors";
import { readAccessToken } from "@/lib/services/account/read-access-token";
import { type LiveSession, readSession } from "@/lib/services/account/read-session";
import type { Context, Person, Visitor } from "@/lib/services/context";
import { clientAddress } from "./client-address";
import { cookieValue, sessionCookieName } from "./cookies";

/** What the cookie says, encrypted: which session of whom. Whether it still holds, the database says, on every request. */
export const SessionClaims = z.object({ sub: z.uuid(), sid: z.uuid() });

/** The live session of a request's cookie. */
export async function sessionOf(requestHeaders: Headers, requestId: string): Promise<LiveSession | null> {
  const value = cookieValue(requestHeaders.get("cookie"), sessionCookieName());
  if (!value) return null;
  const token = await decode({ token: value, secret: env().NEXTAUTH_SECRET }).catch(() => null);
  const claims = SessionClaims.safeParse(token);
  return claims.success ? readSession({ userId: claims.data.sub, sessionId: claims.data.sid }, requestId) : null;
}

/** Who asks a route. A request with an `Authorization` header is judged by it alone, so that no cookie stands in for a bad token. */
export async function contextOf(requestHeaders: Headers, requestId: string): Promise<Context | null> {
  const authorization = requestHeaders.get("authorization");
  if (authorization === null) return (await sessionOf(requestHeaders, requestId))?.context ?? null;
  const [scheme, secret, ...rest] = authorization.split(" ");
  if (scheme.toLowerCase() !== "bearer" || !secret || rest.length > 0) return null;
  return readAccessToken(secret, requestId);
}

export function visitorOf(requestHeaders: Headers, requestId: string): Visitor {
  return { address: clientAddress(requestHeaders), requestId };
}

/** Asked once per page, however many of its parts want to know. */
const currentSession = cache(async (): Promise<LiveSession | null> => {
  const requestHeaders = await headers();
  return sessionOf(requestHeaders, requestIdOf(requestHeaders));
});

/** For pages: who is signed in, in which team; null for nobody, or somebody without a team. */
export async function currentContext(): Promise<Context | null> {
  return (await currentSession())?.context ?? null;
}

/** For pages: who is signed in, with or without a team. */
export async function currentPerson(): Promise<Person | null> {
  return (await currentSession())?.person ?? null;
}

/** @throws DomainError no-session */
export async function requireContext(): Promise<Context> {
  const context = await currentContext();
  if (!context) throw new DomainError("no-session", "Sign in to go on.");
  return context;
}

/** For pages of somebody's own account, with or without a team: signs in and comes back to `path`. */
export async function pagePerson(path: string): Promise<Person> {
  const session = await currentSession();
  if (!session) redirect(`/sign-in?next=${encodeURIComponent(path)}`);
  return session.person;
}

/** For a team's pages: signs in and comes back to `path`; somebody without a team starts one first. */
export async function pageContext(path: string): Promise<Context> {
  const session = await currentSession();
  if (!session) redirect(`/sign-in?next=${encodeURIComponent(path)}`);
  if (!session.context) redirect("/account");
  return session.context;
}
