import { z } from "zod";

export const Role = z.enum(["lead", "engineer", "reviewer"]);
export type Role = z.infer<typeof Role>;

/** What an access token may do. `write` includes `read`. */
export const Scope = z.enum(["read", "write"]);
export type Scope = z.infer<typeof Scope>;
