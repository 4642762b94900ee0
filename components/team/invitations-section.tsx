"use client";

import { useQuery, useQueryClient } from "@tanstack/react-query";
import Link from "next/link";
import { useState } from "react";
import { fetchInvitations, teamKeys, withdrawInvitation } from "@/lib/client/account";
import type { Invitation } from "@/lib/schemas/team";
import { useSession } from "../providers/session-provider";
import { useToast } from "../providers/toast-provider";
import { Button } from "../ui/button";
import { ConfirmDialog } from "../ui/confirm-dialog";
import { type Column, DataTable } from "../ui/data-table";
import { ErrorState } from "../ui/error-state";
import { FormProblems } from "../ui/form-problems";
import { LoadingState } from "../ui/loading-state";
import { useSubmit } from "../ui/use-submit";
import { When } from "../ui/when";
import { InviteForm } from "./invite-form";

/** For leads: who was asked to join and has not yet. */
export function InvitationsSection({ showsOutbox }: Readonly<{ showsOutbox: boolean }>) {
  const { resume } = useSession();
  const toast = useToast();
  const cache = useQueryClient();
  const [withdrawing, setWithdrawing] = useState<Invitation | null>(null);
  const { busy, attempt, problems, run } = useSubmit({});
  const refresh = () => cache.invalidateQueries({ queryKey: ["team"] });
  const open = useQuery({ queryKey: teamKeys.invitations, queryFn: ({ signal }) => resume(() => fetchInvitations(signal)) });
  const withdraw = async ({ id, email }: Invitation) => {
    const done = await run(() => resume(() => withdrawInvitation(id)));
    setWithdrawing(null);
    if (done) toast({ kind: "met", text: `The invitation to ${email} is withdrawn.` });
    await refresh();
  };

  return (
    <>
      <InviteForm onInvited={refresh} />
      {showsOutbox ? (
        <p className="no-print mt-2 text-sm text-soft">
          In this demonstration the mail can be read in the <Link href="/outbox">outbox</Link>.
        </p>
      ) : null}
      <div className="mt-5">
        <FormProblems title="The invitation was not withdrawn." {...{ attempt, problems }} />
        {open.isPending ? <LoadingState label="Loading the invitations" lines={2} /> : null}
        {open.isError ? (
          <ErrorState
            title="The invitations could not be loaded."
            action={<Button onClick={() => open.refetch()}>Try again</Button>}
          >
            {open.error.message}
          </ErrorState>
        ) : null}
        {open.data?.length === 0 ? <p className="text-soft">No invitation is open.</p> : null}
        {open.data && open.data.length > 0 ? (
          <DataTable
            caption="Open invitations"
            columns={invitationColumns(setWithdrawing)}
            rows={open.data}
            rowKey={({ id }) => id}
          />
        ) : null}
      </div>
      <ConfirmDialog
        open={withdrawing !== null}
        onClose={() => setWithdrawing(null)}
        onConfirm={() => withdrawing && withdraw(withdrawing)}
        busy={busy}
        title={`Withdraw the invitation to ${withdrawing?.email ?? ""}?`}
        confirmLabel="Withdraw it"
      >
        The link in the mail stops working at once. You can invite the same address again.
      </ConfirmDialog>
    </>
  );
}

const invitationColumns = (onWithdraw: (invitation: Invitation) => void): readonly Column<Invitation>[] => [
  { key: "email", header: "E-mail address", cell: ({ email }) => <span className="break-all">{email}</span> },
  { key: "role", header: "As", cell: ({ role }) => role },
  { key: "by", header: "Invited by", cell: ({ invitedBy }) => invitedBy },
  { key: "sent", header: "Sent", cell: ({ createdAt }) => <When at={createdAt} /> },
  { key: "ends", header: "Link ends", cell: ({ expiresAt }) => <When at={expiresAt} /> },
  {
    key: "act",
    header: <span className="sr-only">Withdraw</span>,
    cell: (invitation) => (
      <Button
        size="small"
        className="no-print"
        aria-label={`Withdraw the invitation to ${invitation.email}`}
        onClick={() => onWithdraw(invitation)}
      >
        Withdraw
      </Button>
    ),
  },
];
