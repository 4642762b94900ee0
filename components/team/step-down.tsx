"use client";

import type { Role } from "@/lib/schemas/team";
import { ConfirmDialog } from "../ui/confirm-dialog";
import { asRole } from "./role-words";

type StepDownProps = Readonly<{
  /** What the lead would become; null while nothing is asked. */
  role: Role | null;
  busy: boolean;
  onClose: () => void;
  onConfirm: (role: Role) => void;
}>;

/** A lead who lowers the own role cannot take it back alone. */
export function StepDown({ role, busy, onClose, onConfirm }: StepDownProps) {
  return (
    <ConfirmDialog
      open={role !== null}
      onClose={onClose}
      onConfirm={() => role && onConfirm(role)}
      busy={busy}
      title={role ? `Become ${asRole(role)} yourself?` : ""}
      keepLabel="Stay lead"
      confirmLabel="Step down"
    >
      You can then no longer manage members or publish templates. Only another lead can make you one again.
    </ConfirmDialog>
  );
}
