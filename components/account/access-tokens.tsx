"use client";

import { useQuery, useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { accessTokenKey, fetchAccessTokens, revokeAccessToken } from "@/lib/client/account";
import type { AccessToken, CreatedAccessToken } from "@/lib/schemas/account";
import { usePerson } from "../providers/session-provider";
import { useToast } from "../providers/toast-provider";
import { Button } from "../ui/button";
import { Chip } from "../ui/chip";
import { ConfirmDialog } from "../ui/confirm-dialog";
import { type Column, DataTable } from "../ui/data-table";
import { ErrorState } from "../ui/error-state";
import { FormProblems } from "../ui/form-problems";
import { LoadingState } from "../ui/loading-state";
import { useSubmit } from "../ui/use-submit";
import { When } from "../ui/when";
import { CreateTokenForm } from "./create-token-form";
import { TokenSecret } from "./token-secret";

const stateOf = ({ revokedAt, expiresAt }: AccessToken) =>
  revokedAt ? "revoked" : Date.parse(expiresAt) <= Date.now() ? "ended" : "works";

/** One's own tokens for the team one works in. */
export function AccessTokens({ team }: Readonly<{ team: string }>) {
  const { resume } = usePerson();
  const cache = useQueryClient();
  const [made, setMade] = useState<CreatedAccessToken | null>(null);
  const refresh = () => cache.invalidateQueries({ queryKey: accessTokenKey });
  const tokens = useQuery({ queryKey: accessTokenKey, queryFn: ({ signal }) => resume(() => fetchAccessTokens(signal)) });

  return (
    <>
      <p className="mb-4 max-w-prose">
        A program calls the API with an access token instead of your password. It works in the team {team} only, with your role
        and never beyond it, and ends when you leave the team.
      </p>
      {made ? <TokenSecret key={made.id} token={made} onStored={() => setMade(null)} /> : null}
      {tokens.isPending ? <LoadingState label="Loading your access tokens" lines={3} /> : null}
      {tokens.isError ? (
        <ErrorState
          title="Your access tokens could not be loaded."
          action={<Button onClick={() => tokens.refetch()}>Try again</Button>}
        >
          {tokens.error.message}
        </ErrorState>
      ) : null}
      {tokens.data?.length === 0 ? <p className="mb-4 text-soft">You have no access token in this team.</p> : null}
      {tokens.data && tokens.data.length > 0 ? <TokenTable tokens={tokens.data} onChanged={refresh} /> : null}
      <h3 className="mt-6 mb-2">A new one</h3>
      <CreateTokenForm
        onCreated={(token) => {
          setMade(token);
          void refresh();
        }}
      />
    </>
  );
}

function TokenTable({ tokens, onChanged }: Readonly<{ tokens: readonly AccessToken[]; onChanged: () => Promise<void> }>) {
  const { resume } = usePerson();
  const toast = useToast();
  const [revoking, setRevoking] = useState<AccessToken | null>(null);
  const { busy, attempt, problems, run } = useSubmit({});
  const revoke = async ({ id, name }: AccessToken) => {
    if (await run(() => resume(() => revokeAccessToken(id)))) toast({ kind: "met", text: `“${name}” is revoked.` });
    setRevoking(null);
    await onChanged();
  };
  return (
    <>
      <FormProblems title="The token was not revoked." {...{ attempt, problems }} />
      <DataTable caption="Your access tokens" columns={tokenColumns(setRevoking)} rows={tokens} rowKey={({ id }) => id} />
      <ConfirmDialog
        open={revoking !== null}
        onClose={() => setRevoking(null)}
        onConfirm={() => revoking && revoke(revoking)}
        busy={busy}
        title={`Revoke “${revoking?.name ?? ""}”?`}
        confirmLabel="Revoke it for good"
      >
        Programs that hold it are refused from their next request on. This cannot be taken back; a new token can be made.
      </ConfirmDialog>
    </>
  );
}

const tokenColumns = (onRevoke: (token: AccessToken) => void): readonly Column<AccessToken>[] => [
  { key: "name", header: "For", cell: ({ name }) => <span className="break-words">{name}</span> },
  { key: "scope", header: "May", cell: ({ scope }) => scope },
  { key: "last", header: "Last used", cell: ({ lastUsedAt }) => (lastUsedAt ? <When at={lastUsedAt} /> : "never") },
  { key: "made", header: "Made", cell: ({ createdAt }) => <When at={createdAt} /> },
  { key: "ends", header: "Ends", cell: ({ expiresAt }) => <When at={expiresAt} /> },
  { key: "state", header: "State", cell: (token) => <Chip>{stateOf(token)}</Chip> },
  {
    key: "act",
    header: <span className="sr-only">Revoke</span>,
    cell: (token) =>
      stateOf(token) === "works" ? (
        <Button size="small" aria-label={`Revoke ${token.name}`} onClick={() => onRevoke(token)}>
          Revoke
        </Button>
      ) : null,
  },
];
