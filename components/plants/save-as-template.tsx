"use client";

import dynamic from "next/dynamic";
import type { Plant, PlantContent } from "@/lib/schemas/plant";
import { useDesigns } from "../designs/use-designs";

/** Only leads meet it, and only after the page can be used. */
const PublishTemplate = dynamic(() => import("../templates/publish-template").then((module) => module.PublishTemplate));

type SaveAsTemplateProps = Readonly<{ plant: Plant; content: PlantContent }>;

export function SaveAsTemplate({ plant, content }: SaveAsTemplateProps) {
  const designs = useDesigns(plant.id, "no");
  const items = designs.data?.pages.flatMap((page) => page.items) ?? [];
  return (
    <PublishTemplate
      plantName={plant.name}
      content={content}
      criteria={plant.criteria}
      designs={items.map(({ name, currentRevision }) => ({ revisionId: currentRevision.id, name }))}
    />
  );
}
