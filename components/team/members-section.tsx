"use client";

import { useQuery, useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { changeRole, fetchMembers, removeMember, teamKeys } from "@/lib/client/account";
import type { Member, Role } from "@/lib/schemas/team";
import { useSession } from "../providers/session-provider";
import { useToast } from "../providers/toast-provider";
import { Button } from "../ui/button";
import { ErrorState } from "../ui/error-state";
import { FormProblems } from "../ui/form-problems";
import { LoadingState } from "../ui/loading-state";
import { useSubmit } from "../ui/use-submit";
import { MembersTable } from "./members-table";
import { RemoveMember } from "./remove-member";
import { asRole } from "./role-words";
import { StepDown } from "./step-down";

type MembersSectionProps = Readonly<{ team: string; mayManage: boolean }>;

/** Everybody in the team. Leads change roles and remove; anybody leaves. */
export function MembersSection({ team, mayManage }: MembersSectionProps) {
  const { resume, userId } = useSession();
  const toast = useToast();
  const cache = useQueryClient();
  const [removing, setRemoving] = useState<Member | null>(null);
  const [steppingDown, setSteppingDown] = useState<Role | null>(null);
  const { busy, attempt, problems, run } = useSubmit({});
  const members = useQuery({ queryKey: teamKeys.members, queryFn: ({ signal }) => resume(() => fetchMembers(signal)) });

  const give = async (member: Member, role: Role, undo: boolean) => {
    const done = await run(() => resume(() => changeRole(member.userId, role)));
    await cache.invalidateQueries({ queryKey: ["team"] });
    if (!done) return;
    // What this page offers follows from one's own role, so it is made anew.
    if (member.userId === userId) return window.location.reload();
    toast({
      kind: "met",
      text: `${member.name} is ${asRole(role)} now.`,
      ...(undo && { action: { label: "Undo", run: () => void give(member, member.role, false) } }),
    });
  };
  const remove = async (member: Member) => {
    const done = await run(() => resume(() => removeMember(member.userId)));
    setRemoving(null);
    if (done && member.userId === userId) return window.location.assign("/account");
    await cache.invalidateQueries({ queryKey: ["team"] });
    if (done) toast({ kind: "met", text: `${member.name} is no longer in the team.` });
  };

  if (members.isPending) return <LoadingState label="Loading the members" lines={3} />;
  if (members.isError) {
    return (
      <ErrorState title="The members could not be loaded." action={<Button onClick={() => members.refetch()}>Try again</Button>}>
        {members.error.message}
      </ErrorState>
    );
  }
  const own = members.data.find((member) => member.userId === userId);
  return (
    <>
      <FormProblems title="Nothing was changed." {...{ attempt, problems }} />
      <MembersTable
        members={members.data}
        {...{ userId, mayManage, busy }}
        onRole={(member, role) => (member.userId === userId ? setSteppingDown(role) : give(member, role, true))}
        onRemove={setRemoving}
      />
      <RemoveMember {...{ team, busy, removing, userId }} onClose={() => setRemoving(null)} onConfirm={remove} />
      <StepDown
        role={steppingDown}
        busy={busy}
        onClose={() => setSteppingDown(null)}
        onConfirm={async (role) => {
          if (own) await give(own, role, false);
          setSteppingDown(null);
        }}
      />
    </>
  );
}
