import type { SaveAnswer, SavedDraft } from '../../../shared/schemas/derivation.ts';
import type { SheetDocument } from '../../../shared/schemas/sheet.ts';
import { ApiProblem } from '../../lib/api.ts';
import type { LocalCopies } from './local-copies.ts';
import { keepBoth, saysTheSame } from './sheet-difference.ts';

/** Where what was typed is. It is in this browser in every state but `saved`. */
export type SyncState =
  | { readonly kind: 'saved'; readonly at: string }
  | { readonly kind: 'saving' }
  | { readonly kind: 'offline' }
  | { readonly kind: 'signed-out' }
  /** The server will not take it as it is, or no longer. */
  | { readonly kind: 'refused'; readonly detail: string }
  | { readonly kind: 'conflict'; readonly mine: SheetDocument; readonly theirs: SavedDraft };

export type Keep = 'mine' | 'theirs' | 'both';

export interface SheetSync {
  readonly state: SyncState;
  readonly document: SheetDocument;
  /** Takes what has just been typed: kept in this browser at once, sent to the server within two seconds. */
  edit(document: SheetDocument): void;
  /** Sends what is waiting and answers the saved version. Rejects where it cannot be saved now. */
  flush(): Promise<number>;
  /** Tries again at once, after a connection or a sign-in has come back. */
  retry(): void;
  resolve(keep: Keep): void;
  /** What the server holds by now: taken over where nothing is waiting here. */
  serverHas(draft: SavedDraft): void;
  /** Looks for what a closed or crashed page left behind, and takes it up, or asks. */
  recover(): Promise<void>;
  subscribe(listener: () => void): () => void;
  close(): void;
}

export interface SheetSyncOptions {
  readonly draft: SavedDraft;
  readonly copies: LocalCopies;
  readonly send: (document: SheetDocument, baseVersion: number) => Promise<SaveAnswer>;
  /** The document was replaced from outside the editor. */
  readonly onReplace: (document: SheetDocument) => void;
  readonly now: () => number;
}

const SEND_AFTER_MS = 1_200;
const RETRY_MS = 5_000;

/** Keeps one sheet in step with the server, and never drops what was typed on the way. */
export function createSheetSync(options: SheetSyncOptions): SheetSync {
  return new Sync(options);
}

class Sync implements SheetSync {
  document: SheetDocument;
  state: SyncState;
  private base: number;
  private waiting = false;
  private sending: Promise<void> | null = null;
  /** Sent without an answer: the server may hold any of these. */
  private unanswered: SheetDocument[] = [];
  private timer: ReturnType<typeof setTimeout> | null = null;
  private closed = false;
  private readonly listeners = new Set<() => void>();
  private readonly options: SheetSyncOptions;

  constructor(options: SheetSyncOptions) {
    this.options = options;
    this.document = options.draft.document;
    this.base = options.draft.version;
    this.state = { kind: 'saved', at: options.draft.savedAt };
  }

  edit(document: SheetDocument): void {
    this.document = document;
    this.waiting = true;
    this.keepHere();
    if (this.state.kind === 'saved' || this.state.kind === 'refused') this.set({ kind: 'saving' });
    if (this.state.kind === 'conflict') this.set({ ...this.state, mine: document });
    else this.sendIn(SEND_AFTER_MS);
  }

  async flush(): Promise<number> {
    // What was typed while a save was under way goes with the next one.
    for (let round = 0; round < 3 && (this.waiting || this.sending); round += 1) {
      await this.sendNow();
      if (this.state.kind !== 'saved' && this.state.kind !== 'saving') break;
    }
    if (this.state.kind !== 'saved') throw new Error(`The sheet is not saved: ${this.state.kind}`);
    return this.base;
  }

  retry(): void {
    if (this.waiting && this.state.kind !== 'conflict') void this.sendNow();
  }

  resolve(keep: Keep): void {
    if (this.state.kind !== 'conflict') return;
    const { mine, theirs } = this.state;
    this.base = theirs.version;
    if (keep === 'theirs') {
      this.replace(theirs.document);
      this.settle(theirs.savedAt);
      return;
    }
    if (keep === 'both') this.replace(keepBoth(mine, theirs.document));
    this.waiting = true;
    this.keepHere();
    this.set({ kind: 'saving' });
    void this.sendNow();
  }

