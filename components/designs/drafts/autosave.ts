import { RequestProblem } from "@/lib/client/request";
import { backOffMs } from "./back-off";

/** A pause in typing is not waited for: the newest state goes this long after the first change. */
export const SOON_MS = 700;
/** Two writes never begin closer together. */
export const APART_MS = 1_500;
const MOST_MARKS = 16;

/**
 * `offline`: nothing answers. `failing`: something does, but not as it should; both are tried again. `refused`: this very content
 * is never taken. `elsewhere`: another page of the same person wrote since, and somebody has to choose.
 */
export type AutosaveState = "nothing" | "waiting" | "saving" | "saved" | "offline" | "failing" | "refused" | "elsewhere";

export type AutosaveStatus = {
  readonly state: AutosaveState;
  /** Any of them may be the mark of what the server has. */
  readonly marks: readonly string[];
  /** Whether the server has the newest content. */
  readonly synced: boolean;
};
export const NOTHING_TO_SAVE: AutosaveStatus = { state: "nothing", marks: [], synced: false };

type Server<T> = {
  readonly keep: (content: T, mark: string, replaces: readonly string[]) => Promise<unknown>;
  readonly remove: (marks: readonly string[]) => Promise<unknown>;
  readonly newMark: () => string;
};

/**
 * Carries the newest content to the server: one request at a time, what was overtaken is never sent, failures are tried again with
 * growing pauses. Contents are told apart by identity.
 */
export class Autosave<T extends object> {
  private latest: T | null = null;
  private stored: T | null = null;
  private refused: T | null = null;
  private marks: readonly string[] = [];
  /** Until it is known what the server has, or what is to become of it, nothing is sent. */
  private held: "unknown" | "elsewhere" | null = "unknown";
  private trouble: "offline" | "failing" | null = null;
  private running = false;
  private stopped = false;
  private failures = 0;
  private notBefore = 0;
  private timer: ReturnType<typeof setTimeout> | undefined;
  private told = NOTHING_TO_SAVE;

  constructor(
    private readonly server: Server<T>,
    private readonly tell: (status: AutosaveStatus) => void,
  ) {}

  /** What is unsaved now; null once nothing is, which also removes what the server keeps. */
  offer(content: T | null): void {
    if (content === this.latest) return;
    this.latest = content;
    if (content === null) this.tryNow();
    else this.plan();
  }

  /** From here on writes may replace whatever has one of `marks`; `stored` is what the server has already, where that is known. */
  release(marks: readonly string[], stored: T | null = null): void {
    this.held = null;
    this.marks = marks;
    this.stored = stored;
    this.tryNow();
  }

  hold(): void {
    this.held = "elsewhere";
    this.plan();
  }

  /** The network is back, or somebody asks for it. */
  tryNow(): void {
    this.forgetTimer();
    this.failures = 0;
    this.plan();
  }

  /** The page is left: what is due is sent once more, and nothing is tried again. */
  stop(): void {
    this.stopped = true;
    this.tryNow();
  }

  private get isDone(): boolean {
    const { latest, stored, refused, marks } = this;
    return latest === null ? marks.length === 0 : latest === stored || latest === refused;
  }

  private plan(): void {
    this.report();
    if (this.running || this.held || this.isDone) return;
    if (this.stopped) {
      if (this.failures === 0) void this.run();
      return;
    }
    this.timer ??= setTimeout(() => void this.run(), this.pause());
  }

  private pause(): number {
    if (this.failures > 0) return Math.max(backOffMs(this.failures), this.notBefore - Date.now());
    if (this.latest === null) return 0;
    return Math.max(SOON_MS, this.notBefore - Date.now());
  }

  private forgetTimer(): void {
    clearTimeout(this.timer);
    this.timer = undefined;
  }

  private async run(): Promise<void> {
    this.forgetTimer();
    this.running = true;
    const content = this.latest;
    try {
      if (content) await this.keep(content);
      else await this.remove();
      this.failures = 0;
      this.trouble = null;
    } catch (error) {
      this.failed(error, content);
    } finally {
      this.running = false;
      this.plan();
    }
  }

  private async keep(content: T): Promise<void> {
    const mark = this.server.newMark();
    const known = this.marks;
    this.notBefore = Date.now() + APART_MS;
    // Told before it is sent: a page that ends meanwhile still knows its own write again.
    this.marks = known.length < MOST_MARKS ? [...known, mark] : [known[0], ...known.slice(2), mark];
    this.report();
    await this.server.keep(content, mark, known);
    this.marks = [mark];
    this.stored = content;
  }

  private async remove(): Promise<void> {
    await this.server.remove(this.marks);
    this.marks = [];
    this.stored = null;
  }

  private failed(error: unknown, content: T | null): void {
    this.failures += 1;
    if (!(error instanceof RequestProblem)) {
      this.trouble = "failing";
      throw error;
    }
    if (isFinal(error)) {
      this.failures = 0;
      this.trouble = null;
      // What another page wrote since is not ours to remove.
      if (content === null) this.marks = [];
      else if (error.code === "stale-version") this.held = "elsewhere";
      else this.refused = content;
      return;
    }
    this.trouble = error.code === "offline" ? "offline" : "failing";
    this.notBefore = Math.max(this.notBefore, Date.now() + 1_000 * (error.retryAfter ?? 0));
  }

  private report(): void {
    const status = { state: this.state(), marks: this.marks, synced: this.latest !== null && this.latest === this.stored };
    const { told } = this;
    if (status.state === told.state && status.marks === told.marks && status.synced === told.synced) return;
    this.told = status;
    this.tell(status);
  }

  private state(): AutosaveState {
    if (this.held === "elsewhere") return "elsewhere";
    if (this.latest === null) return "nothing";
    if (this.latest === this.stored) return "saved";
    if (this.latest === this.refused) return "refused";
    return this.trouble ?? (this.running ? "saving" : "waiting");
  }
}

/** Sent again, it would be refused again; an ended session, too many requests and a late body are not of that kind. */
const isFinal = ({ status }: RequestProblem) => status >= 400 && status < 500 && ![401, 408, 429].includes(status);
