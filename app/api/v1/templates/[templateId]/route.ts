import { route } from "@/lib/api/route";

import { TemplateAddress } from "@/lib/schemas/addresses";
import { Template } from "@/lib/schemas/template";
import { readTemplate } from "@/lib/services/templates/read";

export const GET = route(
  { summary: "Read a template", params: TemplateAddress, reply: Template, right: "template:read" },
  async ({ ctx, params }) => {
    const template = await readTemplate(ctx, params.templateId);
    return { body: template, version: template.version };
  },
);
