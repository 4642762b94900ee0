import type { NumericalErrorCode } from "@/control/errors";
import type { DomainErrorCode } from "@/lib/errors";
import { NUMERICAL_PROBLEMS } from "./numerical-problems";

/** `meaning` says what happened, `nextStep` what to do about it. Both are also the page that `type` points to. */
export type ProblemEntry = {
  readonly status: number;
  readonly title: string;
  readonly meaning: string;
  readonly nextStep: string;
};

/** Refusals of the service itself: a solve that used up its time, and the last resort for a fault of ours. */
export type ServiceCode = "time-limit" | "internal";
export type ProblemCode = DomainErrorCode | NumericalErrorCode | ServiceCode;

const OWN_PROBLEMS: Readonly<Record<DomainErrorCode | ServiceCode, ProblemEntry>> = {
  unreadable: {
    status: 400,
    title: "The request cannot be read",
    meaning: "The body, a header or the address is not in the form that this route describes.",
    nextStep: "Compare the request with the API description; the detail names what could not be read.",
  },
  "no-session": {
    status: 401,
    title: "Nobody is signed in",
    meaning: "The request carries no session and no valid access token, or the session has ended.",
    nextStep: "Sign in again, or send an access token that has not expired. What you typed is kept on the page.",
  },
  forbidden: {
    status: 403,
    title: "Your role or token does not allow this",
    meaning: "You may see this, but changing it needs another role, a wider token, or a request from a page of this service.",
    nextStep: "Ask a lead of your team, or use an access token with the write scope.",
  },
  "not-found": {
    status: 404,
    title: "Nothing found here",
    meaning: "It does not exist, was removed, or belongs to another team.",
    nextStep: "Check the address, and that you are signed in to the right team.",
  },
  conflict: {
    status: 409,
    title: "This clashes with what is stored",
    meaning: "Something of that name or state exists already, or an equal request is still being carried out.",
    nextStep: "Read the detail, look at what is stored now, then change the request or send it again later.",
  },
  "gains-disagree": {
    status: 409,
    title: "The gains that were shown are not the service's own",
    meaning: "The gains sent along differ from those that the service computed by more than both may be off. Nothing was stored.",
    nextStep:
      "Reload the page, or compute with the methods of the service's version, and look at the gains again before storing.",
  },
  "stale-version": {
    status: 412,
    title: "Somebody saved a change after you opened this",
    meaning: "The version you started from is no longer the stored one. Nothing of yours was saved over it.",
    nextStep: "Fetch the current version, compare, and send your change with its ETag.",
  },
  "too-large": {
    status: 413,
    title: "The request is too large",
    meaning: "The body or a matrix in it is larger than this service takes.",
    nextStep: "Keep to the stated limit; a plant has at most 60 states, 12 inputs and 12 outputs.",
  },
  "not-json": {
    status: 415,
    title: "The body must be JSON",
    meaning: "The content type or content encoding is one that this service does not read.",
    nextStep: "Send application/json in UTF-8 without compression.",
  },
  invalid: {
    status: 422,
    title: "Some values cannot be taken",
    meaning: "The request was read, but values in it are missing, unknown or outside their bounds.",
    nextStep: "Correct the places listed under errors; everything else can stay.",
  },
  unsolvable: {
    status: 422,
    title: "The computation was refused",
    meaning: "An assumption that the method needs does not hold for this plant and recipe.",
    nextStep: "Read the detail; it names the assumption and a change to try.",
  },
  "precondition-required": {
    status: 428,
    title: "Say which version you are changing",
    meaning: "A change needs the version it starts from, so that nobody's work is overwritten unseen.",
    nextStep: "Send If-Match with the ETag from your last read.",
  },
  "too-many-requests": {
    status: 429,
    title: "Too many requests",
    meaning: "You or your team sent more requests than the limit for this kind within a minute.",
    nextStep: "Wait for the number of seconds in Retry-After, then send the request again.",
  },
  busy: {
    status: 503,
    title: "Too many computations are waiting",
    meaning: "The computations of your team or of the service are queued up to their limit. Nothing was started.",
    nextStep: "Send the request again after the number of seconds in Retry-After.",
  },
  unavailable: {
    status: 503,
    title: "The service cannot reach its data",
    meaning: "The database does not answer at the moment. Nothing was stored unless it was confirmed before.",
    nextStep: "Send the request again after the number of seconds in Retry-After; keep the same Idempotency-Key.",
  },
  "time-limit": {
    status: 422,
    title: "The computation took too long",
    meaning: "The computation did not finish within its time limit and was stopped. Nothing was stored.",
    nextStep: "Reduce the order of the plant or the length of the response, or try again when the service is quiet.",
  },
  internal: {
    status: 500,
    title: "Something went wrong on our side",
    meaning: "The service met a fault it did not expect. It is recorded under the request id.",
    nextStep: "Try again. If it happens again, give the request id to whoever runs this service.",
  },
};

/** Every code that a problem can carry. `too-large` is a body as well as a matrix; its entry speaks of both. */
export const PROBLEMS: Readonly<Record<ProblemCode, ProblemEntry>> = { ...NUMERICAL_PROBLEMS, ...OWN_PROBLEMS };
