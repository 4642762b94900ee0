import { z } from "zod";

export const HOME = "/plants";
const BASE = "https://gainwright.invalid";

/**
 * Where to go after signing in: a path of ours, else the list of plants. Never throws. Judged as a browser reads it: `//x`, `/\x`,
 * tabs and line breaks lead elsewhere or are dropped on the way, so all of them are refused, encoded or not.
 */
export const NextPath = z
  .string()
  .max(2000)
  .regex(/^\/(?![/\\])[^\\\p{Cc}\p{Zs}\p{Zl}\p{Zp}]*$/u)
  .refine((path) => !/^\/(%2f|%5c|%0|%20)/i.test(path))
  .refine((path) => URL.canParse(path, BASE) && new URL(path, BASE).origin === BASE)
  .catch(HOME);
