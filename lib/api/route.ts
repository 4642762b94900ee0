import { contextOf, sessionOf, visitorOf } from "@/lib/auth/session";
import { env } from "@/lib/env";
import { DomainError } from "@/lib/errors";
import { inTurn } from "@/lib/jobs/in-turn";
import { allow } from "@/lib/permissions/allow";
import type { LiveSession } from "@/lib/services/account/read-session";
import type { Context } from "@/lib/services/context";
import { runOnce } from "@/lib/services/idempotency/run-once";
import { type Cost, spend, spendAsPerson, spendAsVisitor } from "@/lib/services/limits/spend";
import { answer, type RequestRecord } from "./answer";
import type { Declaration, PersonInput, PublicInput, RouteResult, TeamInput } from "./declaration";
import { onceOf } from "./idempotency-key";
import { type RouteContext, readInput } from "./read-input";
import { refuseForeignOrigin } from "./same-origin";
import { type AnyResult, sendResult, sendStored, toStored } from "./send-result";

/** A route handler that still knows what it declared, for the API description and the tests of every route. */
export type DeclaredRoute = ((request: Request, context: RouteContext) => Promise<Response>) & {
  readonly declaration: Declaration;
  readonly access: "team" | "person" | "public";
};

/**
 * A route for somebody signed in to a team, by session or access token. In this order: request id, origin, who asks,
 * rate limit, right, size, shape, version, key, then the handler; its reply is parsed and every refusal becomes a problem.
 */
export function route<const D extends Declaration>(
  declaration: D,
  handler: (input: TeamInput<D>) => Promise<RouteResult<D>>,
): DeclaredRoute {
  const serve = (request: Request, context: RouteContext) =>
    answer(request, async (record) => {
      const ctx = await admit(declaration, request, record);
      const { checked, bytes } = await readInput(declaration, request, context);
      const handle = (): Promise<AnyResult> => handler({ ...checked, ctx });
      const carryOut = async () => {
        if (!declaration.idempotent) return sendResult(declaration, await handle(), request);
        return sendStored(await runOnce(ctx, onceOf(request, bytes), async () => toStored(declaration, await handle())));
      };
      return takesTurn(declaration, bytes) ? inTurn(ctx.teamId, request.signal, carryOut) : carryOut();
    });
  return Object.assign(serve, { declaration, access: "team" as const });
}

/** A route of somebody's own account, with or without a team; never for access tokens. Nothing here is repeatable by key. */
export function personRoute<const D extends Declaration & { readonly idempotent?: never; readonly right?: never }>(
  declaration: D,
  handler: (input: PersonInput<D>) => Promise<RouteResult<D>>,
): DeclaredRoute {
  const serve = (request: Request, context: RouteContext) =>
    answer(request, async (record) => {
      const session = await admitPerson(declaration, request, record);
      const { checked } = await readInput(declaration, request, context);
      return sendResult(declaration, await handler({ ...checked, person: session.person, team: session.context }), request);
    });
  return Object.assign(serve, { declaration, access: "person" as const });
}

/** A route for anybody: sign-up, password reset, the API's own description. */
export function publicRoute<const D extends Declaration & { readonly idempotent?: never; readonly right?: never }>(
  declaration: D,
  handler: (input: PublicInput<D>) => Promise<RouteResult<D>>,
): DeclaredRoute {
  const serve = (request: Request, context: RouteContext) =>
    answer(request, async ({ requestId }) => {
      if (isChange(request)) refuseForeignOrigin(request.headers, ourOrigin());
      const visitor = visitorOf(request.headers, requestId);
      await spendAsVisitor(visitor);
      const { checked } = await readInput(declaration, request, context);
      return sendResult(declaration, await handler({ ...checked, visitor }), request);
    });
  return Object.assign(serve, { declaration, access: "public" as const });
}

const takesTurn = ({ cost, inTurnAbove = Number.POSITIVE_INFINITY }: Declaration, bytes: Uint8Array) =>
  cost === "solve" || cost === "check" || bytes.length > inTurnAbove;
const isChange = ({ method }: Request) => method !== "GET" && method !== "HEAD";
const ourOrigin = () => new URL(env().NEXTAUTH_URL).origin;
const costOf = ({ cost }: Declaration, request: Request): Cost => cost ?? (isChange(request) ? "write" : "read");

async function admit(declaration: Declaration, request: Request, record: RequestRecord): Promise<Context> {
  // A token is sent on purpose, a cookie by itself; so only the cookie's requests must prove where they come from.
  if (isChange(request) && !request.headers.has("authorization")) refuseForeignOrigin(request.headers, ourOrigin());
  const ctx = await contextOf(request.headers, record.requestId);
  if (!ctx) throw nobody();
  Object.assign(record, { teamId: ctx.teamId, userId: ctx.userId, ...(ctx.tokenId && { tokenId: ctx.tokenId }) });
  await spend(ctx, costOf(declaration, request));
  if (declaration.right) allow(ctx, declaration.right);
  return ctx;
}

async function admitPerson(declaration: Declaration, request: Request, record: RequestRecord): Promise<LiveSession> {
  if (isChange(request)) refuseForeignOrigin(request.headers, ourOrigin());
  const session = await sessionOf(request.headers, record.requestId);
  if (!session) throw nobody();
  Object.assign(record, { userId: session.person.userId });
  await spendAsPerson(session.person, costOf(declaration, request));
  return session;
}

function nobody(): DomainError {
  return new DomainError("no-session", "Sign in, or send an access token that is still valid.");
}
