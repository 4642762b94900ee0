"use client";

import type { FormEvent } from "react";
import { startTeam } from "@/lib/client/account";
import { usePerson } from "../providers/session-provider";
import { Button } from "../ui/button";
import { FormProblems } from "../ui/form-problems";
import { TextField } from "../ui/text-field";
import { useSubmit } from "../ui/use-submit";

const FIELDS = { "/name": "new-team-name" };

export function StartTeamForm() {
  const { resume } = usePerson();
  const { busy, attempt, problems, at, run } = useSubmit(FIELDS);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const name = String(new FormData(event.currentTarget).get("name"));
    // A full load: every part of the page belongs to the new team from here on.
    if (await run(() => resume(() => startTeam(name)))) window.location.assign("/plants");
  }

  return (
    <form method="post" onSubmit={submit} noValidate className="flex flex-col gap-3">
      <FormProblems title="The team was not started." {...{ attempt, problems }} />
      <TextField
        id={FIELDS["/name"]}
        name="name"
        label="Name of the new team"
        autoComplete="organization"
        problem={at("/name")}
        hint="You become its lead. Plants and designs stay in the team they were made in."
      />
      <div>
        <Button type="submit" busy={busy}>
          {busy ? "Starting the team…" : "Start a team"}
        </Button>
      </div>
    </form>
  );
}
