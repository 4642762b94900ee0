import { z } from "zod";
import { Id, Name, PageQuery, Timestamp } from "./common";

export const Role = z.enum(["lead", "engineer", "reviewer"]);
export type Role = z.infer<typeof Role>;

/** What an access token may do. `write` includes `read`. */
export const Scope = z.enum(["read", "write"]);
export type Scope = z.infer<typeof Scope>;

export const Team = z.strictObject({ id: Id, name: Name, createdAt: Timestamp });
export type Team = z.infer<typeof Team>;
export const StartTeam = z.strictObject({ name: Name });
export type StartTeam = z.infer<typeof StartTeam>;
export const RenameTeam = z.strictObject({ name: Name });
export type RenameTeam = z.infer<typeof RenameTeam>;
export const SwitchTeam = z.strictObject({ teamId: Id });
export type SwitchTeam = z.infer<typeof SwitchTeam>;

/** `email` is null where the reader may not know it. */
export const Member = z.strictObject({ userId: Id, name: Name, email: z.string().nullable(), role: Role, joinedAt: Timestamp });
export type Member = z.infer<typeof Member>;
export const ChangeRole = z.strictObject({ role: Role });
export type ChangeRole = z.infer<typeof ChangeRole>;

export const Invitation = z.strictObject({
  id: Id,
  email: z.string(),
  role: Role,
  invitedBy: z.string(),
  createdAt: Timestamp,
  expiresAt: Timestamp,
});
export type Invitation = z.infer<typeof Invitation>;

/** What the holder of the link may know before accepting. */
export const InvitationPreview = z.strictObject({
  teamName: Name,
  email: z.string(),
  role: Role,
  invitedBy: z.string(),
  /** Then they sign in and accept; else they choose a name and a password. */
  hasAccount: z.boolean(),
});
export type InvitationPreview = z.infer<typeof InvitationPreview>;

export const AuditEvent = z.strictObject({
  id: Id,
  at: Timestamp,
  actor: z.string().nullable(),
  kind: z.string(),
  subjectType: z.string(),
  subjectId: Id.nullable(),
  /** What it is called today; null where it has no name. */
  subjectName: z.string().nullable(),
  /** The plant that it is, or belongs to. */
  plantId: Id.nullable(),
  revision: z.int().nullable(),
  requestId: z.string(),
  data: z.record(z.string(), z.unknown()),
});
export type AuditEvent = z.infer<typeof AuditEvent>;
export const AuditQuery = PageQuery;
export type AuditQuery = z.infer<typeof AuditQuery>;

/** A mail as the demo's page shows it. */
export const OutboxMail = z.strictObject({
  id: Id,
  recipient: z.string(),
  subject: z.string(),
  text: z.string(),
  createdAt: Timestamp,
  sentAt: Timestamp.nullable(),
  lastError: z.string().nullable(),
});
export type OutboxMail = z.infer<typeof OutboxMail>;
