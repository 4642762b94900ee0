import type { Metadata } from "next";
import { apiDescription } from "@/app/api/v1/openapi.json/description";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { SheetSection } from "@/components/ui/sheet-section";
import { type ReadableOperation, readable } from "@/lib/api/readable-description";
import { env } from "@/lib/env";
import { HowToCall } from "./how-to-call";
import { Operation } from "./operation";
import { SchemaFields } from "./schema-fields";

export const metadata: Metadata = { title: "API" };

/** The API for a reader, made from the document that programs read, so that the two cannot differ. */
export default async function ApiPage() {
  const { groups, schemas } = readable(await apiDescription());
  const { origin } = new URL(env().NEXTAUTH_URL);
  return (
    <PageBody>
      <PageHeading
        title="API"
        crumbs={[{ label: "Problems", href: "/docs/problems" }]}
        actions={<a href="/api/v1/openapi.json">OpenAPI 3.1 document</a>}
      />
      <HowToCall />
      <Contents groups={groups} />
      {groups.map(({ name, operations }) => (
        <SheetSection key={name} title={<span className="first-letter:uppercase inline-block">{name}</span>} ruled>
          {operations.map((operation) => (
            <Operation key={operation.id} origin={origin} operation={operation} />
          ))}
        </SheetSection>
      ))}
      <SheetSection title="Shapes" note="Fields marked * are always there; unknown fields are refused." ruled>
        {schemas.map((schema) => (
          <SchemaFields key={schema.name} schema={schema} />
        ))}
      </SheetSection>
    </PageBody>
  );
}

type Groups = Readonly<{ groups: readonly { readonly name: string; readonly operations: readonly ReadableOperation[] }[] }>;

function Contents({ groups }: Groups) {
  return (
    <nav aria-label="Routes" className="mb-8 columns-[22rem] gap-8 text-table">
      {groups.map(({ name, operations }) => (
        <ul key={name} aria-label={name} className="mb-3 break-inside-avoid">
          {operations.map(({ id, summary }) => (
            <li key={id}>
              <a href={`#${id}`} className="inline-block py-1">
                {summary}
              </a>
            </li>
          ))}
        </ul>
      ))}
    </nav>
  );
}
