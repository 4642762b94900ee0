import { readdirSync } from "node:fs";
import { relative } from "node:path";
import { fileURLToPath } from "node:url";
import { expect, test } from "vitest";
import { catalogue } from "@/app/api/v1/openapi.json/catalogue";
import { apiDescription } from "@/app/api/v1/openapi.json/description";
import { METHODS } from "@/lib/api/openapi";

const folder = fileURLToPath(new URL("../../app/api/v1/", import.meta.url));
/** But for the one that answers whatever names nothing. */
const routeFiles = readdirSync(folder, { recursive: true, encoding: "utf8" }).filter(
  (file) => file.endsWith("route.ts") && !file.startsWith("[...rest]"),
);

/** `plants/[plantId]/route.ts` is served at `/api/v1/plants/{plantId}`. */
const addressOf = (file: string) => `/api/v1/${file.replace(/\/route\.ts$/, "").replace(/\[(\w+)\]/g, "{$1}")}`;

test("every method of every route file stands in the description, and nothing else does", async () => {
  const served: string[] = [];
  for (const file of routeFiles) {
    const module: Record<string, unknown> = await import(/* @vite-ignore */ `${folder}${file}`);
    served.push(...METHODS.filter((method) => method in module).map((method) => `${method} ${addressOf(file)}`));
  }
  const { paths = {} } = await apiDescription();
  const described = Object.entries(paths).flatMap(([path, item]) =>
    METHODS.filter((method) => method.toLowerCase() in (item ?? {})).map((method) => `${method} ${path}`),
  );
  expect(served.length).toBeGreaterThan(20);
  expect(described.sort()).toEqual(served.sort());
});

test("every path parameter is described, and every operation has an id of its own and a summary", async () => {
  const { paths = {} } = await apiDescription();
  const ids = new Set<string>();
  for (const [path, item] of Object.entries(paths)) {
    for (const method of METHODS) {
      const operation = item?.[LOWER[method]];
      if (!operation) continue;
      const named = [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name);
      const described = (operation.parameters ?? []).flatMap((one) => ("in" in one && one.in === "path" ? [one.name] : []));
      expect(described.sort(), `${method} ${path}`).toEqual(named.sort());
      expect(operation.summary, `${method} ${path}`).toMatch(/^[A-Z]/);
      expect(ids.has(operation.operationId ?? ""), operation.operationId).toBe(false);
      ids.add(operation.operationId ?? "");
    }
  }
});

const LOWER = { GET: "get", POST: "post", PUT: "put", PATCH: "patch", DELETE: "delete" } as const;

test("every reference leads somewhere, and unknown fields are refused in what is sent", async () => {
  const description = await apiDescription();
  const text = JSON.stringify(description);
  const schemas = description.components?.schemas ?? {};
  for (const [, name] of text.matchAll(/"\$ref":"#\/components\/schemas\/([^"]+)"/g)) expect(schemas, name).toHaveProperty(name);
  expect(schemas.CreatePlant).toMatchObject({ type: "object", additionalProperties: false, required: ["name", "content"] });
  expect(text.length).toBeLessThan(300_000);
  for (const [, pattern] of text.matchAll(/"pattern":"((?:[^"\\]|\\.)*)"/g)) {
    expect(() => new RegExp(JSON.parse(`"${pattern}"`), "u"), pattern).not.toThrow();
    expect(pattern).not.toMatch(/\/[a-z]*$/);
  }
});

test("changes of a version ask for If-Match, creates for an Idempotency-Key, and both say what is refused", async () => {
  const { paths = {} } = await apiDescription();
  const rename = paths["/api/v1/plants/{plantId}"]?.patch;
  const create = paths["/api/v1/plants"]?.post;
  expect(rename?.parameters).toContainEqual(expect.objectContaining({ in: "header", name: "If-Match", required: true }));
  expect(Object.keys(rename?.responses ?? {})).toEqual(
    expect.arrayContaining(["200", "401", "403", "404", "412", "422", "428", "429"]),
  );
  expect(create?.parameters).toContainEqual(expect.objectContaining({ in: "header", name: "Idempotency-Key", required: true }));
  expect(Object.keys(create?.responses ?? {})).toEqual(expect.arrayContaining(["201", "409", "413", "415", "422"]));
});

test("the catalogue names each route file by the address that it is served at", () => {
  for (const [path, load] of Object.entries(catalogue)) {
    const file = routeFiles.find((candidate) => addressOf(candidate) === path);
    expect(file, path).toBeDefined();
    expect(load.toString(), path).toContain(relative(folder, `${folder}${file}`).replace(/\.ts$/, ""));
  }
});
