"use client";

import { type ReactNode, useState } from "react";
import { Button } from "./button";
import { Dialog } from "./dialog";
import { TextField } from "./text-field";

type ConfirmDialogProps = Readonly<{
  open: boolean;
  onClose: () => void;
  onConfirm: () => void;
  title: string;
  /** What happens, to what, and whether it can be taken back. */
  children: ReactNode;
  confirmLabel: string;
  /** What is chosen by leaving it: "Keep it". */
  keepLabel?: string;
  /** For what cannot be taken back: the name has to be typed. */
  typedName?: string;
  busy?: boolean;
}>;

export function ConfirmDialog({
  open,
  onClose,
  onConfirm,
  title,
  children,
  confirmLabel,
  keepLabel = "Keep it",
  typedName,
  busy,
}: ConfirmDialogProps) {
  const [typed, setTyped] = useState("");
  const close = () => {
    setTyped("");
    onClose();
  };
  return (
    <Dialog
      open={open}
      onClose={close}
      title={title}
      actions={
        <>
          <Button onClick={close}>{keepLabel}</Button>
          <Button tone="grave" busy={busy} disabled={typedName !== undefined && typed.trim() !== typedName} onClick={onConfirm}>
            {confirmLabel}
          </Button>
        </>
      }
    >
      {children}
      {typedName === undefined ? null : (
        <TextField
          className="mt-4"
          label={`Type “${typedName}” to confirm`}
          value={typed}
          autoComplete="off"
          onChange={({ target }) => setTyped(target.value)}
        />
      )}
    </Dialog>
  );
}
