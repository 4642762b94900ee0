import { OpenAPIRegistry, OpenApiGeneratorV31, type RouteConfig } from "@asteasolutions/zod-to-openapi";
import { z } from "zod";
import { Problem } from "@/lib/schemas/problem";
import type { Declaration } from "./declaration";
import { isFileReply } from "./file-reply";
import { PROBLEMS } from "./problem-catalogue";
import type { DeclaredRoute } from "./route";
import { nameSchemas } from "./schema-names";

export const METHODS = ["GET", "POST", "PUT", "PATCH", "DELETE"] as const;
export type Method = (typeof METHODS)[number];
/** The exports of a route file. */
export type RouteModule = Partial<Record<Method, DeclaredRoute>>;
/** Every route file under /api/v1 by its address, such as `/api/v1/plants/{plantId}`. */
export type RouteCatalogue = Readonly<Record<string, () => Promise<RouteModule>>>;

export type ApiDescription = ReturnType<OpenApiGeneratorV31["generateDocument"]>;

/** The description's own route, which describes itself like any other. */
export const DESCRIPTION = { summary: "Read this description", reply: z.looseObject({ openapi: z.string() }) } as const;
const DESCRIPTION_PATH = "/api/v1/openapi.json";

/** The whole API in OpenAPI 3.1, made from the schemas that requests and replies are parsed with. */
export async function describeApi(catalogue: RouteCatalogue): Promise<ApiDescription> {
  nameSchemas();
  const registry = new OpenAPIRegistry();
  registry.registerComponent("securitySchemes", "accessToken", { type: "http", scheme: "bearer" });
  registry.registerComponent("securitySchemes", "session", {
    type: "apiKey",
    in: "cookie",
    name: "gainwright-session",
    description: "Set by signing in. Over https the name begins with `__Host-`. Changes must come from a page of the service.",
  });
  for (const [path, load] of Object.entries(catalogue)) {
    const routes = await load();
    for (const method of METHODS) {
      const declared = routes[method];
      if (declared) registry.registerPath(operationOf(path, method, declared));
    }
  }
  registry.registerPath(operationOf(DESCRIPTION_PATH, "GET", { declaration: DESCRIPTION, access: "public" }));
  const generator = new OpenApiGeneratorV31(registry.definitions, { sortComponents: "alphabetically" });
  return withPlainPatterns(
    generator.generateDocument({
      openapi: "3.1.0",
      info: { title: "Gainwright", version: "1", description: INTRODUCTION },
      servers: [{ url: "/" }],
      security: [{ accessToken: [] }, { session: [] }],
    }),
  );
}

/** The generator leaves the end of `/pattern/u` in place; JSON Schema patterns are Unicode anyway. */
function withPlainPatterns(description: ApiDescription): ApiDescription {
  const plain = (key: string, value: unknown) =>
    key === "pattern" && typeof value === "string" ? value.replace(/\/u$/, "") : value;
  return JSON.parse(JSON.stringify(description, plain));
}

const INTRODUCTION = [
  "State feedback for coupled machines: plants, recipes, designs and their evidence.",
  "Control law u = -K x + F r, in deviations from the operating point; matrices are lists of rows; times are in seconds and UTC.",
  "Every refusal is a problem document (RFC 9457); its `type` leads to a page that says what to do. A method that an address does not know is answered 405 with an empty body.",
  "Changes carry the ETag of what they change in `If-Match`; creates carry an `Idempotency-Key`, so that they can be repeated safely.",
].join("\n\n");

function operationOf(
  path: string,
  method: Method,
  { declaration, access }: Pick<DeclaredRoute, "declaration" | "access">,
): RouteConfig {
  const { summary, params, query, body, example } = declaration;
  return {
    method: LOWER[method],
    path,
    operationId: `${LOWER[method]}${path.replace("/api/v1", "").replace(/[/{}.-]+(\w?)/g, (_, next: string) => next.toUpperCase())}`,
    summary,
    tags: [path.split("/")[3] ?? ""],
    ...(access === "public" && { security: [] }),
    ...(access === "person" && { security: [{ session: [] }] }),
    request: {
      ...(params && { params: asObject(params) }),
      ...(query && { query: asObject(query) }),
      headers: headersOf(declaration),
      ...(body && {
        body: { required: true, content: { "application/json": { schema: body, ...(example !== undefined && { example }) } } },
      }),
    },
    responses: { ...success(declaration), ...refusals(declaration, access) },
  };
}

const LOWER = { GET: "get", POST: "post", PUT: "put", PATCH: "patch", DELETE: "delete" } as const;

/** Path and query are described name by name, which only an object has. */
function asObject(schema: z.ZodType): z.ZodObject {
  if (schema instanceof z.ZodObject) return schema;
  throw new Error("The path and the query of a route are described by an object schema.");
}

function headersOf({ ifMatch, idempotent }: Declaration): z.ZodObject {
  return z.object({
    ...(ifMatch && {
      "If-Match": z.string().meta({ description: "The ETag of the version that the change starts from", example: '"7"' }),
    }),
    ...(idempotent && {
      "Idempotency-Key": z.string().min(8).max(128).meta({ description: "One for each thing to be created; kept for 24 hours" }),
    }),
  });
}

function success({ reply, status = 200 }: Declaration): RouteConfig["responses"] {
  const headers = {
    ETag: {
      description: "The version, where what is named has one; of a read also a checksum of the reply",
      schema: { type: "string" as const },
    },
  };
  if (reply === null) return { 204: { description: "Done" } };
  if (isFileReply(reply)) {
    const text = { schema: { type: "string" as const } };
    return { 200: { description: "The file", content: Object.fromEntries(reply.fileTypes.map((type) => [type, text])) } };
  }
  return {
    [status]: { description: status === 201 ? "Created" : "Done", headers, content: { "application/json": { schema: reply } } },
  };
}

function refusals(
  { params, query, body, right, ifMatch, idempotent }: Declaration,
  access: DeclaredRoute["access"],
): RouteConfig["responses"] {
  const statuses = new Set([400, 429, 500, 503]);
  if (access !== "public") statuses.add(401);
  if (right || ifMatch || idempotent) statuses.add(403);
  if (params) statuses.add(404);
  if (body || query || idempotent) statuses.add(422);
  if (body) for (const status of [409, 413, 415]) statuses.add(status);
  if (idempotent) statuses.add(409);
  if (ifMatch) for (const status of [412, 428]) statuses.add(status);
  return Object.fromEntries(
    [...statuses].sort().map((status) => {
      const titles = Object.values(PROBLEMS)
        .filter((entry) => entry.status === status)
        .map(({ title }) => title);
      const description =
        titles.length > 3 ? "The values or the computation were refused; `code` says why" : titles.join("; or: ");
      return [status, { description, content: { "application/problem+json": { schema: Problem } } }];
    }),
  );
}
