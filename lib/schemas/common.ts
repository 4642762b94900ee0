import { z } from "zod";

/** Control characters break tables, mails and files; a name never needs one. */
const oneLine = (limit: number) =>
  z
    .string()
    .trim()
    .min(1, "Write a name here")
    .max(limit, `At most ${limit} characters`)
    .regex(/^[^\p{Cc}\u2028\u2029]*$/u, "Line breaks and control characters cannot stand here");

export const Id = z.uuid("This is not an identifier of ours");
export const Name = oneLine(120);
export const SignalName = oneLine(40);
export const AxisTag = oneLine(4);

/** Empty text is allowed here and reported at the field by `evaluatePlant`, which can say which signal misses its unit. */
export const Unit = z
  .string()
  .trim()
  .max(24, "At most 24 characters")
  .regex(/^[^\p{Cc}]*$/u, "Line breaks and control characters cannot stand here");

export const Remark = z.string().trim().max(2000, "At most 2000 characters");
export const Finite = z.number({ error: "A finite number is needed here" });
export const Positive = Finite.positive("A number above zero is needed here");
export const Version = z.int().positive();
export const Timestamp = z.iso.datetime();

/** Says in the API description which unit a number has, or the numbers of a list or matrix have. */
export const inUnit = <T extends z.ZodType>(schema: T, unit: string): T => schema.meta({ description: unit });
export const Seconds = inUnit(Finite, "in seconds");
export const Plain = inUnit(Finite, "without a unit");
/** For a field whose unit stands beside it. */
export const OwnUnit = "in `unit`";

export const Rows = z.array(z.array(Finite).max(60)).max(60);

export const PageQuery = z.strictObject({
  /** `nextCursor` of the page before: as long as 120 characters of any script make it. */
  cursor: z.string().max(800).optional(),
  limit: z.coerce.number().int().min(1).max(100).default(50),
});

export function page<T extends z.ZodType>(item: T) {
  return z.strictObject({ items: z.array(item), nextCursor: z.string().nullable() });
}
