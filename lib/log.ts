import pino from "pino";
import { logLevel } from "./env";

const secretNames = [
  "password",
  "newPassword",
  "currentPassword",
  "passwordHash",
  "secret",
  "token",
  "authorization",
  "cookie",
  "set-cookie",
];

export const logOptions = {
  level: logLevel(),
  base: { service: "gainwright" },
  timestamp: pino.stdTimeFunctions.isoTime,
  redact: { paths: secretNames.flatMap((name) => [`["${name}"]`, `*["${name}"]`, `*.*["${name}"]`]), censor: "[redacted]" },
} satisfies pino.LoggerOptions;

/** One JSON line per event, on standard output. */
export const log = pino(logOptions);
