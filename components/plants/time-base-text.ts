import type { TimeBase } from "@/control/plant/model";
import { formatSeconds } from "@/control/words/format-number";

export const timeBaseText = (timeBase: TimeBase): string =>
  timeBase.kind === "continuous" ? "continuous" : `sampled, ${formatSeconds(timeBase.period)}`;
