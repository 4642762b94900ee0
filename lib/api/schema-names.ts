import { zodToOpenAPIRegistry } from "@asteasolutions/zod-to-openapi";
import { z } from "zod";
import * as comparison from "@/lib/schemas/comparison";
import * as design from "@/lib/schemas/design";
import * as evidence from "@/lib/schemas/evidence";
import * as plant from "@/lib/schemas/plant";
import * as problem from "@/lib/schemas/problem";
import * as recipe from "@/lib/schemas/recipe";
import * as template from "@/lib/schemas/template";

const MODULES: readonly Readonly<Record<string, unknown>>[] = [plant, recipe, evidence, design, comparison, template, problem];

let named = false;

/**
 * Gives every exported object and alternative the name it has in the sources, so that the API description refers to it
 * instead of repeating it. Single values stay inline: a reference to "a finite number" tells nobody anything.
 * Into the generator's own registry, since its other way of naming makes a new schema, which nothing refers to.
 */
export function nameSchemas(): void {
  if (named) return;
  named = true;
  for (const [refId, schema] of MODULES.flatMap((module) => Object.entries(module))) {
    if (schema instanceof z.ZodObject || schema instanceof z.ZodUnion) zodToOpenAPIRegistry.add(schema, { _internal: { refId } });
  }
}
