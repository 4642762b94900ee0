import { route } from "@/lib/api/route";

import { TemplateAddress } from "@/lib/schemas/addresses";
import { StartedFromTemplate, StartFromTemplate } from "@/lib/schemas/template";
import { startFromTemplate } from "@/lib/services/templates/start";

export const POST = route(
  {
    summary: "Make a plant and its first design from a template",
    params: TemplateAddress,
    body: StartFromTemplate,
    reply: StartedFromTemplate,
    right: "template:use",
    idempotent: true,
    cost: "solve",
    status: 201,
  },
  async ({ ctx, params, body, signal }) => {
    const started = await startFromTemplate(ctx, params.templateId, body, signal);
    return { body: started, location: `/api/v1/designs/${started.designId}` };
  },
);
