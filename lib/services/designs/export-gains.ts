import "server-only";
import type { GainEvidence, ObserverEvidence, ReferenceEvidence } from "@/control/design/evidence";
import { DomainError } from "@/lib/errors";
import { gainAsCsv, gainAsJson } from "@/lib/files/gain-export";
import type { Context } from "../context";
import { readDesignRevision } from "./read-revision";

/** The gain of a stored revision as a file, with everything an implementer needs beside the numbers and the cautions. */
export async function exportGains(ctx: Context, revisionId: string, format: "csv" | "json") {
  const { plantName, designName, number, plantRevision, model, evidence } = await readDesignRevision(ctx, revisionId);
  const { gains, reference, observer, methodVersion } = evidence;
  if (gains.state !== "computed") throw new DomainError("conflict", "This revision holds no gain: its solution was refused.");
  const source = {
    plant: { name: plantName, revision: plantRevision.number },
    design: { name: designName, revision: number },
    methodVersion,
    model,
    gains: gains.value satisfies GainEvidence,
    reference: reference.state === "computed" ? (reference.value satisfies ReferenceEvidence) : null,
    observer: observer.state === "computed" ? (observer.value satisfies ObserverEvidence) : null,
  };
  return format === "csv" ? gainAsCsv(source) : gainAsJson(source);
}
