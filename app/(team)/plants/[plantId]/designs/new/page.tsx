import type { Metadata } from "next";
import { notFound, redirect } from "next/navigation";
import type { BenchStart } from "@/components/designs/bench/bench-types";
import { DesignBench } from "@/components/designs/bench/design-bench";
import { PageBody } from "@/components/ui/page-body";
import { defaultRecipe } from "@/control/design/default-recipe";
import type { PlantModel } from "@/control/plant/model";
import { pageContext } from "@/lib/auth/session";
import { NotFound } from "@/lib/errors";
import { isAllowed } from "@/lib/permissions/allow";
import { PlantAddress } from "@/lib/schemas/addresses";
import type { Context } from "@/lib/services/context";
import { readPlant } from "@/lib/services/plants/read";
import { readPlantRevision } from "@/lib/services/plants/read-revision";

export const metadata: Metadata = { title: "New design" };

type PageProps = Readonly<{ params: Promise<{ plantId: string }> }>;

/** Another team's plant is answered like one that does not exist. */
async function load(ctx: Context, plantId: string): Promise<BenchStart> {
  if (!PlantAddress.safeParse({ plantId }).success) notFound();
  try {
    const { name, archivedAt, currentRevision, criteria } = await readPlant(ctx, plantId);
    const model = (await readPlantRevision(ctx, plantId, currentRevision.id)).model as PlantModel;
    const plant = { id: plantId, name, newest: currentRevision, archived: archivedAt !== null, criteria };
    const ground = { plantRevision: currentRevision, model };
    return { plant, design: null, revision: null, older: false, ground, recipe: defaultRecipe(model) };
  } catch (error) {
    if (error instanceof NotFound) notFound();
    throw error;
  }
}

export default async function Page({ params }: PageProps) {
  const { plantId } = await params;
  const ctx = await pageContext(`/plants/${plantId}/designs/new`);
  const start = await load(ctx, plantId);
  // Whoever may not make one finds the designs that there are.
  if (!isAllowed(ctx, "design:write")) redirect(`/plants/${plantId}?tab=designs`);
  return (
    <PageBody>
      <DesignBench start={start} />
    </PageBody>
  );
}
