import { route } from "@/lib/api/route";

import { page } from "@/lib/schemas/common";
import { DesignQuery } from "@/lib/schemas/design";
import { CreateTemplate, Template, TemplateSummary } from "@/lib/schemas/template";
import { listTemplates } from "@/lib/services/templates/list";
import { publishTemplate } from "@/lib/services/templates/publish";

export const GET = route(
  { summary: "List the team's templates", query: DesignQuery, reply: page(TemplateSummary), right: "template:read" },
  async ({ ctx, query }) => ({ body: await listTemplates(ctx, query) }),
);

export const POST = route(
  {
    summary: "Publish a plant with open parameters and a recipe as a template",
    body: CreateTemplate,
    reply: Template,
    right: "template:publish",
    idempotent: true,
    cost: "solve",
    status: 201,
  },
  async ({ ctx, body, signal }) => {
    const template = await publishTemplate(ctx, body, signal);
    return { body: template, version: template.version, location: `/api/v1/templates/${template.id}` };
  },
);
