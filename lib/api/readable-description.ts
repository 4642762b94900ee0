import { compactJson } from "./compact-json";
import type { ApiDescription } from "./openapi";
import { fieldsOf, type JsonSchema, type ReadableField, shapeInWords, typeInWords } from "./readable-schema";

export type ReadableOperation = {
  readonly id: string;
  readonly method: string;
  readonly path: string;
  readonly summary: string;
  /** Who may call it. */
  readonly access: "anybody" | "signed in on a page" | "signed in or by token";
  readonly parameters: readonly {
    readonly name: string;
    readonly place: string;
    readonly type: string;
    readonly required: boolean;
  }[];
  /** In words, and the names of the schemas among them. */
  readonly body: string | null;
  readonly example: string | null;
  readonly replies: readonly { readonly status: string; readonly description: string; readonly type: string }[];
};

export type ReadableSchema = { readonly name: string; readonly alternatives: readonly (readonly ReadableField[])[] };

export type ReadableDescription = {
  readonly groups: readonly { readonly name: string; readonly operations: readonly ReadableOperation[] }[];
  readonly schemas: readonly ReadableSchema[];
};

/** The description arranged for a reader: operations by what they are about, then every named shape. */
export function readable(description: ApiDescription): ReadableDescription {
  // Written by the generator and read here, as plain JSON Schema.
  const { paths = {}, components } = description as unknown as Plain;
  const operations = Object.entries(paths).flatMap(([path, item]) =>
    Object.entries(item).map(([method, operation]) => ({
      group: operation.tags[0] ?? "",
      ...readableOperation(path, method, operation),
    })),
  );
  const names = [...new Set(operations.map(({ group }) => group))].sort();
  return {
    groups: names.map((name) => ({
      name: name.replaceAll("-", " "),
      operations: operations.filter(({ group }) => group === name),
    })),
    schemas: Object.entries(components?.schemas ?? {}).map(([name, schema]) => ({ name, alternatives: fieldsOf(schema) })),
  };
}

type Content = Readonly<Record<string, { readonly schema: JsonSchema; readonly example?: unknown }>>;
type Operation = {
  readonly operationId: string;
  readonly summary: string;
  readonly tags: readonly string[];
  readonly security?: readonly Readonly<Record<string, unknown>>[];
  readonly parameters?: readonly {
    readonly name: string;
    readonly in: string;
    readonly required?: boolean;
    readonly schema: JsonSchema;
  }[];
  readonly requestBody?: { readonly content: Content };
  readonly responses: Readonly<Record<string, { readonly description: string; readonly content?: Content }>>;
};
type Plain = {
  readonly paths?: Readonly<Record<string, Readonly<Record<string, Operation>>>>;
  readonly components?: { readonly schemas?: Readonly<Record<string, JsonSchema>> };
};

function readableOperation(path: string, method: string, operation: Operation): ReadableOperation {
  const body = operation.requestBody?.content["application/json"];
  return {
    id: operation.operationId,
    method: method.toUpperCase(),
    path,
    summary: operation.summary,
    access: accessOf(operation.security),
    parameters: (operation.parameters ?? []).map(({ name, in: place, required = false, schema }) => ({
      name,
      place,
      required,
      type: typeInWords(schema),
    })),
    body: body ? shapeInWords(body.schema) : null,
    example: body?.example === undefined ? null : compactJson(body.example),
    replies: Object.entries(operation.responses).map(([status, { description, content = {} }]) => ({
      status,
      description,
      type: Object.entries(content)
        .map(([media, { schema }]) => (media.includes("json") && schema ? shapeInWords(schema) : media))
        .join(" or "),
    })),
  };
}

function accessOf(security: Operation["security"]): ReadableOperation["access"] {
  if (!security) return "signed in or by token";
  return security.length === 0 ? "anybody" : "signed in on a page";
}
