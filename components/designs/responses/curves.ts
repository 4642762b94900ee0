import type { ResponseCurves } from "@/lib/schemas/evidence";

/** One response with its signals named, as the service sends it or as the page's own worker hands it over. */
export type Curves = Omit<ResponseCurves, "signals" | "values"> & {
  readonly signals: readonly ResponseCurves["signals"][number][];
  readonly values: readonly ArrayLike<number>[];
};
