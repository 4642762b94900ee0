import { z } from "zod";
import { personRoute } from "@/lib/api/route";
import { endSessions } from "@/lib/services/account/end-sessions";

const EndSessions = z.strictObject({ which: z.enum(["all", "others"]) });
const Ended = z.strictObject({ ended: z.int() });

export const DELETE = personRoute(
  { summary: "Sign out everywhere, or everywhere else", body: EndSessions, reply: Ended },
  async ({ person, body }) => ({ body: { ended: await endSessions(person, body.which) } }),
);
