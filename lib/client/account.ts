import type { AccessToken, ChangePassword, CreateAccessToken, CreatedAccessToken, Profile, SignUp } from "../schemas/account";
import type { Invite, JoinByInvitation } from "../schemas/invitation";
import type { AuditEvent, Invitation, Member, OutboxMail, Role, Team } from "../schemas/team";
import { request } from "./request";

type List<T> = { readonly items: T[] };
const post = (path: string, body: unknown) => request<undefined>(path, { method: "POST", body });

export const signUp = (body: SignUp) => post("/api/v1/sign-up", body);
export const requestReset = (email: string) => post("/api/v1/password-resets", { email });
export const resetPassword = (secret: string, password: string) => post("/api/v1/password-resets/use", { secret, password });
export const joinByInvitation = (body: JoinByInvitation) => post("/api/v1/invitations/join", body);
export const acceptInvitation = (secret: string) => post("/api/v1/invitations/accept", { secret });

export const changeName = async (name: string) =>
  (await request<Profile>("/api/v1/account", { method: "PATCH", body: { name } })).data;
export const changePassword = (body: ChangePassword) => post("/api/v1/account/password", body);
export const endSessions = async (which: "all" | "others") =>
  (await request<{ ended: number }>("/api/v1/account/sessions", { method: "DELETE", body: { which } })).data.ended;
export const startTeam = async (name: string) =>
  (await request<Team>("/api/v1/account/team", { method: "POST", body: { name } })).data;
export const switchTeam = (teamId: string) => request<undefined>("/api/v1/account/team", { method: "PUT", body: { teamId } });

export const accessTokenKey = ["account", "tokens"] as const;
export const fetchAccessTokens = async (signal?: AbortSignal) =>
  (await request<List<AccessToken>>("/api/v1/account/tokens", { signal })).data.items;
export const createAccessToken = async (body: CreateAccessToken) =>
  (await request<CreatedAccessToken>("/api/v1/account/tokens", { method: "POST", body })).data;
export const revokeAccessToken = async (tokenId: string) =>
  (await request<AccessToken>(`/api/v1/account/tokens/${tokenId}`, { method: "DELETE" })).data;

export const teamKeys = { members: ["team", "members"], invitations: ["team", "invitations"], audit: ["team", "audit"] } as const;
export const renameTeam = async (name: string) => (await request<Team>("/api/v1/team", { method: "PATCH", body: { name } })).data;
export const fetchMembers = async (signal?: AbortSignal) =>
  (await request<List<Member>>("/api/v1/team/members", { signal })).data.items;
export const changeRole = async (userId: string, role: Role) =>
  (await request<Member>(`/api/v1/team/members/${userId}`, { method: "PATCH", body: { role } })).data;
export const removeMember = (userId: string) => request<undefined>(`/api/v1/team/members/${userId}`, { method: "DELETE" });
export const fetchInvitations = async (signal?: AbortSignal) =>
  (await request<List<Invitation>>("/api/v1/team/invitations", { signal })).data.items;
export const invite = async (body: Invite) =>
  (await request<Invitation>("/api/v1/team/invitations", { method: "POST", body })).data;
export const withdrawInvitation = (invitationId: string) =>
  request<undefined>(`/api/v1/team/invitations/${invitationId}`, { method: "DELETE" });
export const fetchAuditEvents = async (cursor: string | undefined, signal?: AbortSignal) =>
  (await request<List<AuditEvent> & { nextCursor: string | null }>("/api/v1/team/audit", { query: { cursor }, signal })).data;

export const outboxKey = ["outbox"] as const;
export const fetchOutbox = async (signal?: AbortSignal) =>
  (await request<List<OutboxMail>>("/api/v1/team/outbox", { signal })).data.items;
