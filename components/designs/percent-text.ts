import { formatNumber } from "@/control/words/format-number";

const LEAST = 0.01;

/** A figure in percent; what no machine shows is not written out to its last digit. */
export function percentText(percent: number, digits = 3): string {
  return percent !== 0 && Math.abs(percent) < LEAST ? `< ${LEAST} %` : `${formatNumber(percent, digits)} %`;
}
