import { type DraftSubject, deleteDraft, fetchDraft, newMark, putDraft } from "@/lib/client/drafts";
import { RequestProblem } from "@/lib/client/request";
import type { Draft } from "@/lib/schemas/draft";
import { Autosave, type AutosaveStatus } from "./autosave";
import { chooseDraft, fromServer, sameDraft } from "./choose-draft";
import { keepLocalDraft, type RecipeDraft, readLocalDraft, type Unsaved } from "./draft-store";

const ASK_AGAIN_AFTER_MS = 10_000;

/** A draft that another page wrote meanwhile, and what a write replaces once it was decided on. */
export type OtherDraft = { readonly draft: RecipeDraft; readonly marks: readonly string[] };

type Page = {
  /** What is unsaved now, and whether somebody changed something since the page, or the draft that came back, was shown. */
  readonly now: () => { readonly unsaved: Unsaved | null; readonly edited: boolean };
  readonly onFound: (draft: RecipeDraft) => void;
  readonly onOther: (other: OtherDraft | null) => void;
  readonly onStatus: (status: AutosaveStatus) => void;
};

/** Brings unsaved work back when a page opens, and keeps the newest on the server from then on. */
export class DraftKeeper {
  private readonly autosave: Autosave<Unsaved>;
  private asking = false;
  private closed = false;

  constructor(
    /** Of the copy in this browser. */
    private readonly key: string,
    private readonly subject: DraftSubject,
    private readonly page: Page,
  ) {
    const server = {
      keep: (content: Unsaved, mark: string, replaces: readonly string[]) =>
        putDraft(subject, { ...content, mark, replaces: [...replaces] }),
      remove: (marks: readonly string[]) => deleteDraft(subject, marks),
      newMark,
    };
    this.autosave = new Autosave(server, (status) => {
      page.onStatus(status);
      if (status.state === "elsewhere" && !this.asking) void this.lookElsewhere();
    });
  }

  async open(): Promise<void> {
    const local = readLocalDraft(this.key);
    // What only this browser has comes back at once; what the server had, too, may have gone on there.
    if (local && !local.synced) this.page.onFound(local);
    const server = await this.fetched();
    if (this.closed) return;
    const { edited } = this.page.now();
    if (server instanceof RequestProblem) {
      if (local?.synced && !edited) this.page.onFound(local);
      this.autosave.release(local?.marks ?? []);
      return;
    }
    const { draft, marks, other } = chooseDraft(local, server);
    const isNew = draft !== null && draft !== local;
    if (isNew && edited) return this.ask(draft, marks);
    if (isNew) this.page.onFound(draft);
    if (!draft && local && !edited) keepLocalDraft(this.key, null);
    if (other) this.ask(other, marks);
    else this.autosave.release(marks);
  }

  offer(unsaved: Unsaved | null): void {
    this.autosave.offer(unsaved);
  }

  tryNow(): void {
    this.autosave.tryNow();
  }

  /** Shows the other draft, or keeps what stands on the page in its place. */
  decide(take: boolean, { draft, marks }: OtherDraft): void {
    this.asking = false;
    this.page.onOther(null);
    if (take) this.page.onFound(draft);
    this.autosave.release(marks);
  }

  close(): void {
    this.closed = true;
    this.autosave.stop();
  }

  private ask(draft: RecipeDraft, marks: readonly string[]): void {
    this.asking = true;
    this.page.onOther({ draft, marks });
    if (draft.where === "server") this.autosave.hold();
    else this.autosave.release(marks);
  }

  /** A write was refused, since the server has what this page does not know. */
  private async lookElsewhere(): Promise<void> {
    this.asking = true;
    const server = await this.fetched();
    if (this.closed) return;
    if (server instanceof RequestProblem) {
      setTimeout(() => this.closed || void this.lookElsewhere(), ASK_AGAIN_AFTER_MS);
      return;
    }
    const { unsaved } = this.page.now();
    if (server && unsaved && !sameDraft(unsaved, fromServer(server))) return this.ask(fromServer(server), [server.mark]);
    this.asking = false;
    this.autosave.release(server ? [server.mark] : [], server && unsaved);
  }

  private async fetched(): Promise<Draft | null | RequestProblem> {
    try {
      return await fetchDraft(this.subject);
    } catch (error) {
      if (error instanceof RequestProblem) return error;
      throw error;
    }
  }
}
