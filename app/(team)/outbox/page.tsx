import type { Metadata } from "next";
import { OutboxList } from "@/components/outbox/outbox-list";
import { ErrorState } from "@/components/ui/error-state";
import { LinkButton } from "@/components/ui/link-button";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { pageContext } from "@/lib/auth/session";
import { env } from "@/lib/env";
import { isAllowed } from "@/lib/permissions/allow";

export const metadata: Metadata = { title: "Mail of the demonstration" };

export default async function Page() {
  const ctx = await pageContext("/outbox");
  return (
    <PageBody>
      <PageHeading title="Mail of the demonstration" />
      {isAllowed(ctx, "outbox:read") ? (
        <>
          <p className="mb-5 max-w-prose text-soft">
            What this service has written to people of the team and to those invited. The links work, as they would from a
            mailbox; open one in a private window to follow it as somebody else.
          </p>
          <OutboxList origin={new URL(env().NEXTAUTH_URL).origin} />
        </>
      ) : (
        <ErrorState title="Only a lead reads these mails." action={<LinkButton href="/plants">Go to the plants</LinkButton>}>
          They hold links that let whoever opens them join a team or choose a new password.
        </ErrorState>
      )}
    </PageBody>
  );
}
