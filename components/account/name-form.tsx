"use client";

import { useRouter } from "next/navigation";
import { changeName } from "@/lib/client/account";
import { usePerson } from "../providers/session-provider";
import { useToast } from "../providers/toast-provider";
import { TextField } from "../ui/text-field";
import { useSubmit } from "../ui/use-submit";
import { AccountForm } from "./account-form";
import { EmailField } from "./email-field";

const FIELDS = { "/name": "account-name" };

export function NameForm({ name, email }: Readonly<{ name: string; email: string }>) {
  const { resume } = usePerson();
  const toast = useToast();
  const router = useRouter();
  const submit = useSubmit(FIELDS);

  async function change(typed: (name: string) => string) {
    const wanted = typed("name");
    if (!(await submit.run(() => resume(() => changeName(wanted))))) return;
    toast({ kind: "met", text: `Your name is ${wanted.trim()} now.` });
    router.refresh();
  }

  return (
    <AccountForm
      submit={submit}
      refused="Your name was not changed."
      label="Save the name"
      busyLabel="Saving…"
      className="max-w-md"
      onSend={change}
    >
      <TextField
        id={FIELDS["/name"]}
        name="name"
        label="Name"
        autoComplete="name"
        defaultValue={name}
        problem={submit.at("/name")}
        hint="Stands beside what you save, in every team."
      />
      <EmailField settled={email} hint="You sign in with it; it stays as it is." />
    </AccountForm>
  );
}
