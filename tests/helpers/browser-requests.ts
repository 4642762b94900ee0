import { randomInt, randomUUID } from "node:crypto";
import type { APIRequestContext, APIResponse } from "@playwright/test";
import { waitForMail } from "./mailbox";

export const PASSWORD = "seven gantries at dusk";
export const newEmail = () => `${randomUUID()}@saltmarsh.example`;
/** Limits count by address: each person of a test comes from one of their own. */
export const newAddress = () => ({ "x-forwarded-for": `10.${randomInt(256)}.${randomInt(256)}.${randomInt(256)}` });

type Sent = {
  readonly method?: string;
  readonly data?: unknown;
  readonly form?: Record<string, string>;
  /** What a change starts from. */
  readonly version?: number;
};

/** A request as a page of ours sends it. */
export function ask(request: APIRequestContext, path: string, { version, ...sent }: Sent = {}): Promise<APIResponse> {
  const creates = sent.data !== undefined && version === undefined;
  return request.fetch(path, {
    method: sent.data === undefined && sent.form === undefined ? "GET" : "POST",
    ...sent,
    headers: {
      ...(process.env.BASE_URL && { origin: process.env.BASE_URL }),
      ...(creates && { "idempotency-key": randomUUID() }),
      ...(version !== undefined && { "if-match": `"${version}"` }),
    },
  });
}

/** The same, where anything but success is a fault of the test. */
export async function told<T>(request: APIRequestContext, path: string, sent?: Sent): Promise<T> {
  const reply = await ask(request, path, sent);
  const text = await reply.text();
  if (!reply.ok()) throw new Error(`${path} was answered ${reply.status()}: ${text}`);
  return (text === "" ? undefined : JSON.parse(text)) as T;
}

export async function signInAs(request: APIRequestContext, email: string, password = PASSWORD): Promise<void> {
  const { csrfToken } = await told<{ csrfToken: string }>(request, "/api/auth/csrf");
  const form = { email, password, csrfToken, json: "true", callbackUrl: "/plants" };
  await told(request, "/api/auth/callback/credentials", { form });
}

/** A new account with a team, signed in. */
export async function signUpAs(request: APIRequestContext, name: string): Promise<string> {
  const email = newEmail();
  await told(request, "/api/v1/sign-up", { data: { name, email, password: PASSWORD, teamName: `First team of ${name}` } });
  await signInAs(request, email);
  return email;
}

/** The secret of the link in the newest mail of that subject. */
export async function mailedSecret(email: string, subject: RegExp): Promise<string> {
  const { text } = await waitForMail(email, subject);
  const secret = /\/(?:invitations|reset-password)\/([A-Za-z0-9_-]{43})\b/.exec(text)?.[1];
  if (!secret) throw new Error(`no link in the mail to ${email}: ${text}`);
  return secret;
}
