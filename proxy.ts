import { randomBytes } from "node:crypto";
import { type NextRequest, NextResponse } from "next/server";
import { isDevelopment } from "@/lib/env";

/** Sets the content policy with a fresh nonce on every page and reply, and nothing else: it guards nothing. */
export function proxy(request: NextRequest) {
  const nonce = randomBytes(16).toString("base64");
  const policy = contentPolicy(nonce, isDevelopment());
  const headers = new Headers(request.headers);
  headers.set("x-nonce", nonce);
  // Next reads the nonce for its own scripts from the policy on the request.
  headers.set("content-security-policy", policy);
  const response = NextResponse.next({ request: { headers } });
  response.headers.set("content-security-policy", policy);
  return response;
}

function contentPolicy(nonce: string, development: boolean) {
  return [
    "default-src 'self'",
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic' 'wasm-unsafe-eval'${development ? " 'unsafe-eval'" : ""}`,
    `style-src 'self' ${development ? "'unsafe-inline'" : `'nonce-${nonce}'`}`,
    // Attributes that the server renders: widths of bars, positions of popovers.
    "style-src-attr 'unsafe-inline'",
    "img-src 'self' data: blob:",
    "font-src 'self'",
    "connect-src 'self'",
    "worker-src 'self'",
    "object-src 'none'",
    "base-uri 'none'",
    "form-action 'self'",
    "frame-ancestors 'none'",
  ].join("; ");
}

// Not the API: a request that passes through here is first received whole, whatever its size, and its replies need no nonce.
export const config = { matcher: ["/((?!api/|_next/static/|_next/image).*)"] };
