"use client";

import { type FormEvent, useState } from "react";
import { createAccessToken } from "@/lib/client/account";
import type { CreatedAccessToken } from "@/lib/schemas/account";
import type { Scope } from "@/lib/schemas/team";
import { usePerson } from "../providers/session-provider";
import { Button } from "../ui/button";
import { FormProblems } from "../ui/form-problems";
import { NumberField } from "../ui/number-field";
import { type Choice, RadioGroup } from "../ui/radio-group";
import { TextField } from "../ui/text-field";
import { useSubmit } from "../ui/use-submit";

const FIELDS = { "/name": "token-name", "/scope": "token-scope", "/expiresInDays": "token-days" };
const SCOPES: readonly Choice<Scope>[] = [
  { value: "read", label: "read", hint: "Reads what you may read, and computes without storing anything." },
  { value: "write", label: "write", hint: "Also saves what your role may save. Never members, tokens or your account." },
];
const USUAL_DAYS = 90;

export function CreateTokenForm({ onCreated }: Readonly<{ onCreated: (token: CreatedAccessToken) => void }>) {
  const { resume } = usePerson();
  const [name, setName] = useState("");
  const [scope, setScope] = useState<Scope>("read");
  const [days, setDays] = useState<number | null>(USUAL_DAYS);
  const [daysRead, setDaysRead] = useState(true);
  const { busy, attempt, problems, at, run } = useSubmit(FIELDS);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const done = await run(async () => {
      // What is no number is sent as none, so that the refusal names the field.
      const expiresInDays = daysRead && days !== null ? days : Number.NaN;
      const token = await resume(() => createAccessToken({ name, scope, expiresInDays }));
      onCreated(token);
    });
    if (done) setName("");
  }

  return (
    <form method="post" onSubmit={submit} noValidate className="flex max-w-md flex-col gap-4">
      <FormProblems title="No token was made." {...{ attempt, problems }} />
      <TextField
        id={FIELDS["/name"]}
        label="What it is for"
        value={name}
        onChange={({ target }) => setName(target.value)}
        autoComplete="off"
        problem={at("/name")}
        hint="For example the program or the machine that will hold it."
      />
      <RadioGroup
        id={FIELDS["/scope"]}
        legend="What it may do"
        choices={SCOPES}
        value={scope}
        onChange={setScope}
        problem={at("/scope")}
      />
      <NumberField
        id={FIELDS["/expiresInDays"]}
        label="Ends after"
        unit="days"
        value={days}
        onChange={setDays}
        onUsable={setDaysRead}
        problem={at("/expiresInDays")}
        hint="From 1 to 365. Make a new one before it ends."
        className="max-w-48"
      />
      <div>
        <Button type="submit" busy={busy}>
          {busy ? "Making it…" : "Make an access token"}
        </Button>
      </div>
    </form>
  );
}
