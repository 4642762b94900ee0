import { z } from "zod";
import type { StoredReply } from "@/lib/services/idempotency/stored-reply";
import type { Declaration } from "./declaration";
import { type FileResult, isFileReply, sendFile } from "./file-reply";
import { entityTag, isUnchanged, readTag } from "./preconditions";

/** What any handler gives back; `RouteResult` narrows it for one declaration. */
export type AnyResult =
  | null
  | { readonly body: unknown; readonly version?: number; readonly location?: string }
  | { readonly file: FileResult };

/** The reply as it is stored and sent. A body that breaks its own schema is a fault of ours, never sent. */
export function toStored({ reply, status }: Declaration, result: AnyResult): StoredReply {
  if (!(reply instanceof z.ZodType)) return { status: 204, body: null, version: null, location: null };
  if (!result || !("body" in result)) throw new Error("The handler gave no body.");
  const { version = null, location = null } = result;
  return { status: status ?? 200, body: JSON.stringify(reply.parse(result.body)), version, location };
}

export function sendStored({ status, body, version, location }: StoredReply, etag?: string): Response {
  const headers = new Headers();
  if (version !== null) headers.set("etag", etag ?? entityTag(version));
  if (location !== null) headers.set("location", location);
  if (body !== null) headers.set("content-type", "application/json");
  return new Response(body, { status, headers });
}

export function sendResult(declaration: Declaration, result: AnyResult, request: Request): Response {
  const { reply } = declaration;
  if (isFileReply(reply)) {
    if (!result || !("file" in result)) throw new Error("The handler gave no file.");
    return sendFile(reply, result.file);
  }
  const stored = toStored(declaration, result);
  if (request.method !== "GET" || stored.version === null || stored.body === null) return sendStored(stored);
  const etag = readTag(stored.version, stored.body);
  if (isUnchanged(request.headers, etag)) return new Response(null, { status: 304, headers: { etag } });
  return sendStored(stored, etag);
}
