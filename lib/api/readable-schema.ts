/** As much of a JSON schema as the generator writes. */
export type JsonSchema = {
  readonly $ref?: string;
  readonly description?: string;
  readonly type?: string | readonly string[];
  readonly format?: string;
  readonly enum?: readonly unknown[];
  readonly properties?: Readonly<Record<string, JsonSchema>>;
  readonly required?: readonly string[];
  readonly items?: JsonSchema;
  readonly oneOf?: readonly JsonSchema[];
  readonly anyOf?: readonly JsonSchema[];
  readonly minimum?: number;
  readonly exclusiveMinimum?: number;
  readonly maximum?: number;
  readonly minLength?: number;
  readonly maxLength?: number;
  readonly minItems?: number;
  readonly maxItems?: number;
  readonly additionalProperties?: boolean | JsonSchema;
};

/** `name` of a field inside another one is written as its way down, such as `axes[].tag`; `note` says the unit of numbers. */
export type ReadableField = {
  readonly name: string;
  readonly type: string;
  readonly required: boolean;
  readonly note: string;
};

/** A type in a few words; what has a name is called by it. */
export function typeInWords(schema: JsonSchema): string {
  const name = refName(schema);
  if (name) return name;
  const alternatives = schema.oneOf ?? schema.anyOf;
  if (alternatives) return [...new Set(alternatives.map(shapeInWords))].join(" or ");
  if (schema.enum) return schema.enum.map((value) => JSON.stringify(value)).join(" or ");
  const kinds = [schema.type ?? "any"].flat();
  return kinds.map((kind) => kindInWords(kind, schema)).join(" or ");
}

/** A nameless object is told by its fields. */
export function shapeInWords(schema: JsonSchema): string {
  if (!schema.properties) return typeInWords(schema);
  const fields = Object.entries(schema.properties).map(([name, field]) => `${name}: ${typeInWords(field)}`);
  return `{ ${fields.join("; ")} }`;
}

function kindInWords(kind: string, schema: JsonSchema): string {
  if (kind === "array") return listInWords(schema);
  if (kind === "object" && !schema.properties && typeof schema.additionalProperties === "object") {
    return `${typeInWords(schema.additionalProperties)}, by name`;
  }
  if (kind === "string") return `${FORMATS[schema.format ?? ""] ?? "text"}${bounds(schema.minLength, schema.maxLength)}`;
  if (kind === "integer" || kind === "number") return `${kind === "integer" ? "whole number" : "number"}${range(schema)}`;
  if (kind === "boolean") return "true or false";
  return kind === "any" ? "anything" : kind;
}

function listInWords({ items, minItems, maxItems }: JsonSchema): string {
  if (items?.type !== "array") return `list of ${items ? typeInWords(items) : "anything"}${bounds(minItems, maxItems)}`;
  const size = maxItems === undefined || items.maxItems === undefined ? "" : `, at most ${maxItems} × ${items.maxItems}`;
  return `rows of ${items.items ? typeInWords(items.items) : "anything"}${size}`;
}

const FORMATS: Readonly<Record<string, string>> = { uuid: "id", "date-time": "UTC time", email: "e-mail address" };

function bounds(least = 0, most?: number): string {
  if (most === undefined) return least > 1 ? `, at least ${least}` : "";
  return least > 1 ? `, ${least} to ${most}` : `, at most ${most}`;
}

function range({ minimum, exclusiveMinimum, maximum }: JsonSchema): string {
  if (minimum !== undefined && maximum !== undefined && maximum < Number.MAX_SAFE_INTEGER)
    return ` from ${minimum} to ${maximum}`;
  if (exclusiveMinimum !== undefined) return ` above ${exclusiveMinimum}`;
  return minimum === undefined || minimum <= Number.MIN_SAFE_INTEGER ? "" : ` from ${minimum} up`;
}

/** Every field of an object with the fields of the nameless objects inside it; alternatives one list each. */
export function fieldsOf(schema: JsonSchema, prefix = ""): readonly (readonly ReadableField[])[] {
  const alternatives = schema.oneOf ?? schema.anyOf;
  if (alternatives) return alternatives.flatMap((one) => fieldsOf(one, prefix));
  const fields = Object.entries(schema.properties ?? {}).flatMap(([name, field]) => {
    const required = schema.required?.includes(name) ?? false;
    const own = { name: `${prefix}${name}`, type: typeInWords(field), required, note: field.description ?? "" };
    return [own, ...inner(field, own.name)];
  });
  return [fields];
}

function inner(field: JsonSchema, name: string): readonly ReadableField[] {
  if (field.properties) return fieldsOf(field, `${name}.`).flat();
  if (field.items?.properties) return fieldsOf(field.items, `${name}[].`).flat();
  return [];
}

export function refName({ $ref }: JsonSchema): string | undefined {
  return $ref?.split("/").at(-1);
}
