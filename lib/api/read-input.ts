import { z } from "zod";
import type { Checked, Declaration } from "./declaration";
import { parseBody, parseParams, parseQuery } from "./parse-input";
import { versionFromIfMatch } from "./preconditions";
import { type JsonBody, readJson } from "./read-body";

/** What Next hands to a route handler beside the request. */
export type RouteContext = { readonly params: Promise<unknown> };

const NO_BODY: JsonBody = { value: undefined, bytes: new Uint8Array() };
const NoQuery = z.strictObject({});

/** Path, query, body and version of a request, each checked against the declaration. */
export async function readInput<D extends Declaration>(declaration: D, request: Request, context: RouteContext) {
  const { params, query, body: schema, ifMatch, bodyLimit, alsoRefused } = declaration;
  const named = params ? parseParams(params, await context.params) : undefined;
  const asked = parseQuery(query ?? NoQuery, new URL(request.url).searchParams);
  const { value, bytes } = schema ? await readJson(request, bodyLimit) : NO_BODY;
  const parsed = schema ? parseBody(schema, value, alsoRefused) : undefined;
  const version = ifMatch ? versionFromIfMatch(request.headers) : undefined;
  const checked = { params: named, query: query && asked, body: parsed, version, signal: request.signal };
  // The one place where checked values take the types that the declaration promises for them.
  return { checked: checked as unknown as Checked<D>, bytes };
}
