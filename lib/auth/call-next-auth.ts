import "server-only";
import NextAuth from "next-auth";
import { readBytes } from "@/lib/api/read-body";
import { DomainError, NotFound } from "@/lib/errors";
import { authOptions } from "./options";

const BODY_LIMIT = 16_384;
const ACTIONS = new Set(["csrf", "providers", "session", "signin", "signout", "callback", "error"]);

/**
 * Calls next-auth with plain values and gathers what it answers, instead of handing it the request: so the body is read here,
 * up to a limit, and the same code runs in tests without a server.
 */
export async function callNextAuth(request: Request, path: readonly string[]): Promise<Response> {
  if (!path[0] || !ACTIONS.has(path[0])) throw new NotFound("What this address names");
  const { searchParams } = new URL(request.url);
  const body = request.method === "POST" ? await readForm(request) : undefined;
  const asked = {
    method: request.method,
    headers: Object.fromEntries(request.headers),
    cookies: cookiesOf(request.headers.get("cookie") ?? ""),
    query: { ...Object.fromEntries(searchParams), nextauth: [...path] },
    body,
  };
  const answer = new Answer();
  await NextAuth(authOptions())(asked, answer);
  return answer.toResponse();
}

async function readForm(request: Request): Promise<Record<string, string>> {
  if (!/^application\/x-www-form-urlencoded\b/i.test(request.headers.get("content-type") ?? "")) {
    throw new DomainError("not-json", "Send this as application/x-www-form-urlencoded, as the sign-in page does.");
  }
  const bytes = await readBytes(request, BODY_LIMIT);
  return Object.fromEntries(new URLSearchParams(new TextDecoder().decode(bytes)));
}

function cookiesOf(header: string): Record<string, string> {
  const pairs = header
    .split(";")
    .map((part) => [part.slice(0, part.indexOf("=")).trim(), part.slice(part.indexOf("=") + 1).trim()]);
  return Object.fromEntries(pairs.filter(([name]) => name).map(([name, value]) => [name, decoded(value)]));
}

function decoded(value: string): string {
  try {
    return decodeURIComponent(value);
  } catch {
    return value;
  }
}

/** The part of Node's reply that next-auth writes to. */
class Answer {
  #status = 200;
  #body: string | null = null;
  readonly #headers = new Map<string, string | readonly string[]>();

  status(code: number): this {
    this.#status = code;
    return this;
  }
  getHeader(name: string) {
    return this.#headers.get(name.toLowerCase());
  }
  setHeader(name: string, value: string | readonly string[]): this {
    this.#headers.set(name.toLowerCase(), value);
    return this;
  }
  json(value: unknown): void {
    this.setHeader("content-type", "application/json");
    this.#body = JSON.stringify(value);
  }
  send(value: unknown): void {
    if (typeof value === "string") this.#body = value;
    else if (value !== undefined && value !== null) this.json(value);
  }
  end(): void {
    this.#body = null;
  }
  toResponse(): Response {
    // Gathered first: a reply made without a type takes text/plain for one, and ours would stand beside it.
    const headers = new Headers();
    for (const [name, value] of this.#headers) for (const one of [value].flat()) headers.append(name, one);
    return new Response(this.#body, { status: this.#status, headers });
  }
}
