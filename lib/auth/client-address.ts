import { randomBytes } from "node:crypto";
import { subscribe } from "node:diagnostics_channel";
import type { IncomingMessage } from "node:http";
import { isIPv6 } from "node:net";
import { env } from "@/lib/env";

const HEADER = "x-gainwright-address";
const kept = globalThis as typeof globalThis & { gainwrightAddressProof?: string };

/**
 * Route handlers never see the connection, and `X-Forwarded-For` says whatever the caller likes. So the address of the connection
 * is noted on each request as it arrives, with a proof that callers cannot know. Called once, when the server starts.
 */
export function noteClientAddresses(): void {
  if (kept.gainwrightAddressProof) return;
  const proof = randomBytes(16).toString("hex");
  kept.gainwrightAddressProof = proof;
  subscribe("http.server.request.start", (message) => {
    const { request } = message as { request: IncomingMessage };
    request.headers[HEADER] = `${proof} ${addressOf(request, env().TRUSTED_PROXIES)}`;
  });
}

/** Behind proxies of ours each adds the address it saw at the right; what stands further left is the caller's own claim. */
function addressOf(request: IncomingMessage, trustedProxies: number): string {
  const connection = request.socket.remoteAddress ?? "unknown";
  if (trustedProxies === 0) return connection;
  const forwarded = [request.headers["x-forwarded-for"] ?? []].flat().join(",");
  return forwarded.split(",").at(-trustedProxies)?.trim() || connection;
}

/** What limits on guessing count by: an IPv4 address, or the /64 network that one IPv6 customer has to themselves. */
export function clientAddress(headers: Headers): string {
  const [proof, address] = (headers.get(HEADER) ?? "").split(" ");
  if (!address || proof !== kept.gainwrightAddressProof) return "unknown";
  if (address.startsWith("::ffff:")) return address.slice(7);
  return isIPv6(address) ? networkOf(address) : address.slice(0, 45);
}

function networkOf(address: string): string {
  const [head = "", tail] = address.split("::");
  const left = head.split(":").filter(Boolean);
  const right = (tail ?? "").split(":").filter(Boolean);
  const zeros = tail === undefined ? 0 : 8 - left.length - right.length;
  const groups = [...left, ...Array<string>(Math.max(0, zeros)).fill("0"), ...right];
  return `${groups.slice(0, 4).join(":")}::/64`;
}
