import { z } from "zod";
import { Id, Name, Timestamp } from "./common";
import { PASSWORD_LENGTH } from "./password-length";
import { Role, Scope } from "./team";

/** Lower case everywhere, so that one person has one account. */
export const Email = z
  .string()
  .trim()
  .toLowerCase()
  .max(254, "At most 254 characters")
  .pipe(z.email("Write an e-mail address, such as name@company.example"));

/** Any characters, blanks at the ends too: nothing is trimmed or refused but the length. Common ones the server refuses. */
export const NewPassword = z
  .string()
  .min(PASSWORD_LENGTH.least, `At least ${PASSWORD_LENGTH.least} characters; ${PASSWORD_LENGTH.advised} or more are better`)
  .max(PASSWORD_LENGTH.most, `At most ${PASSWORD_LENGTH.most} characters`);
const GivenPassword = z.string().min(1, "Write your password here").max(PASSWORD_LENGTH.most, "Too long to be your password");

/** From a link in a mail: 256 random bits. */
export const Secret = z.string().regex(/^[A-Za-z0-9_-]{43}$/, "This link is not complete. Copy the whole of it from the mail");

export const SignUp = z.strictObject({ name: Name, email: Email, password: NewPassword, teamName: Name });
export type SignUp = z.infer<typeof SignUp>;

export const SignIn = z.strictObject({ email: Email, password: GivenPassword });
export type SignIn = z.infer<typeof SignIn>;

export const RequestReset = z.strictObject({ email: Email });
export type RequestReset = z.infer<typeof RequestReset>;
export const ResetPassword = z.strictObject({ secret: Secret, password: NewPassword });
export type ResetPassword = z.infer<typeof ResetPassword>;

export const ChangePassword = z.strictObject({ currentPassword: GivenPassword, newPassword: NewPassword });
export type ChangePassword = z.infer<typeof ChangePassword>;
export const ChangeName = z.strictObject({ name: Name });
export type ChangeName = z.infer<typeof ChangeName>;

/** An account, its own teams and where it is working now. */
export const Profile = z.strictObject({
  id: Id,
  name: Name,
  email: z.string(),
  createdAt: Timestamp,
  currentTeamId: Id.nullable(),
  teams: z.array(z.strictObject({ id: Id, name: Name, role: Role })),
});
export type Profile = z.infer<typeof Profile>;

export const CreateAccessToken = z.strictObject({
  name: Name,
  scope: Scope,
  expiresInDays: z.int("Whole days").min(1, "At least one day").max(365, "At most 365 days"),
});
export type CreateAccessToken = z.infer<typeof CreateAccessToken>;

export const AccessToken = z.strictObject({
  id: Id,
  name: Name,
  scope: Scope,
  createdAt: Timestamp,
  expiresAt: Timestamp,
  lastUsedAt: Timestamp.nullable(),
  revokedAt: Timestamp.nullable(),
});
export type AccessToken = z.infer<typeof AccessToken>;
/** The only reply that ever holds the secret. */
export const CreatedAccessToken = AccessToken.extend({ secret: z.string() });
export type CreatedAccessToken = z.infer<typeof CreatedAccessToken>;
