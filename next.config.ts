import type { NextConfig } from "next";

const everywhere = [
  { key: "X-Content-Type-Options", value: "nosniff" },
  { key: "X-Frame-Options", value: "DENY" },
  { key: "Referrer-Policy", value: "same-origin" },
  { key: "Cross-Origin-Opener-Policy", value: "same-origin" },
  { key: "Cross-Origin-Resource-Policy", value: "same-origin" },
  {
    key: "Permissions-Policy",
    value: "camera=(), microphone=(), geolocation=(), payment=(), usb=(), serial=(), browsing-topics=()",
  },
];

const nothing = "default-src 'none'; base-uri 'none'; form-action 'none'; frame-ancestors 'none'";

export default {
  poweredByHeader: false,
  productionBrowserSourceMaps: false,
  outputFileTracingRoot: process.cwd(),
  turbopack: { root: process.cwd() },
  typescript: { tsconfigPath: "tsconfig.build.json" },
  // Resolves its own task files and SQL at run time.
  serverExternalPackages: ["graphile-worker"],
  headers: async () => [
    { source: "/:path*", headers: everywhere },
    // Pages get theirs, with a nonce, from the proxy.
    { source: "/api/:path*", headers: [{ key: "Content-Security-Policy", value: nothing }] },
    {
      // Browsers ignore this over plain http; behind a proxy that ends TLS, only its https requests are answered with it.
      source: "/:path*",
      has: [{ type: "header", key: "x-forwarded-proto", value: "https" }],
      headers: [{ key: "Strict-Transport-Security", value: "max-age=31536000; includeSubDomains" }],
    },
    { source: "/((?!_next/static/).*)", headers: [{ key: "Cache-Control", value: "private, no-store" }] },
  ],
} satisfies NextConfig;
