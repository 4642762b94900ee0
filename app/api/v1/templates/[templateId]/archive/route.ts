import { route } from "@/lib/api/route";

import { TemplateAddress } from "@/lib/schemas/addresses";
import { ArchiveTemplate, Template } from "@/lib/schemas/template";
import { archiveTemplate } from "@/lib/services/templates/archive";

export const POST = route(
  {
    summary: "Archive a template, or bring it back",
    params: TemplateAddress,
    body: ArchiveTemplate,
    reply: Template,
    right: "template:publish",
    ifMatch: true,
  },
  async ({ ctx, params, body, version }) => {
    const template = await archiveTemplate(ctx, params.templateId, version, body.archived);
    return { body: template, version: template.version };
  },
);
