import { zodToOpenAPIRegistry } from "@asteasolutions/zod-to-openapi";
import { z } from "zod";
import * as account from "@/lib/schemas/account";
import * as comparison from "@/lib/schemas/comparison";
import * as criteria from "@/lib/schemas/criteria";
import * as design from "@/lib/schemas/design";
import * as draft from "@/lib/schemas/draft";
import * as evidence from "@/lib/schemas/evidence";
import * as invitation from "@/lib/schemas/invitation";
import * as plant from "@/lib/schemas/plant";
import * as problem from "@/lib/schemas/problem";
import * as recipe from "@/lib/schemas/recipe";
import * as team from "@/lib/schemas/team";
import * as template from "@/lib/schemas/template";

const MODULES: readonly Readonly<Record<string, unknown>>[] = [
  plant,
  recipe,
  evidence,
  criteria,
  design,
  draft,
  comparison,
  template,
  account,
  invitation,
  team,
  problem,
];

let named = false;

/**
 * Gives every exported object and alternative the name it has in the sources, so that the API description refers to it
 * instead of repeating it. Single values stay inline: a reference to "a finite number" tells nobody anything.
 * Into the generator's own registry, since its other way of naming makes a new schema, which nothing refers to.
 */
export function nameSchemas(): void {
  if (named) return;
  named = true;
  const taken = new Map<string, unknown>();
  for (const [refId, schema] of MODULES.flatMap((module) => Object.entries(module))) {
    if ((taken.get(refId) ?? schema) !== schema) throw new Error(`Two schemas are named ${refId}.`);
    taken.set(refId, schema);
    if (schema instanceof z.ZodObject || schema instanceof z.ZodUnion) zodToOpenAPIRegistry.add(schema, { _internal: { refId } });
  }
}
