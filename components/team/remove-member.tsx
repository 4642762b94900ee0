"use client";

import type { Member } from "@/lib/schemas/team";
import { ConfirmDialog } from "../ui/confirm-dialog";

type RemoveMemberProps = Readonly<{
  team: string;
  removing: Member | null;
  userId: string;
  busy: boolean;
  onClose: () => void;
  onConfirm: (member: Member) => void;
}>;

/** Asks by name: tokens that end here cannot be brought back. */
export function RemoveMember({ team, removing, userId, busy, onClose, onConfirm }: RemoveMemberProps) {
  const own = removing?.userId === userId;
  return (
    <ConfirmDialog
      open={removing !== null}
      onClose={onClose}
      onConfirm={() => removing && onConfirm(removing)}
      busy={busy}
      title={own ? `Leave ${team}?` : `Remove ${removing?.name ?? ""}?`}
      typedName={own ? team : removing?.name}
      keepLabel={own ? "Stay" : "Keep them"}
      confirmLabel={own ? "Leave the team" : "Remove from the team"}
    >
      {own
        ? "You can no longer open anything of this team, and your access tokens for it end for good. What you made stays, with your name. A lead can invite you again."
        : "Their sessions in this team end at once and their access tokens for good. What they made stays, with their name. You can invite them again."}
    </ConfirmDialog>
  );
}
