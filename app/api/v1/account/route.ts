import { personRoute } from "@/lib/api/route";
import { ChangeName, Profile } from "@/lib/schemas/account";
import { changeName, readProfile } from "@/lib/services/account/read-profile";

export const GET = personRoute({ summary: "Read one's own account and teams", reply: Profile }, async ({ person, team }) => ({
  body: await readProfile(person, team),
}));

export const PATCH = personRoute(
  { summary: "Change one's own name", body: ChangeName, reply: Profile },
  async ({ person, team, body }) => ({
    body: await changeName(person, team, body),
  }),
);
