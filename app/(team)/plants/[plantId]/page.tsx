import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { cache } from "react";
import { PlantPage } from "@/components/plants/editor/plant-page";
import { PageBody } from "@/components/ui/page-body";
import { pageContext } from "@/lib/auth/session";
import { NotFound } from "@/lib/errors";
import { isAllowed } from "@/lib/permissions/allow";
import { PlantAddress } from "@/lib/schemas/addresses";
import { readPlant } from "@/lib/services/plants/read";
import { readPlantRevision } from "@/lib/services/plants/read-revision";

type PageProps = Readonly<{ params: Promise<{ plantId: string }> }>;

/** Another team's plant is answered like one that does not exist. */
const load = cache(async (plantId: string) => {
  const ctx = await pageContext(`/plants/${plantId}`);
  const address = PlantAddress.safeParse({ plantId });
  if (!address.success) notFound();
  try {
    const plant = await readPlant(ctx, plantId);
    return { ctx, plant, revision: await readPlantRevision(ctx, plantId, plant.currentRevision.id) };
  } catch (error) {
    if (error instanceof NotFound) notFound();
    throw error;
  }
});

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  return { title: (await load((await params).plantId)).plant.name };
}

export default async function Page({ params }: PageProps) {
  const { ctx, plant, revision } = await load((await params).plantId);
  return (
    <PageBody>
      <PlantPage
        plant={plant}
        revision={revision}
        mayWrite={isAllowed(ctx, "plant:write")}
        mayPublish={isAllowed(ctx, "template:publish")}
      />
    </PageBody>
  );
}
