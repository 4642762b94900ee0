"use client";

import { useState } from "react";
import { createAccessToken } from "@/lib/client/account";
import type { CreatedAccessToken } from "@/lib/schemas/account";
import type { Scope } from "@/lib/schemas/team";
import { usePerson } from "../providers/session-provider";
import { NumberField } from "../ui/number-field";
import { type Choice, RadioGroup } from "../ui/radio-group";
import { TextField } from "../ui/text-field";
import { useSubmit } from "../ui/use-submit";
import { AccountForm } from "./account-form";

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
  const submit = useSubmit(FIELDS);

  async function make() {
    const done = await submit.run(async () => {
      // What is no number is sent as none, so that the refusal names the field.
      const expiresInDays = daysRead && days !== null ? days : Number.NaN;
      const token = await resume(() => createAccessToken({ name, scope, expiresInDays }));
      onCreated(token);
    });
    if (done) setName("");
  }

  return (
    <AccountForm
      submit={submit}
      refused="No token was made."
      label="Make an access token"
      busyLabel="Making it…"
      className="max-w-md"
      onSend={make}
    >
      <TextField
        id={FIELDS["/name"]}
        label="What it is for"
        value={name}
        onChange={({ target }) => setName(target.value)}
        autoComplete="off"
        problem={submit.at("/name")}
        hint="For example the program or the machine that will hold it."
      />
      <RadioGroup
        id={FIELDS["/scope"]}
        legend="What it may do"
        choices={SCOPES}
        value={scope}
        onChange={setScope}
        problem={submit.at("/scope")}
      />
      <NumberField
        id={FIELDS["/expiresInDays"]}
        label="Ends after"
        unit="days"
        value={days}
        onChange={setDays}
        onUsable={setDaysRead}
        problem={submit.at("/expiresInDays")}
        hint="From 1 to 365. Make a new one before it ends."
        className="max-w-48"
      />
    </AccountForm>
  );
}
