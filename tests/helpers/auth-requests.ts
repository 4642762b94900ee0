import { noteClientAddresses } from "@/lib/auth/client-address";
import { handleAuth } from "@/lib/auth/handler";

const ORIGIN = "http://localhost:3000";

type Sent = {
  readonly cookie?: string;
  readonly form?: Record<string, string>;
  readonly headers?: Record<string, string>;
  readonly address?: string;
};

/** The mark by which the server proves that an address was noted by itself. */
function addressHeader(address: string): string {
  noteClientAddresses();
  return `${(globalThis as { gainwrightAddressProof?: string }).gainwrightAddressProof} ${address}`;
}

/** A request to `/api/auth/...` as a browser on a page of ours sends it. */
export function askAuth(path: string, { cookie, form, headers, address }: Sent = {}): Promise<Response> {
  const request = new Request(`${ORIGIN}/api/auth/${path}`, {
    method: form ? "POST" : "GET",
    headers: {
      ...(form && { origin: ORIGIN, "content-type": "application/x-www-form-urlencoded" }),
      ...(cookie && { cookie }),
      ...(address && { "x-gainwright-address": addressHeader(address) }),
      ...headers,
    },
    body: form ? new URLSearchParams(form).toString() : undefined,
  });
  return handleAuth(request, { params: Promise.resolve({ nextauth: path.split("?")[0].split("/") }) });
}

/** The cookies of replies, as a browser sends them back. */
export function cookieHeader(...replies: Response[]): string {
  const jar = new Map<string, string>();
  for (const reply of replies) {
    for (const line of reply.headers.getSetCookie()) {
      const [pair] = line.split(";");
      const name = pair.slice(0, pair.indexOf("="));
      if (/max-age=0|expires=thu, 01 jan 1970/i.test(line)) jar.delete(name);
      else jar.set(name, pair.slice(name.length + 1));
    }
  }
  return [...jar].map(([name, value]) => `${name}=${value}`).join("; ");
}

/** Sign-in as the page does it: the token against forged requests first, then the form. */
export async function signInByForm(
  email: string,
  password: string,
  address?: string,
): Promise<{ reply: Response; cookie: string }> {
  const first = await askAuth("csrf", { address });
  const { csrfToken } = (await first.json()) as { csrfToken: string };
  const form = { email, password, csrfToken, callbackUrl: ORIGIN, json: "true" };
  const reply = await askAuth("callback/credentials", { cookie: cookieHeader(first), form, address });
  return { reply, cookie: cookieHeader(first, reply) };
}

export async function signOutByForm(cookie: string): Promise<Response> {
  const first = await askAuth("csrf", { cookie });
  const { csrfToken } = (await first.json()) as { csrfToken: string };
  return askAuth("signout", { cookie, form: { csrfToken, callbackUrl: ORIGIN, json: "true" } });
}
