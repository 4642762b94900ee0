const FIRST_MS = 1_000;
const LONGEST_MS = 30_000;

/** How long to wait after so many failures in a row: 1, 2, 4 … 30 s. */
export const backOffMs = (failures: number): number => Math.min(LONGEST_MS, FIRST_MS * 2 ** Math.max(0, failures - 1));
