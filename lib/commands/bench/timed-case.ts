/** Something that both libraries can do: our call, and what the other process is asked to repeat. */
export type TimedCase = {
  readonly name: string;
  /** Largest wanted share of the other library's time; null where none is stated. */
  readonly target: number | null;
  readonly ours: () => void;
  /** Name of a routine of time.py and its arguments. */
  readonly question: Readonly<Record<string, unknown>>;
  /** Whether the kernel in WebAssembly may serve. */
  readonly accelerated?: boolean;
};

/** Asks the other process for the processor seconds of a call, repeated for a budget of seconds; null where it is not there. */
export type OtherClock = ((question: object, budget: number) => Promise<number>) | null;
