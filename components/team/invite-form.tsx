"use client";

import { type FormEvent, useState } from "react";
import { invite } from "@/lib/client/account";
import type { Role } from "@/lib/schemas/team";
import { useSession } from "../providers/session-provider";
import { useToast } from "../providers/toast-provider";
import { Button } from "../ui/button";
import { FormProblems } from "../ui/form-problems";
import { Select } from "../ui/select";
import { TextField } from "../ui/text-field";
import { useSubmit } from "../ui/use-submit";
import { ROLE_OPTIONS, ROLES, roleOf } from "./role-words";

const FIELDS = { "/email": "invite-email", "/role": "invite-role" };

export function InviteForm({ onInvited }: Readonly<{ onInvited: () => Promise<void> }>) {
  const { resume } = useSession();
  const toast = useToast();
  const [email, setEmail] = useState("");
  const [role, setRole] = useState<Role>("engineer");
  const { busy, attempt, problems, at, run } = useSubmit(FIELDS);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    if (!(await run(() => resume(() => invite({ email, role }))))) return;
    toast({ kind: "met", text: `A mail with the link is on its way to ${email.trim()}.` });
    setEmail("");
    await onInvited();
  }

  return (
    <form method="post" onSubmit={submit} noValidate className="no-print max-w-3xl">
      <FormProblems title="Nobody was invited." {...{ attempt, problems }} />
      <div className="flex flex-wrap items-start gap-4">
        <TextField
          id={FIELDS["/email"]}
          type="email"
          label="E-mail address"
          autoComplete="off"
          value={email}
          onChange={({ target }) => setEmail(target.value)}
          problem={at("/email")}
          className="min-w-64 flex-1"
        />
        <Select
          id={FIELDS["/role"]}
          label="Role"
          options={ROLE_OPTIONS}
          value={role}
          onChange={({ target }) => setRole(roleOf(target.value))}
          hint={ROLES.find((entry) => entry.role === role)?.may}
          problem={at("/role")}
          className="w-80 max-w-full"
        />
        <Button type="submit" busy={busy} className="mt-6">
          {busy ? "Inviting…" : "Invite"}
        </Button>
      </div>
    </form>
  );
}
