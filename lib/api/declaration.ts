import type { z } from "zod";
import type { Issue } from "@/lib/errors";
import type { Right } from "@/lib/permissions/rights";
import type { Context, Person, Visitor } from "@/lib/services/context";
import type { Cost } from "@/lib/services/limits/spend";
import type { FileReply, FileResult } from "./file-reply";

/** What a route takes and gives. The pipeline enforces it and the API description is made from it. */
export type Declaration = {
  /** One line for the API description, in the imperative. */
  readonly summary: string;
  readonly params?: z.ZodType;
  readonly query?: z.ZodType;
  readonly body?: z.ZodType;
  /** What else to say of a body that its schema refuses, and that a service would say one try later. */
  readonly alsoRefused?: (body: unknown) => readonly Issue[];
  /** A body that works as it stands, for the API description; a test sends it. */
  readonly example?: unknown;
  /** `null`: nothing but the status 204. */
  readonly reply: z.ZodType | FileReply | null;
  readonly right?: Right;
  /** The change starts from a version, sent as `If-Match`. */
  readonly ifMatch?: true;
  /** A create: `Idempotency-Key` is asked for. Never where the reply holds a secret, since replies are kept for a day. */
  readonly idempotent?: true;
  readonly status?: 200 | 201 | 202;
  readonly bodyLimit?: number;
  /** Without it: `read` for GET, `write` for the rest. What costs `check` or `solve` takes its turn among the computations. */
  readonly cost?: Cost;
  /** A body of more bytes than this takes its turn too: it may bring formulas enough for a numeric thread. */
  readonly inTurnAbove?: number;
};

type Parsed<D, Part extends string> = D extends { readonly [P in Part]: infer S extends z.ZodType } ? z.output<S> : undefined;

/** What every handler is given, all of it checked. */
export type Checked<D extends Declaration> = {
  readonly params: Parsed<D, "params">;
  readonly query: Parsed<D, "query">;
  readonly body: Parsed<D, "body">;
  readonly version: D extends { readonly ifMatch: true } ? number : undefined;
  /** Aborts when the caller is gone. */
  readonly signal: AbortSignal;
};
export type TeamInput<D extends Declaration> = Checked<D> & { readonly ctx: Context };
/** `team`: where the session works now, null for somebody without a team. */
export type PersonInput<D extends Declaration> = Checked<D> & { readonly person: Person; readonly team: Context | null };
export type PublicInput<D extends Declaration> = Checked<D> & { readonly visitor: Visitor };

/** The core's documents are read-only all the way down; a reply may be. */
type ReadOnly<T> = T extends readonly (infer U)[]
  ? readonly ReadOnly<U>[]
  : T extends object
    ? { readonly [K in keyof T]: ReadOnly<T[K]> }
    : T;

/** `version` becomes the strong ETag, of a read with a checksum behind it; `location` is the address of what was created. */
export type RouteResult<D extends Declaration> = D["reply"] extends z.ZodType
  ? { readonly body: ReadOnly<z.input<D["reply"]>>; readonly version?: number; readonly location?: string }
  : D["reply"] extends FileReply
    ? { readonly file: FileResult }
    : null;
