import type { Metadata } from "next";
import { AcceptInvitation } from "@/components/account/accept-invitation";
import { JoinForm } from "@/components/account/join-form";
import { SignOutFirst } from "@/components/account/sign-out-first";
import { VisitorPage } from "@/components/account/visitor-page";
import { ErrorState } from "@/components/ui/error-state";
import { LinkButton } from "@/components/ui/link-button";
import { Notice } from "@/components/ui/notice";
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
      <VisitorPage title="Invitation" person={person?.name}>
        <ErrorState title="This link does not work any more.">
          It may have been used, withdrawn, or be older than seven days. Ask the lead who invited you for a new one.
        </ErrorState>
      </VisitorPage>
    );
  }
  const { teamName, invitedBy, role, email } = preview;
  return (
    <VisitorPage title={`Join ${teamName}`} person={person?.name}>
      <p className="mb-4 break-words">
        {invitedBy} invites {email} as {role}.
      </p>
      <WayIn path={`/invitations/${secret}`} secret={secret} preview={preview} signedInAs={person?.email ?? null} />
    </VisitorPage>
  );
}

type WayInProps = Readonly<{ path: string; secret: string; preview: InvitationPreview; signedInAs: string | null }>;

function WayIn({ path, secret, preview: { email, hasAccount }, signedInAs }: WayInProps) {
  if (signedInAs === email) return <AcceptInvitation secret={secret} />;
  if (signedInAs !== null) {
    return (
      <Notice kind="caution" title={`You are signed in as ${signedInAs}.`} action={<SignOutFirst path={path} />}>
        The invitation is for {email}, so only they can accept it.
      </Notice>
    );
  }
  if (!hasAccount) return <JoinForm secret={secret} email={email} />;
  return (
    <LinkButton tone="primary" href={`/sign-in?next=${encodeURIComponent(path)}`}>
      Sign in as {email}
    </LinkButton>
  );
}
