import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { cache } from "react";
import type { BenchStart } from "@/components/designs/bench/bench-types";
import { DesignBench } from "@/components/designs/bench/design-bench";
import { PageBody } from "@/components/ui/page-body";
import { pageContext } from "@/lib/auth/session";
import { NotFound } from "@/lib/errors";
import { DesignAddress, DesignRevisionAddress, PlantAddress } from "@/lib/schemas/addresses";
import { readDesign } from "@/lib/services/designs/read";
import { readDesignRevision } from "@/lib/services/designs/read-revision";
import { readPlant } from "@/lib/services/plants/read";

type PageProps = Readonly<{
  params: Promise<{ plantId: string; designId: string }>;
  searchParams: Promise<Readonly<Record<string, string | string[] | undefined>>>;
}>;

/** Another team's design, and one of another plant, is answered like one that does not exist. */
const load = cache(async (plantId: string, designId: string, asked: string | null): Promise<BenchStart> => {
  const suffix = asked === null ? "" : `?revision=${encodeURIComponent(asked)}`;
  const ctx = await pageContext(`/plants/${plantId}/designs/${designId}${suffix}`);
  const known =
    PlantAddress.safeParse({ plantId }).success &&
    DesignAddress.safeParse({ designId }).success &&
    (asked === null || DesignRevisionAddress.safeParse({ revisionId: asked }).success);
  if (!known) notFound();
  try {
    const [plant, design] = [await readPlant(ctx, plantId), await readDesign(ctx, designId)];
    const revision = await readDesignRevision(ctx, asked ?? design.currentRevision.id);
    if (design.plantId !== plantId || revision.designId !== designId) notFound();
    return {
      plant: {
        ...{ id: plantId, name: plant.name, newest: plant.currentRevision, archived: plant.archivedAt !== null },
        criteria: plant.criteria,
      },
      design,
      revision,
      older: revision.id !== design.currentRevision.id,
      ground: { plantRevision: revision.plantRevision, model: revision.model },
      recipe: revision.recipe,
    };
  } catch (error) {
    if (error instanceof NotFound) notFound();
    throw error;
  }
});

async function startOf({ params, searchParams }: PageProps): Promise<BenchStart> {
  const [{ plantId, designId }, { revision }] = [await params, await searchParams];
  return load(plantId, designId, typeof revision === "string" ? revision : null);
}

export async function generateMetadata(props: PageProps): Promise<Metadata> {
  const { design, plant } = await startOf(props);
  return { title: `${design?.name ?? "Design"}, ${plant.name}` };
}

export default async function Page(props: PageProps) {
  const start = await startOf(props);
  return (
    <PageBody>
      {/* A page that saved a later revision in place starts anew when the one it began from is asked for. */}
      <DesignBench key={`${start.revision?.id} ${start.older ? "older" : "newest"}`} start={start} />
    </PageBody>
  );
}
