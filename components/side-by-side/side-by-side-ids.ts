import { Id } from "@/lib/schemas/common";
import { MOST } from "@/lib/schemas/compared-count";

export type AskedDesigns = {
  /** Each once, in the order of the address, as many as fit. */
  readonly ids: readonly string[];
  /** Something stands there that is no identifier of ours. */
  readonly nonsense: boolean;
  readonly tooMany: boolean;
};

/** Reads `designs=` of an address: ids with commas between, or the parameter several times. */
export function askedDesigns(value: string | readonly string[] | undefined): AskedDesigns {
  const texts = value === undefined ? [] : typeof value === "string" ? [value] : value;
  const wanted = [...new Set(texts.flatMap((text) => text.split(",")).map((id) => id.trim().toLowerCase()))].filter(Boolean);
  return {
    ids: wanted.slice(0, MOST),
    nonsense: wanted.some((id) => !Id.safeParse(id).success),
    tooMany: wanted.length > MOST,
  };
}
