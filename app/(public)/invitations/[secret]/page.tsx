import type { Metadata } from "next";
import { AcceptInvitation } from "@/components/account/accept-invitation";
import { JoinForm } from "@/components/account/join-form";
import { VisitorPage } from "@/components/account/visitor-page";
import { ErrorState } from "@/components/ui/error-state";
import { LinkButton } from "@/components/ui/link-button";
import { currentPerson } from "@/lib/auth/session";
import { DomainError } from "@/lib/errors";
import { AcceptInvitation as Accept } from "@/lib/schemas/invitation";
import type { InvitationPreview } from "@/lib/schemas/team";
import { previewInvitation } from "@/lib/services/team/open-invitation";

export const metadata: Metadata = { title: "Invitation", referrer: "no-referrer" };

/** Null where the link is broken, used, withdrawn or too old: which of these, only its holder could tell. */
async function previewOf(secret: string): Promise<InvitationPreview | null> {
  const parsed = Accept.safeParse({ secret });
  if (!parsed.success) return null;
  try {
    return await previewInvitation(parsed.data);
  } catch (error) {
    if (error instanceof DomainError) return null;
    throw error;
  }
}

export default async function Page({ params }: Readonly<{ params: Promise<{ secret: string }> }>) {
  const { secret } = await params;
  const [preview, person] = [await previewOf(secret), await currentPerson()];
  if (!preview) {
    return (
      <VisitorPage title="Invitation">
        <ErrorState title="This link does not work any more.">
          It may have been used, withdrawn, or be older than seven days. Ask the lead who invited you for a new one.
        </ErrorState>
      </VisitorPage>
    );
  }
  const { teamName, invitedBy, role, email, hasAccount } = preview;
  return (
    <VisitorPage title={`Join ${teamName}`}>
      <p className="mb-4">
        {invitedBy} invites {email} as {role}.
      </p>
      {person?.email === email ? (
        <AcceptInvitation secret={secret} />
      ) : hasAccount ? (
        <LinkButton tone="primary" href={`/sign-in?next=${encodeURIComponent(`/invitations/${secret}`)}`}>
          Sign in as {email}
        </LinkButton>
      ) : (
        <JoinForm secret={secret} email={email} />
      )}
    </VisitorPage>
  );
}
