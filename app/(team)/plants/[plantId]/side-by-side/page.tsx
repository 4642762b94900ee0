import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { DesignPicker } from "@/components/side-by-side/design-picker";
import { SideBySide } from "@/components/side-by-side/side-by-side";
import { PageBody } from "@/components/ui/page-body";
import { pageContext } from "@/lib/auth/session";
import { NotFound } from "@/lib/errors";
import { DesignRevisionAddress, PlantAddress } from "@/lib/schemas/addresses";
import type { Context } from "@/lib/services/context";
import { readDesignRevision } from "@/lib/services/designs/read-revision";
import { readPlant } from "@/lib/services/plants/read";

export const metadata: Metadata = { title: "Side by side" };

const MOST = 6;

type PageProps = Readonly<{
  params: Promise<{ plantId: string }>;
  searchParams: Promise<Readonly<Record<string, string | string[] | undefined>>>;
}>;

/** The ids of an address, each once. Anything else in it is answered like a design that does not exist. */
function idsIn(asked: string | string[] | undefined): string[] {
  const ids = [...new Set([asked ?? []].flat().flatMap((text) => text.split(",").filter(Boolean)))];
  if (ids.some((revisionId) => !DesignRevisionAddress.safeParse({ revisionId }).success)) notFound();
  return ids;
}

/** Another team's plant or design, and a design of another plant, is answered like one that does not exist. */
async function load(ctx: Context, plantId: string, ids: readonly string[]) {
  if (!PlantAddress.safeParse({ plantId }).success) notFound();
  try {
    const { name } = await readPlant(ctx, plantId);
    const designs = await Promise.all(ids.slice(0, MOST).map((id) => readDesignRevision(ctx, id)));
    if (designs.some((design) => design.plantId !== plantId)) notFound();
    return { plant: { id: plantId, name }, designs };
  } catch (error) {
    if (error instanceof NotFound) notFound();
    throw error;
  }
}

export default async function Page({ params, searchParams }: PageProps) {
  const [{ plantId }, query] = [await params, await searchParams];
  const asked = [query.designs ?? []].flat().join(",");
  const ctx = await pageContext(`/plants/${plantId}/side-by-side${asked ? `?designs=${encodeURIComponent(asked)}` : ""}`);
  const ids = idsIn(asked);
  const { plant, designs } = await load(ctx, plantId, ids);
  const enough = ids.length >= 2 && ids.length <= MOST;
  return (
    <PageBody>
      {enough ? (
        <SideBySide key={ids.join(" ")} plant={plant} designs={designs} />
      ) : (
        <DesignPicker plant={plant} chosen={ids.slice(0, MOST)} tooMany={ids.length > MOST} />
      )}
    </PageBody>
  );
}
