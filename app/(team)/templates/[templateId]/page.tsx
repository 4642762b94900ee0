import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { cache } from "react";
import { RecipeReading } from "@/components/designs/recipe/recipe-reading";
import { CriteriaList } from "@/components/plants/criteria/criteria-list";
import { ArchiveTemplate } from "@/components/templates/archive-template";
import { StartFromTemplate } from "@/components/templates/start-from-template";
import { TemplatePlant } from "@/components/templates/template-plant";
import { Chip } from "@/components/ui/chip";
import { Notice } from "@/components/ui/notice";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { SheetSection } from "@/components/ui/sheet-section";
import { pageContext } from "@/lib/auth/session";
import { NotFound } from "@/lib/errors";
import { isAllowed } from "@/lib/permissions/allow";
import { TemplateAddress } from "@/lib/schemas/addresses";
import { readTemplate } from "@/lib/services/templates/read";
import { suggestedModel } from "@/lib/services/templates/suggested-model";

type PageProps = Readonly<{ params: Promise<{ templateId: string }> }>;

/** Another team's template is answered like one that does not exist. */
const load = cache(async (templateId: string) => {
  const ctx = await pageContext(`/templates/${templateId}`);
  if (!TemplateAddress.safeParse({ templateId }).success) notFound();
  try {
    return { ctx, template: await readTemplate(ctx, templateId) };
  } catch (error) {
    if (error instanceof NotFound) notFound();
    throw error;
  }
});

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  return { title: (await load((await params).templateId)).template.name };
}

export default async function Page({ params }: PageProps) {
  const { ctx, template } = await load((await params).templateId);
  const model = await suggestedModel(ctx, template);
  const { id, name, description, version, archivedAt, content } = template;
  const mayStart = isAllowed(ctx, "template:use") && archivedAt === null;
  return (
    <PageBody>
      <PageHeading
        title={name}
        crumbs={[{ label: "Templates", href: "/templates" }]}
        state={archivedAt ? <Chip>archived</Chip> : null}
        actions={
          isAllowed(ctx, "template:publish") ? (
            <ArchiveTemplate templateId={id} name={name} version={version} archived={archivedAt !== null} />
          ) : null
        }
      />
      {description ? <p className="mb-6 max-w-prose break-words whitespace-pre-line">{description}</p> : null}
      <div className="grid gap-x-16 lg:grid-cols-[minmax(20rem,30rem)_minmax(0,1fr)]">
        <SheetSection title="Start from it" note={mayStart ? "fill in the machine's own parameters" : undefined}>
          {mayStart ? (
            <StartFromTemplate templateId={id} parameters={content.openParameters} />
          ) : (
            <NotToStart archived={archivedAt !== null} />
          )}
        </SheetSection>
        <div className="min-w-0">
          <SheetSection title="The plant">
            <TemplatePlant model={model} source={content.plant.source} />
          </SheetSection>
          {content.criteria?.length ? (
            <SheetSection title="Acceptance criteria" note="what designs of the plant are held against">
              <CriteriaList label="Acceptance criteria" criteria={content.criteria} />
            </SheetSection>
          ) : null}
          <SheetSection title="The recipe" note="how the first design is made, and why">
            <div className="max-w-xl">
              <RecipeReading recipe={content.recipe} model={model} />
            </div>
          </SheetSection>
        </div>
      </div>
    </PageBody>
  );
}

function NotToStart({ archived }: Readonly<{ archived: boolean }>) {
  if (!archived) return <p className="text-soft">A lead or an engineer of the team starts plants and designs from it.</p>;
  return (
    <Notice kind="caution" title="This template is out of use.">
      Plants and designs made from it stay as they are. Ask a lead which template follows it.
    </Notice>
  );
}
