import "server-only";
import { dictionary } from "@zxcvbn-ts/language-common";
import { z } from "zod";
import { DomainError, type Issue } from "@/lib/errors";
import { PASSWORD_LENGTH } from "@/lib/schemas/password-length";

/** About 49,000 passwords by frequency, lower case. Made on first use: most requests never need it. */
let common: Set<string> | undefined;

export function isCommonPassword(password: string): boolean {
  common ??= new Set(dictionary["passwords-common"]);
  const listed = common;
  return withoutTail(password).some((text) => listed.has(text)) || isOneUnitRepeated(password.toLowerCase());
}

/** A digit or a sign or two behind a common password is what is tried next: the text as it is, and without them. */
function withoutTail(password: string): string[] {
  const plain = password.toLowerCase();
  return [0, 1, 2]
    .filter((cut) => /^\P{L}*$/u.test(plain.slice(plain.length - cut)))
    .map((cut) => plain.slice(0, plain.length - cut));
}

/** `aaaaaaaa`, `abcabcabc`, `12121212` */
function isOneUnitRepeated(text: string): boolean {
  for (let unit = 1; unit <= Math.min(4, text.length / 2); unit++) {
    if (
      text ===
      text
        .slice(0, unit)
        .repeat(Math.ceil(text.length / unit))
        .slice(0, text.length)
    )
      return true;
  }
  return false;
}

/** `own` are the person's name, address and team: the first things that are tried. */
function weakness(password: string, own: readonly string[]): string | null {
  if (isCommonPassword(password)) return "This password is on the list that attackers try first. Choose a longer, unusual one";
  const words = own.flatMap((text) => [text, text.split("@")[0]]).map((text) => text.trim().toLowerCase());
  return withoutTail(password).some((text) => text.length >= 4 && words.includes(text))
    ? "Your name, address or team is the first thing to be tried. Choose something else"
    : null;
}

/** @throws DomainError invalid */
export function refuseWeakPassword(password: string, own: readonly string[], pointer: string): void {
  const detail = weakness(password, own);
  if (detail) throw new DomainError("invalid", "Choose another password.", {}, [{ pointer, detail }]);
}

const text = z.string().catch("");
const AsTyped = z.object({ password: z.string().max(PASSWORD_LENGTH.most), name: text, email: text, teamName: text });

/** What is weak in a body that has other faults as well, so that all of them are said at once. */
export function weakPasswordIn(body: unknown): Issue[] {
  const typed = AsTyped.safeParse(body).data;
  const detail = typed && weakness(typed.password, [typed.name, typed.email, typed.teamName]);
  return detail ? [{ pointer: "/password", detail }] : [];
}
