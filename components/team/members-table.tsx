"use client";

import type { Member, Role } from "@/lib/schemas/team";
import { Button } from "../ui/button";
import { Chip } from "../ui/chip";
import { type Column, DataTable } from "../ui/data-table";
import { Select } from "../ui/select";
import { When } from "../ui/when";
import { ROLE_OPTIONS, roleOf } from "./role-words";

type MembersTableProps = Readonly<{
  members: readonly Member[];
  userId: string;
  mayManage: boolean;
  busy: boolean;
  onRole: (member: Member, role: Role) => void;
  onRemove: (member: Member) => void;
}>;

export function MembersTable({ members, userId, mayManage, busy, onRole, onRemove }: MembersTableProps) {
  const leads = members.filter(({ role }) => role === "lead").length;
  const onlyLead = ({ role }: Member) => role === "lead" && leads === 1;
  const columns: readonly Column<Member>[] = [
    {
      key: "name",
      header: "Member",
      sortBy: ({ name }) => name,
      cell: (member) => (
        <span className="inline-flex flex-wrap items-baseline gap-x-2 font-semibold break-words">
          {member.name}
          {member.userId === userId ? <Chip>you</Chip> : null}
        </span>
      ),
    },
    ...(mayManage
      ? [{ key: "email", header: "E-mail address", cell: ({ email }: Member) => <span className="break-all">{email}</span> }]
      : []),
    {
      key: "role",
      header: "Role",
      sortBy: ({ role }) => role,
      cell: (member) =>
        mayManage ? (
          <Select
            label={`Role of ${member.name}`}
            hideLabel
            options={ROLE_OPTIONS}
            value={member.role}
            disabled={busy || onlyLead(member)}
            hint={onlyLead(member) ? "the only lead: make somebody else one first" : undefined}
            onChange={({ target }) => onRole(member, roleOf(target.value))}
            className="w-36"
          />
        ) : (
          member.role
        ),
    },
    { key: "joined", header: "Since", sortBy: ({ joinedAt }) => joinedAt, cell: ({ joinedAt }) => <When at={joinedAt} /> },
    {
      key: "act",
      header: <span className="sr-only">Remove or leave</span>,
      cell: (member) => {
        const own = member.userId === userId;
        if (onlyLead(member) || !(own || mayManage)) return null;
        return (
          <Button
            size="small"
            className="no-print"
            aria-label={own ? "Leave the team" : `Remove ${member.name}`}
            onClick={() => onRemove(member)}
          >
            {own ? "Leave" : "Remove"}
          </Button>
        );
      },
    },
  ];
  return <DataTable caption="Members of the team" columns={columns} rows={members} rowKey={(member) => member.userId} />;
}
