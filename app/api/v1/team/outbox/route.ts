import { z } from "zod";
import { route } from "@/lib/api/route";
import { OutboxMail } from "@/lib/schemas/team";
import { listOutbox } from "@/lib/services/team/list-outbox";

export const GET = route(
  { summary: "Read the mails of the demonstration", reply: z.strictObject({ items: z.array(OutboxMail) }), right: "outbox:read" },
  async ({ ctx }) => ({ body: { items: await listOutbox(ctx) } }),
);
