"use client";

import dynamic from "next/dynamic";
import type { PlantContent } from "@/lib/schemas/plant";
import { useDesigns } from "../designs/use-designs";

/** Only leads meet it, and only after the page can be used. */
const PublishTemplate = dynamic(() => import("../templates/publish-template").then((module) => module.PublishTemplate));

type SaveAsTemplateProps = Readonly<{ plantId: string; plantName: string; content: PlantContent }>;

export function SaveAsTemplate({ plantId, plantName, content }: SaveAsTemplateProps) {
  const designs = useDesigns(plantId, "no");
  const items = designs.data?.pages.flatMap((page) => page.items) ?? [];
  return (
    <PublishTemplate
      plantName={plantName}
      content={content}
      designs={items.map(({ name, currentRevision }) => ({ revisionId: currentRevision.id, name }))}
    />
  );
}
