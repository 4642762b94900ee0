import "server-only";
import type { NextAuthOptions } from "next-auth";
import CredentialsProvider from "next-auth/providers/credentials";
import { requestIdOf } from "@/lib/api/request-id";
import { env } from "@/lib/env";
import { log } from "@/lib/log";
import { SignIn } from "@/lib/schemas/account";
import { endSession } from "@/lib/services/account/end-sessions";
import { readSession } from "@/lib/services/account/read-session";
import { SESSION_SECONDS } from "@/lib/services/account/session-times";
import { signIn } from "@/lib/services/account/sign-in";
import { cookies, isSecure } from "./cookies";
import { keepRefusal } from "./refusal";
import { SessionClaims, visitorOf } from "./session";

declare module "next-auth" {
  interface User {
    sessionId: string;
  }
}

async function authorize(given: Record<string, string> | undefined, sent: Record<string, unknown> | undefined) {
  const credentials = SignIn.safeParse({ email: given?.email, password: given?.password });
  if (!credentials.success) return null;
  const headers = new Headers(
    Object.entries(sent ?? {}).filter((entry): entry is [string, string] => typeof entry[1] === "string"),
  );
  const requestId = requestIdOf(headers);
  try {
    const signedIn = await signIn(visitorOf(headers, requestId), credentials.data);
    log.info({ requestId, userId: signedIn?.userId }, signedIn ? "signed in" : "sign-in refused");
    return signedIn ? { id: signedIn.userId, sessionId: signedIn.sessionId } : null;
  } catch (error) {
    keepRefusal(error);
    return null;
  }
}

/** Made on first use: a build imports this without settings. The cookie names a row in `sessions`, which alone decides. */
export const authOptions = (): NextAuthOptions => ({
  secret: env().NEXTAUTH_SECRET,
  session: { strategy: "jwt", maxAge: SESSION_SECONDS.absolute },
  useSecureCookies: isSecure(),
  cookies: cookies(),
  pages: { signIn: "/sign-in", signOut: "/sign-in", error: "/sign-in" },
  providers: [
    CredentialsProvider({
      name: "Gainwright",
      credentials: { email: { type: "email" }, password: { type: "password" } },
      authorize: (given, request) => authorize(given, request.headers),
    }),
  ],
  callbacks: {
    jwt: ({ token, user }) => (user ? { sub: user.id, sid: user.sessionId } : { sub: token.sub, sid: token.sid }),
    async session({ session, token }) {
      const claims = SessionClaims.safeParse(token);
      const live = claims.success
        ? await readSession({ userId: claims.data.sub, sessionId: claims.data.sid }, "session").catch(keepRefusal)
        : null;
      return { expires: session.expires, user: live ? { name: live.person.name, email: live.person.email } : undefined };
    },
  },
  events: {
    async signOut({ token }) {
      const claims = SessionClaims.safeParse(token);
      if (!claims.success) return;
      await endSession({ userId: claims.data.sub, sessionId: claims.data.sid }).catch(keepRefusal);
    },
  },
  logger: {
    error: (code) => log.error({ code }, "next-auth"),
    warn: (code) => log.debug({ code }, "next-auth"),
    debug: () => undefined,
  },
});
