import { env } from "@/lib/env";

/** Over https a cookie that no other host, path or plain connection can set or read; plain loopback http is for demo and tests. */
export const isSecure = () => env().NEXTAUTH_URL.startsWith("https://");

const nameOf = (name: string) => (isSecure() ? `__Host-gainwright-${name}` : `gainwright-${name}`);
export const sessionCookieName = () => nameOf("session");

const cookie = (name: string) => ({
  name: nameOf(name),
  options: { httpOnly: true, sameSite: "lax" as const, path: "/", secure: isSecure() },
});

/** In the form next-auth takes. */
export const cookies = () => ({
  sessionToken: cookie("session"),
  csrfToken: cookie("csrf"),
  callbackUrl: cookie("callback"),
});

/** The value of one cookie of a request. Of two with one name the first counts, as browsers send the more exact path first. */
export function cookieValue(header: string | null, name: string): string | undefined {
  for (const part of (header ?? "").split(";")) {
    const at = part.indexOf("=");
    if (at > 0 && part.slice(0, at).trim() === name) return part.slice(at + 1).trim();
  }
  return undefined;
}
