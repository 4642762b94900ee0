import { NextRequest } from "next/server";
import { afterAll, describe, expect, test, vi } from "vitest";
import { closePool } from "@/db/client";
import { route } from "@/lib/api/route";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import { log } from "@/lib/log";
import type { DesignSummary } from "@/lib/schemas/design";
import type { PlantSummary } from "@/lib/schemas/plant";
import config from "@/next.config";
import { proxy } from "@/proxy";
import { ask, member } from "../helpers/api";
import { askAuth } from "../helpers/auth-requests";
import { call, ORIGIN } from "../helpers/call-route";
import { twoCarriages } from "../helpers/plant-content";
import { byWeights } from "../helpers/recipes";
import { testDatabase } from "../helpers/test-database";

await testDatabase();
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});
vi.spyOn(log, "error").mockImplementation(() => undefined);

/** The directives of a content policy by name. */
const directives = (policy: string) => new Map(policy.split("; ").map((part) => [part.split(" ")[0], part.split(" ").slice(1)]));

test("whatever the API answers is kept by no cache, taken for nothing else, and found again in the log", async () => {
  const { ctx, api } = await member();
  const { headers } = api;
  const plant = await api.post<PlantSummary>("/api/v1/plants", { name: "Gantry", content: twoCarriages() });
  const path = `/api/v1/plants/${plant.id}`;
  const design = { name: "Soft", plantRevisionId: plant.currentRevision.id, recipe: byWeights() };
  const { currentRevision } = await api.post<DesignSummary>(`${path}/designs`, design);
  const gains = `/api/v1/design-revisions/${currentRevision.id}/gains`;
  const tag = (await api.ask("GET", path)).headers.get("etag") ?? "";
  const broken = route({ summary: "Fail", reply: null }, async () => {
    throw new Error("on purpose");
  });
  const own = `/api/v1/team/members/${ctx.userId}`;
  const replies: [number, Response][] = [
    [200, await api.ask("GET", path)],
    [200, await api.ask("GET", gains)],
    [200, await api.ask("GET", `${gains}?format=json`)],
    [201, await api.ask("POST", "/api/v1/plants", { body: { name: "Second", content: twoCarriages() } })],
    [304, await api.ask("GET", path, { headers: { "if-none-match": tag } })],
    [401, await ask({}, "GET", path)],
    [403, await ask({ ...headers, origin: "https://elsewhere.example" }, "PATCH", path, { body: { name: "x" }, version: 1 })],
    [404, await api.ask("GET", `/api/v1/plants/${ctx.userId}`)],
    [409, await api.ask("PATCH", own, { body: { role: "reviewer" } })],
    [412, await api.ask("PATCH", path, { body: { name: "x" }, version: 9 })],
    [415, await api.ask("PATCH", path, { body: "name=x", version: 1, headers: { "content-type": "text/plain" } })],
    [422, await api.ask("POST", "/api/v1/plants", { body: {} })],
    [428, await api.ask("PATCH", path, { body: { name: "x" } })],
    [500, await call(broken, { headers })],
    [200, await askAuth("csrf")],
    [404, await askAuth("no-such-action")],
  ];
  for (const [status, { headers: got, status: found }] of replies) {
    expect([found, status]).toEqual([status, status]);
    expect(got.get("cache-control"), String(status)).toMatch(/^private,( no-cache,)? no-store$/);
    expect(got.get("x-content-type-options"), String(status)).toBe("nosniff");
    expect(got.get("x-request-id"), String(status)).toMatch(/^[\w-]{8,64}$/);
    const type = got.get("content-type");
    if (status >= 400) expect(type).toBe("application/problem+json");
    else if (status !== 304) expect(type).toMatch(/^(application\/json|text\/csv; charset=utf-8)$/);
    for (const name of ["server", "x-powered-by", "access-control-allow-origin", "set-cookie"])
      if (!(name === "set-cookie" && status === 200)) expect(got.get(name), `${status} ${name}`).toBeNull();
  }
});

describe("what stands on every reply of the server", () => {
  const rules = async () => {
    const list = await config.headers();
    return (source: string) =>
      Object.fromEntries(
        list
          .filter((rule) => rule.source === source && !("has" in rule))
          .flatMap(({ headers }) => headers.map(({ key, value }) => [key, value])),
      );
  };

  test("keeps browsers strict and other sites out", async () => {
    const of = await rules();
    expect(of("/:path*")).toMatchObject({
      "X-Content-Type-Options": "nosniff",
      "X-Frame-Options": "DENY",
      "Referrer-Policy": "same-origin",
      "Cross-Origin-Opener-Policy": "same-origin",
      "Cross-Origin-Resource-Policy": "same-origin",
    });
    expect(of("/((?!_next/static/).*)")["Cache-Control"]).toBe("private, no-store");
    expect(config).toMatchObject({ poweredByHeader: false, productionBrowserSourceMaps: false });
  });

  test("lets a reply of the API do nothing at all, should a browser show it", async () => {
    const policy = directives((await rules())("/api/:path*")["Content-Security-Policy"]);
    for (const name of ["default-src", "base-uri", "form-action", "frame-ancestors"])
      expect(policy.get(name)).toEqual(["'none'"]);
  });

  test("asks for a year of https, subdomains too, wherever https is spoken", async () => {
    const strict = (await config.headers()).flatMap((rule) => ("has" in rule ? rule.headers : []));
    expect(strict).toEqual([{ key: "Strict-Transport-Security", value: "max-age=31536000; includeSubDomains" }]);
  });
});

describe("the content policy of a page", () => {
  const policyFor = (headers: Record<string, string> = {}) => {
    const response = proxy(new NextRequest(`${ORIGIN}/plants`, { headers }));
    return { policy: response.headers.get("content-security-policy") ?? "", response };
  };

  test("runs nothing but our own scripts, by a nonce of each request", () => {
    const [one, two] = [policyFor().policy, policyFor().policy];
    expect(one).not.toBe(two);
    const policy = directives(one);
    const [nonce] = (policy.get("script-src") ?? []).filter((part) => part.startsWith("'nonce-"));
    expect(Buffer.from(nonce.slice("'nonce-".length, -1), "base64")).toHaveLength(16);
    expect(policy.get("script-src")).toEqual(["'self'", nonce, "'strict-dynamic'", "'wasm-unsafe-eval'"]);
    expect(policy.get("style-src")).toEqual(["'self'", nonce]);
    for (const name of ["object-src", "base-uri", "frame-ancestors"]) expect(policy.get(name), name).toEqual(["'none'"]);
    for (const name of ["default-src", "connect-src", "font-src", "form-action", "worker-src"])
      expect(policy.get(name), name).toEqual(["'self'"]);
    expect(one).not.toMatch(/'unsafe-eval'|https?:|\*/);
  });

  test("is ours, whatever policy or nonce a request brings along", () => {
    const { policy, response } = policyFor({ "content-security-policy": "default-src *", "x-nonce": "bm9uY2U=" });
    expect(policy).not.toContain("default-src *");
    expect(policy).not.toContain("bm9uY2U=");
    const [, nonce] = /'nonce-([^']+)'/.exec(policy) ?? [];
    expect(response.headers.get("x-middleware-request-x-nonce")).toBe(nonce);
    expect(response.headers.get("x-middleware-request-content-security-policy")).toBe(policy);
  });
});
