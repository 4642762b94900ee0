import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { root } from "../../lib/commands/paths.mjs";
import { expect, test } from "../helpers/browser-test";

test("every kind of reply carries the headers that keep browsers strict", async ({ request }) => {
  for (const path of ["/", "/sign-in", "/api/health", "/api/v1/plants", "/there-is-no-such-page", "/favicon.svg"]) {
    const reply = await request.get(path, { maxRedirects: 0 });
    const headers = reply.headers();
    expect(headers["x-content-type-options"], path).toBe("nosniff");
    expect(headers["referrer-policy"], path).toBe("same-origin");
    expect(headers["permissions-policy"], path).toContain("camera=()");
    expect(headers["cache-control"], path).toContain("no-store");
    expect(headers["x-powered-by"], path).toBeUndefined();
    expect(headers["strict-transport-security"], path).toBeUndefined();
    const policy = headers["content-security-policy"];
    const own = path.startsWith("/api/") ? ["default-src 'none'"] : ["default-src 'self'", "object-src 'none'"];
    for (const part of [...own, "base-uri 'none'", "frame-ancestors 'none'", "form-action"]) expect(policy, path).toContain(part);
    expect(policy, path).not.toContain("'unsafe-eval'");
  }
});

test("https requests are told to stay on https", async ({ request }) => {
  const reply = await request.get("/api/health", { headers: { "x-forwarded-proto": "https" } });
  expect(reply.headers()["strict-transport-security"]).toBe("max-age=31536000; includeSubDomains");
});

test("each reply has a nonce of its own, which its scripts carry", async ({ request }) => {
  const nonces = new Set<string>();
  for (let i = 0; i < 3; i++) {
    const reply = await request.get("/");
    const nonce = /'nonce-([^']+)'/.exec(reply.headers()["content-security-policy"])?.[1] ?? "";
    expect(Buffer.from(nonce, "base64").length).toBeGreaterThanOrEqual(16);
    const scripts = (await reply.text()).match(/<script\b[^>]*>/g) ?? [];
    expect(scripts.length).toBeGreaterThan(0);
    for (const script of scripts) expect(script).toContain(`nonce="${nonce}"`);
    nonces.add(nonce);
  }
  expect(nonces.size).toBe(3);
});

test("markup that was put into a page does not run", async ({ page, problems }) => {
  await page.goto("/");
  const ran = await page.evaluate(() => {
    document.body.innerHTML += '<img src="data:," onerror="window.planted = true">';
    return new Promise((resolve) => setTimeout(() => resolve("planted" in window), 300));
  });
  expect(ran).toBe(false);
  const provoked = problems.splice(0).filter((problem) => problem.startsWith("content policy: "));
  expect(provoked).toEqual([expect.stringContaining("script-src-attr refused inline")]);
});

test("what production does not need is not there", async ({ request }) => {
  for (const path of ["/.git/config", "/.env", "/package.json", "/server-status", "/_next/static/../../package.json"]) {
    expect((await request.get(path)).status(), path).toBe(404);
  }
  const traced = await request.fetch("/", { method: "TRACE", headers: { "x-told": "do-not-repeat-this" } });
  expect(traced.status()).toBeGreaterThanOrEqual(400);
  expect(await traced.text()).not.toContain("do-not-repeat-this");
});

test("no header skips what stands in front of pages and routes, nor the question who asks", async ({ request }) => {
  for (const skip of ["proxy", "proxy:proxy:proxy:proxy:proxy", "middleware", "src/middleware:src/middleware:src/middleware"]) {
    const headers = { "x-middleware-subrequest": skip, "x-middleware-next": "1", "x-nonce": "AAAAAAAAAAAAAAAAAAAAAA==" };
    const page = await request.get("/plants", { headers, maxRedirects: 0 });
    expect([page.status(), page.headers().location], skip).toEqual([307, "/sign-in?next=%2Fplants"]);
    expect(page.headers()["content-security-policy"], skip).toContain("frame-ancestors 'none'");
    expect(page.headers()["content-security-policy"], skip).not.toContain("AAAAAAAA");
    expect((await request.get("/api/v1/plants", { headers })).status(), skip).toBe(401);
  }
});

test("an address or a method that is not known tells nothing of what is behind it", async ({ request }) => {
  for (const [method, path, status] of [
    ["PUT", "/api/v1/plants", 405],
    ["DELETE", "/api/health", 405],
    ["GET", "/api/v1/%00", 404],
    ["GET", "/api/v1/no-such-thing?x=%ff", 404],
    ["GET", "/_next/static/chunks/no-such-file.js.map", 404],
    ["GET", "/__nextjs_original-stack-frames", 404],
    ["GET", "/_next/image?url=http://127.0.0.1:5432/&w=640&q=75", 400],
  ] as const) {
    const reply = await request.fetch(path, { method });
    expect(reply.status(), path).toBe(status);
    expect(await reply.text(), path).not.toMatch(/node_modules|webpack|turbopack:|\.tsx?:|\bat [\w.]+ \(/);
  }
});

test("the files that browsers load hold no source map and no secret's name", () => {
  const folder = join(root, ".next/static");
  const files = readdirSync(folder, { recursive: true, encoding: "utf8" });
  expect(files.length).toBeGreaterThan(0);
  expect(files.filter((file) => file.endsWith(".map"))).toEqual([]);
  for (const file of files.filter((name) => name.endsWith(".js"))) {
    const text = readFileSync(join(folder, file), "utf8");
    expect(/DATABASE_URL|DATABASE_OWNER_URL|NEXTAUTH_SECRET|SMTP_URL|drizzle-orm/.exec(text)?.[0], file).toBeUndefined();
    expect(text, file).not.toContain("sourceMappingURL=");
  }
});

test("health tells alive from ready", async ({ request }) => {
  expect(await (await request.get("/api/health")).json()).toEqual({ status: "live" });
  expect(await (await request.get("/api/health/ready")).json()).toEqual({ status: "ready" });
});
