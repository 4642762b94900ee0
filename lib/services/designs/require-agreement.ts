import "server-only";
import type { Evidence } from "@/control/design/evidence";
import { DomainError } from "@/lib/errors";
import type { ShownGains } from "@/lib/schemas/design";

/** The same methods give the same bits everywhere; this much is left to a reader who rounds once more. */
const ROUNDING = 4 * Number.EPSILON;

const sizeOf = (rows: readonly (readonly number[])[]) => Math.sqrt(rows.flat().reduce((sum, entry) => sum + entry * entry, 0));

/**
 * What somebody looked at before storing must be what is stored.
 *
 * @throws DomainError gains-disagree, where gains of the same plant and recipe differ by more than both may be off
 */
export function requireAgreement({ gains, methodVersion }: Evidence, shown: ShownGains | undefined): void {
  if (!shown || gains.state === "refused") return;
  if (shown.methodVersion !== methodVersion) {
    const words = `The page computed with methods of version ${shown.methodVersion}, the service with ${methodVersion}. Reload the page; what you typed is kept.`;
    throw new DomainError("gains-disagree", words, { given: shown.methodVersion, current: methodVersion });
  }
  const { K, errorBound } = gains.value;
  const fits = shown.K.length === K.length && shown.K.every((row, i) => row.length === K[i].length);
  const difference = fits ? sizeOf(K.map((row, i) => row.map((entry, j) => entry - shown.K[i][j]))) : sizeOf(K);
  const allowed = Math.max(2 * (errorBound ?? 0), ROUNDING) * sizeOf(K);
  if (fits && difference <= allowed) return;
  const words = "The gains that were shown differ from those that the service computed for the same recipe. Nothing was stored.";
  throw new DomainError("gains-disagree", words, { difference, allowed });
}
