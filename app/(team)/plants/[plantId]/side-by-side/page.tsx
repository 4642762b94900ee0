import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { cache } from "react";
import { ChooseDesigns } from "@/components/side-by-side/choose-designs";
import { compareDesigns } from "@/components/side-by-side/compare-designs";
import { askedDesigns } from "@/components/side-by-side/side-by-side-ids";
import { SideBySidePage } from "@/components/side-by-side/side-by-side-page";
import { PageBody } from "@/components/ui/page-body";
import { pageContext } from "@/lib/auth/session";
import { NotFound } from "@/lib/errors";
import { isAllowed } from "@/lib/permissions/allow";
import { PlantAddress } from "@/lib/schemas/addresses";
import { FEWEST } from "@/lib/schemas/compared-count";
import type { DesignRevision } from "@/lib/schemas/design";
import { readDesignRevisions } from "@/lib/services/designs/read-revisions";
import { readPlant } from "@/lib/services/plants/read";

type PageProps = Readonly<{
  params: Promise<{ plantId: string }>;
  searchParams: Promise<Readonly<Record<string, string | string[] | undefined>>>;
}>;

/** Revisions of another team, of another plant and of nothing are answered alike. */
const load = cache(async (plantId: string, designs: string) => {
  const ctx = await pageContext(`/plants/${plantId}/side-by-side${designs && `?designs=${encodeURIComponent(designs)}`}`);
  const { ids, nonsense, tooMany } = askedDesigns(designs);
  if (nonsense || !PlantAddress.safeParse({ plantId }).success) notFound();
  try {
    const { id, name } = await readPlant(ctx, plantId);
    const revisions = await readDesignRevisions(ctx, plantId, ids);
    return { plant: { id, name }, ids, tooMany, revisions, maySave: isAllowed(ctx, "comparison:write") };
  } catch (error) {
    if (error instanceof NotFound) notFound();
    throw error;
  }
});

async function startOf({ params, searchParams }: PageProps) {
  const [{ plantId }, { designs, choose }] = [await params, await searchParams];
  const start = await load(plantId.toLowerCase(), [designs ?? []].flat().join(","));
  return { ...start, choosing: start.tooMany || start.ids.length < FEWEST || choose === "yes" };
}

export async function generateMetadata(props: PageProps): Promise<Metadata> {
  const { plant } = await startOf(props);
  return { title: `Side-by-side, ${plant.name}` };
}

const toPicked = ({ id, designName, number }: DesignRevision) => ({ id, name: designName, number });

export default async function Page(props: PageProps) {
  const { plant, ids, tooMany, revisions, maySave, choosing } = await startOf(props);
  return (
    <PageBody>
      {choosing ? (
        <ChooseDesigns key={ids.join()} plant={plant} chosen={revisions.map(toPicked)} tooMany={tooMany} />
      ) : (
        <SideBySidePage key={ids.join()} plant={plant} comparing={compareDesigns(revisions)} maySave={maySave} />
      )}
    </PageBody>
  );
}