  serverHas(draft: SavedDraft): void {
    if (draft.version <= this.base || this.waiting || this.sending || this.state.kind === 'conflict') return;
    this.base = draft.version;
    if (!saysTheSame(this.document, draft.document)) this.replace(draft.document);
    this.settle(draft.savedAt);
  }

  async recover(): Promise<void> {
    const left = await this.options.copies.findLeft();
    for (const copy of left) {
      if (this.closed || this.state.kind === 'conflict') return;
      if (!saysTheSame(copy.document, this.document)) {
        const server: SavedDraft = {
          document: this.document,
          version: this.base,
          savedAt: this.state.kind === 'saved' ? this.state.at : new Date(this.options.now()).toISOString(),
        };
        const goesOn = copy.baseVersion === this.base && !this.waiting;
        this.replace(copy.document);
        this.waiting = true;
        this.keepHere();
        if (goesOn) {
          this.set({ kind: 'saving' });
          void this.sendNow();
        } else {
          this.set({ kind: 'conflict', mine: copy.document, theirs: server });
        }
      }
      this.options.copies.remove(copy.key);
      await this.sending;
    }
  }

  subscribe(listener: () => void): () => void {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  }

  close(): void {
    this.closed = true;
    if (this.timer) clearTimeout(this.timer);
    if (this.waiting && this.state.kind !== 'conflict') void this.sendNow();
    this.options.copies.close();
  }

  private keepHere(): void {
    try {
      this.options.copies.keep({ document: this.document, baseVersion: this.base, touchedAt: this.options.now() });
    } catch {
      // The browser's store is full or closed: the server has to do.
      this.sendIn(0);
    }
  }

  private sendIn(ms: number): void {
    if (this.timer || this.sending || this.closed) return;
    this.timer = setTimeout(() => void this.sendNow(), ms);
  }

  private sendNow(): Promise<void> {
    if (this.timer) clearTimeout(this.timer);
    this.timer = null;
    this.sending ??= this.send().finally(() => {
      this.sending = null;
      if (this.waiting && this.state.kind === 'saving') this.sendIn(SEND_AFTER_MS);
    });
    return this.sending;
  }

  private async send(): Promise<void> {
    const { document } = this;
    this.unanswered = [...this.unanswered.slice(-20), document];
    try {
      const answer = await this.options.send(document, this.base);
      this.base = answer.version;
      this.unanswered = [];
      if (this.document === document) this.settle(answer.savedAt);
      else this.keepHere();
      if (this.state.kind !== 'saved') this.set({ kind: 'saving' });
    } catch (error) {
      this.fail(error);
    }
  }

  private fail(error: unknown): void {
    if (!(error instanceof ApiProblem)) throw error;
    switch (error.type) {
      case 'conflict':
        this.meet(error.extra['draft'] as SavedDraft);
        return;
      case 'signed-out':
        this.set({ kind: 'signed-out' });
        return;
      case 'offline':
      case 'unexpected':
      case 'unavailable':
      case 'too-many':
        this.set({ kind: 'offline' });
        if (!this.closed) this.timer = setTimeout(() => void this.sendNow(), RETRY_MS);
        return;
      default:
        this.set({ kind: 'refused', detail: error.detail ?? error.title });
    }
  }

  /** Another page saved in between; or it was this one, and only the answer went astray. */
  private meet(theirs: SavedDraft): void {
    const isOwn = this.unanswered.some((sent) => saysTheSame(theirs.document, sent));
    this.unanswered = [];
    if (!isOwn && !saysTheSame(theirs.document, this.document)) {
      this.set({ kind: 'conflict', mine: this.document, theirs });
      return;
    }
    this.base = theirs.version;
    if (saysTheSame(theirs.document, this.document)) this.settle(theirs.savedAt);
    else this.set({ kind: 'saving' });
  }

  private settle(at: string): void {
    this.waiting = false;
    this.options.copies.forget();
    this.set({ kind: 'saved', at });
  }

  private replace(document: SheetDocument): void {
    this.document = document;
    this.options.onReplace(document);
  }

  private set(state: SyncState): void {
    this.state = state;
    for (const listener of this.listeners) listener();
  }
}
