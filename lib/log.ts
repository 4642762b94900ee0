import pino from "pino";
import { logLevel } from "./env";

const secretNames = ["password", "newPassword", "currentPassword", "secret", "token", "authorization", "cookie", "set-cookie"];
const anywhere = secretNames.flatMap((name) => [`["${name}"]`, `*["${name}"]`, `*.*["${name}"]`]);

/** One JSON line per event, on standard output. */
export const log = pino({
  level: logLevel(),
  base: { service: "gainwright" },
  timestamp: pino.stdTimeFunctions.isoTime,
  redact: { paths: anywhere, censor: "[redacted]" },
});
