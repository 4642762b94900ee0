"use client";

import { switchTeam } from "@/lib/client/account";
import type { Profile } from "@/lib/schemas/account";
import { usePerson } from "../providers/session-provider";
import { Button } from "../ui/button";
import { Chip } from "../ui/chip";
import { type Column, DataTable } from "../ui/data-table";
import { FormProblems } from "../ui/form-problems";
import { useSubmit } from "../ui/use-submit";

type OwnTeam = Profile["teams"][number];

export function OwnTeams({ teams, currentTeamId }: Pick<Profile, "teams" | "currentTeamId">) {
  const { resume } = usePerson();
  const { busy, attempt, problems, run } = useSubmit({});
  const work = async (teamId: string) => {
    // A full load: every part of the page belongs to the other team from here on.
    if (await run(() => resume(() => switchTeam(teamId)))) window.location.assign("/plants");
  };
  const columns: readonly Column<OwnTeam>[] = [
    { key: "name", header: "Team", cell: ({ name }) => <span className="font-semibold">{name}</span> },
    { key: "role", header: "Your role", cell: ({ role }) => role },
    {
      key: "act",
      header: <span className="sr-only">Work in it</span>,
      cell: ({ id, name }) =>
        id === currentTeamId ? (
          <Chip>you work here now</Chip>
        ) : (
          <Button size="small" busy={busy} aria-label={`Work in this team: ${name}`} onClick={() => work(id)}>
            Work in this team
          </Button>
        ),
    },
  ];
  return (
    <>
      <FormProblems title="You are still in the team you were in." {...{ attempt, problems }} />
      <DataTable caption="Teams you belong to" columns={columns} rows={teams} rowKey={({ id }) => id} />
    </>
  );
}
