"use client";

import { useRouter } from "next/navigation";
import type { FormEvent } from "react";
import { changeName } from "@/lib/client/account";
import { usePerson } from "../providers/session-provider";
import { useToast } from "../providers/toast-provider";
import { Button } from "../ui/button";
import { FormProblems } from "../ui/form-problems";
import { TextField } from "../ui/text-field";
import { useSubmit } from "../ui/use-submit";

const FIELDS = { "/name": "account-name" };

export function NameForm({ name, email }: Readonly<{ name: string; email: string }>) {
  const { resume } = usePerson();
  const toast = useToast();
  const router = useRouter();
  const { busy, attempt, problems, at, run } = useSubmit(FIELDS);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const wanted = String(new FormData(event.currentTarget).get("name"));
    if (!(await run(() => resume(() => changeName(wanted))))) return;
    toast({ kind: "met", text: `Your name is ${wanted.trim()} now.` });
    router.refresh();
  }

  return (
    <form method="post" onSubmit={submit} noValidate className="flex max-w-md flex-col gap-4">
      <FormProblems title="Your name was not changed." {...{ attempt, problems }} />
      <TextField
        id={FIELDS["/name"]}
        name="name"
        label="Name"
        autoComplete="name"
        defaultValue={name}
        problem={at("/name")}
        hint="Stands beside what you save, in every team."
      />
      <TextField label="E-mail address" type="email" value={email} readOnly hint="You sign in with it; it stays as it is." />
      <div>
        <Button type="submit" busy={busy}>
          {busy ? "Saving…" : "Save the name"}
        </Button>
      </div>
    </form>
  );
}
