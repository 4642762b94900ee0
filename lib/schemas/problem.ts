import { z } from "zod";

/** `pointer` is a JSON pointer (RFC 6901) into the body that was sent; empty where the whole request is meant. */
export const ProblemIssue = z.strictObject({ pointer: z.string(), detail: z.string() });
export type ProblemIssue = z.infer<typeof ProblemIssue>;

/** An RFC 9457 problem, as every refused request under /api/v1 answers it. */
export const Problem = z.strictObject({
  type: z.string(),
  title: z.string(),
  status: z.int(),
  detail: z.string(),
  instance: z.string(),
  code: z.string(),
  requestId: z.string(),
  /** What to change, place by place. */
  errors: z.array(ProblemIssue).optional(),
  /** Seconds to wait before the same request is worth sending again. */
  retryAfter: z.int().optional(),
  /** The version that was sent and the one that is stored now. */
  given: z.int().optional(),
  current: z.int().optional(),
  /** Facts of a refused computation; the code says which. */
  data: z.record(z.string(), z.unknown()).optional(),
});
export type Problem = z.infer<typeof Problem>;
