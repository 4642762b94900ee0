import { z } from "zod";

const Flag = z
  .enum(["yes", "no"])
  .default("no")
  .transform((value) => value === "yes");
const DatabaseUrl = z.string().regex(/^postgres(ql)?:\/\//, "must start with postgres:// or postgresql://");
const Optional = <T extends z.ZodType>(schema: T) =>
  z.preprocess((value) => (value === "" ? undefined : value), schema.optional());

const Env = z.object({
  /** The account that serves: it owns nothing and obeys row security. */
  DATABASE_URL: DatabaseUrl,
  /** The account that owns and migrates the tables; not needed to serve. */
  DATABASE_OWNER_URL: Optional(DatabaseUrl),
  /** The address people use, with its port; https here turns on Secure cookies. */
  NEXTAUTH_URL: z.url({ protocol: /^https?$/ }),
  NEXTAUTH_SECRET: z.string().min(32, "must have at least 32 characters"),
  /** Without it mails stay in the outbox. */
  SMTP_URL: Optional(z.string().regex(/^smtps?:\/\//, "must start with smtp:// or smtps://")),
  MAIL_FROM: z.string().min(3).default("Gainwright <no-reply@gainwright.example>"),
  /** Demo mode: the sign-in page shows the demo accounts and the outbox has a page. */
  GAINWRIGHT_DEMO: Flag,
  /** How many proxies of ours stand in front: that many entries from the right of `X-Forwarded-For` are believed. */
  TRUSTED_PROXIES: z.coerce.number().int().min(0).max(10).default(0),
});
export type Env = z.infer<typeof Env>;

let parsed: Env | undefined;

/** The settings, checked when first asked for: a build imports every route without having any. */
export function env(): Env {
  if (!parsed) {
    const { data, error } = Env.safeParse(process.env);
    // Names and reasons only: a value may be a secret.
    if (error) throw new Error(`Settings: ${error.issues.map(({ path, message }) => `${path.join(".")} ${message}`).join("; ")}`);
    parsed = data;
  }
  return parsed;
}

/** Unlike `env()`, usable where no settings exist, such as in a build. */
export const isDevelopment = () => process.env.NODE_ENV === "development";
export const isProduction = () => process.env.NODE_ENV === "production";
const LogLevel = z.enum(["fatal", "error", "warn", "info", "debug", "silent"]);

/** Asked when the log is made, before any setting is needed. */
export const logLevel = () =>
  LogLevel.catch(process.env.NODE_ENV === "production" ? "info" : "warn").parse(process.env.LOG_LEVEL);
