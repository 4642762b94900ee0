"use client";

import { startTeam } from "@/lib/client/account";
import { usePerson } from "../providers/session-provider";
import { TextField } from "../ui/text-field";
import { useSubmit } from "../ui/use-submit";
import { AccountForm } from "./account-form";

const FIELDS = { "/name": "new-team-name" };

export function StartTeamForm() {
  const { resume } = usePerson();
  const submit = useSubmit(FIELDS);

  async function start(typed: (name: string) => string) {
    // A full load: every part of the page belongs to the new team from here on.
    if (await submit.run(() => resume(() => startTeam(typed("name"))))) window.location.assign("/plants");
  }

  return (
    <AccountForm
      submit={submit}
      refused="The team was not started."
      label="Start a team"
      busyLabel="Starting the team…"
      onSend={start}
    >
      <TextField
        id={FIELDS["/name"]}
        name="name"
        label="Name of the new team"
        autoComplete="organization"
        problem={submit.at("/name")}
        hint="You become its lead. Plants and designs stay in the team they were made in."
      />
    </AccountForm>
  );
}
