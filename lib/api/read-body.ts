import { DomainError } from "@/lib/errors";

export const BODY_LIMIT = 1_048_576;
const DEPTH_LIMIT = 24;
const JSON_TYPE = /^application\/json\s*(;\s*charset\s*=\s*"?utf-8"?\s*)?$/i;

export type JsonBody = { readonly value: unknown; readonly bytes: Uint8Array };

/** Reads JSON and stops at the limit whatever the length header says; the rest is never taken in. */
export async function readJson(request: Request, limit = BODY_LIMIT): Promise<JsonBody> {
  const { headers } = request;
  if (!JSON_TYPE.test(headers.get("content-type") ?? "")) {
    throw new DomainError("not-json", "Send the body as application/json in UTF-8.");
  }
  if ((headers.get("content-encoding") ?? "identity").toLowerCase() !== "identity") {
    throw new DomainError("not-json", "Send the body without a content encoding; compressed bodies are not read.");
  }
  if (Number(headers.get("content-length") ?? 0) > limit) {
    await request.body?.cancel();
    throw tooLarge(limit);
  }
  const bytes = await readBytes(request, limit);
  return { value: parseJson(bytes), bytes };
}

/** The bytes of a body, up to the limit; for those that are not JSON. */
export async function readBytes(request: Request, limit: number): Promise<Uint8Array> {
  if (!request.body) throw new DomainError("unreadable", "The body is empty; JSON is expected.");
  const reader = request.body.getReader();
  const chunks: Uint8Array[] = [];
  let size = 0;
  for (let part = await reader.read(); !part.done; part = await reader.read()) {
    size += part.value.byteLength;
    if (size > limit) {
      await reader.cancel();
      throw tooLarge(limit);
    }
    chunks.push(part.value);
  }
  return Buffer.concat(chunks, size);
}

function tooLarge(limit: number): DomainError {
  return new DomainError("too-large", `The body is larger than ${limit} bytes, which is the most this address takes.`, { limit });
}

function parseJson(bytes: Uint8Array): unknown {
  const value = tryParse(bytes);
  refuseHostileShapes(value);
  return value;
}

function tryParse(bytes: Uint8Array): unknown {
  try {
    return JSON.parse(new TextDecoder("utf-8", { fatal: true }).decode(bytes));
  } catch {
    throw new DomainError("unreadable", "The body is not JSON in UTF-8.");
  }
}

/** Level by level instead of by recursion: a deep body must not exhaust the stack of whoever reads it next. */
function refuseHostileShapes(root: unknown): void {
  let level: unknown[] = [root];
  for (let depth = 0; level.length > 0; depth++) {
    if (depth > DEPTH_LIMIT) throw new DomainError("unreadable", `The body is nested deeper than ${DEPTH_LIMIT} levels.`);
    const below: unknown[] = [];
    for (const value of level) {
      if (typeof value === "string") refuseUnstorableText(value);
      if (typeof value !== "object" || value === null) continue;
      if (Object.hasOwn(value, "__proto__")) throw new DomainError("unreadable", 'A field may not be named "__proto__".');
      if (!Array.isArray(value)) for (const key of Object.keys(value)) refuseUnstorableText(key);
      for (const inner of Object.values(value)) below.push(inner);
    }
    level = below;
  }
}

/** PostgreSQL stores neither the zero character nor half of a surrogate pair. */
export function refuseUnstorableText(text: string): void {
  if (/\0|\p{Surrogate}/u.test(text)) {
    throw new DomainError("unreadable", "A text holds a zero character or half of a character; such text cannot be stored.");
  }
}
