import type { Mail } from "@/db/queries/outbox";
import type { Role } from "@/lib/schemas/team";
import { composeMail } from "./compose-mail";

type Invitation = {
  readonly recipient: string;
  readonly teamName: string;
  readonly inviter: string;
  readonly role: Role;
  readonly url: string;
};

export function invitationMail({ recipient, teamName, inviter, role, url }: Invitation): Mail {
  return composeMail({
    recipient,
    subject: `${inviter} invites you to the team ${teamName}`,
    paragraphs: [
      `${inviter} invites you to join the team ${teamName} on Gainwright as ${role}.`,
      "The link works once, for seven days.",
    ],
    action: { label: "Join the team", url },
    closing: "If you do not know this person or team, ignore this mail: nothing happens without you.",
  });
}

export function resetMail(recipient: string, url: string): Mail {
  return composeMail({
    recipient,
    subject: "Choose a new password",
    paragraphs: [
      "Somebody, probably you, asked for a new password for this address.",
      "The link works once, for 60 minutes. Using it ends all your sessions.",
    ],
    action: { label: "Choose a new password", url },
    closing: "If it was not you, ignore this mail: your password stays as it is.",
  });
}

export function passwordChangedMail(recipient: string): Mail {
  return composeMail({
    recipient,
    subject: "Your password was changed",
    paragraphs: [
      "The password of your account was changed, and your other sessions were ended.",
      "If it was not you, ask for a new password at once from the sign-in page, and tell a lead of your team.",
    ],
    closing: "This mail needs no answer.",
  });
}
