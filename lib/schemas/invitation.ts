import { z } from "zod";
import { Email, NewPassword, Secret } from "./account";
import { Name } from "./common";
import { Role } from "./team";

export const Invite = z.strictObject({ email: Email, role: Role });
export type Invite = z.infer<typeof Invite>;

/** By somebody who is signed in with the invited address. */
export const AcceptInvitation = z.strictObject({ secret: Secret });
export type AcceptInvitation = z.infer<typeof AcceptInvitation>;

/** By somebody new, whose account is made with the invited address. */
export const JoinByInvitation = z.strictObject({ secret: Secret, name: Name, password: NewPassword });
export type JoinByInvitation = z.infer<typeof JoinByInvitation>;
