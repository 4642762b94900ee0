import { z } from "zod";

/** A reply as it is kept, to be given again word for word. */
export const StoredReply = z.strictObject({
  status: z.int(),
  body: z.unknown(),
  version: z.int().nullable(),
  location: z.string().nullable(),
});
export type StoredReply = z.infer<typeof StoredReply>;
