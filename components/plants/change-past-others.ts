import { fetchPlant } from "@/lib/client/plants";
import { RequestProblem } from "@/lib/client/request";
import type { Plant } from "@/lib/schemas/plant";

export const isStale = (error: unknown) => error instanceof RequestProblem && error.code === "stale-version";

/**
 * Sends a change that started from `version`. Where somebody saved since then and left alone what this change is about, it is
 * sent once more from what they saved.
 * @throws RequestProblem also `stale-version`, where they changed the same
 */
export async function changePastOthers(
  plantId: string,
  version: number,
  send: (version: number) => Promise<Plant>,
  leftAlone: (theirs: Plant) => boolean,
): Promise<Plant> {
  try {
    return await send(version);
  } catch (error) {
    if (!isStale(error)) throw error;
    const theirs = await fetchPlant(plantId);
    if (!leftAlone(theirs)) throw error;
    return send(theirs.version);
  }
}
