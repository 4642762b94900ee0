"use client";

import { useQuery } from "@tanstack/react-query";
import { fetchOutbox, outboxKey } from "@/lib/client/account";
import type { OutboxMail } from "@/lib/schemas/team";
import { useSession } from "../providers/session-provider";
import { Button } from "../ui/button";
import { Chip } from "../ui/chip";
import { EmptyState } from "../ui/empty-state";
import { ErrorState } from "../ui/error-state";
import { LoadingState } from "../ui/loading-state";
import { When } from "../ui/when";
import { MailText } from "./mail-text";

/** The newest hundred mails of the team, in place of a mailbox. */
export function OutboxList({ origin }: Readonly<{ origin: string }>) {
  const { resume } = useSession();
  const mails = useQuery({ queryKey: outboxKey, queryFn: ({ signal }) => resume(() => fetchOutbox(signal)) });
  if (mails.isPending) return <LoadingState label="Loading the mails" lines={6} />;
  if (mails.isError) {
    return (
      <ErrorState title="The mails could not be loaded." action={<Button onClick={() => mails.refetch()}>Try again</Button>}>
        {mails.error.message}
      </ErrorState>
    );
  }
  if (mails.data.length === 0) {
    return (
      <EmptyState title="No mail yet" action={<Button onClick={() => mails.refetch()}>Look again</Button>}>
        Invitations and links to a new password appear here as soon as they are written.
      </EmptyState>
    );
  }
  return (
    <>
      <div className="no-print mb-4">
        <Button busy={mails.isFetching} onClick={() => mails.refetch()}>
          {mails.isFetching ? "Looking…" : "Look again"}
        </Button>
      </div>
      <ol className="max-w-3xl space-y-6">
        {mails.data.map((mail) => (
          <li key={mail.id}>
            <Mail mail={mail} origin={origin} />
          </li>
        ))}
      </ol>
    </>
  );
}

function Mail({ mail, origin }: Readonly<{ mail: OutboxMail; origin: string }>) {
  const { id, subject, recipient, createdAt, sentAt, lastError, text } = mail;
  return (
    <article aria-labelledby={id} className="border border-rule bg-sheet">
      <div className="border-b border-rule px-5 py-3">
        <h2 id={id} className="break-words">
          {subject}
        </h2>
        <p className="mt-0.5 flex flex-wrap items-baseline gap-x-3 gap-y-1 text-sm text-soft">
          <span className="break-all">to {recipient}</span>
          <When at={createdAt} />
          <Chip>{sentAt ? "sent" : lastError ? "not sent yet" : "kept here only"}</Chip>
        </p>
        {lastError ? <p className="mt-1 text-sm">The last try to send it failed: {lastError}</p> : null}
      </div>
      <div className="px-5 py-4">
        <MailText text={text} origin={origin} />
      </div>
    </article>
  );
}
