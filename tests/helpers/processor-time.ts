/** Milliseconds of processor time this process has used: unlike the clock, it does not run on while a busy machine does something else. */
export const processorMs = (): number => process.cpuUsage().user / 1_000;
