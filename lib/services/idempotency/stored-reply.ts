import "server-only";
import { z } from "zod";

/** A reply as it is kept, to be given again word for word: `body` is its JSON text, since stored JSON loses the order of fields. */
export const StoredReply = z.strictObject({
  status: z.int(),
  body: z.string().nullable(),
  version: z.int().nullable(),
  location: z.string().nullable(),
});
export type StoredReply = z.infer<typeof StoredReply>;
