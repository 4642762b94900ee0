import "server-only";
import { randomBytes, scrypt, timingSafeEqual } from "node:crypto";
import { DomainError } from "@/lib/errors";

/** N = 2^17, r = 8, p = 1: 128 MB and about half a second a try. */
const COST = { logN: 17, r: 8, p: 1 } as const;
const KEY_BYTES = 32;
const AT_ONCE = 2;
const WAITING = 16;

let running = 0;
const waiting: (() => void)[] = [];

/** Each try takes 128 MB and a core: a flood of them waits in line or is turned away, and the rest of the service goes on. */
async function inTurn<T>(work: () => Promise<T>): Promise<T> {
  if (running >= AT_ONCE) {
    if (waiting.length >= WAITING) {
      throw new DomainError("busy", "Many people are signing in just now. Try again in a few seconds.", { retryAfter: 5 });
    }
    await new Promise<void>((resolve) => waiting.push(resolve));
  } else running += 1;
  try {
    return await work();
  } finally {
    const next = waiting.shift();
    if (next) next();
    else running -= 1;
  }
}

function derive(password: string, salt: Buffer, { logN, r, p }: { logN: number; r: number; p: number }): Promise<Buffer> {
  const options = { N: 2 ** logN, r, p, maxmem: 256 * 2 ** logN * r };
  // The same characters can be composed in two ways by two keyboards.
  const text = password.normalize("NFC");
  return inTurn(
    () =>
      new Promise((resolve, reject) =>
        scrypt(text, salt, KEY_BYTES, options, (error, key) => (error ? reject(error) : resolve(key))),
      ),
  );
}

export async function hashPassword(password: string): Promise<string> {
  const salt = randomBytes(16);
  const key = await derive(password, salt, COST);
  return ["scrypt", COST.logN, COST.r, COST.p, salt.toString("base64url"), key.toString("base64url")].join("$");
}

/** Never matches, at the same price: an unknown address takes as long as a wrong password. */
const NOBODY = ["scrypt", COST.logN, COST.r, COST.p, "A".repeat(22), "A".repeat(43)].join("$");

/** `stored` undefined: nobody has this account; the answer is no and takes as long. */
export async function passwordMatches(password: string, stored: string | undefined): Promise<boolean> {
  const [, logN, r, p, salt, key] = (stored ?? NOBODY).split("$");
  const expected = Buffer.from(key ?? "", "base64url");
  const given = await derive(password, Buffer.from(salt ?? "", "base64url"), { logN: Number(logN), r: Number(r), p: Number(p) });
  return expected.length === given.length && timingSafeEqual(given, expected) && stored !== undefined;
}
