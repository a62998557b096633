import { findingDraftSchema, type FindingDraft } from '../../../shared/schemas/finding.ts';
import type { DraftSaved } from '../../../shared/schemas/review.ts';
import { ApiProblem } from '../../lib/api.ts';

/** Where what was typed is; it is in this browser in every state but `saved`. */
export type DraftState =
  | { readonly kind: 'saved' }
  | { readonly kind: 'saving' }
  | { readonly kind: 'offline' }
  | { readonly kind: 'refused'; readonly detail: string }
  | { readonly kind: 'conflict'; readonly theirs: FindingDraft; readonly version: number };

export interface DraftView {
  readonly draft: FindingDraft;
  readonly state: DraftState;
  readonly names: readonly string[];
}

export interface DraftKeeper {
  readonly view: DraftView;
  edit(change: Partial<FindingDraft>): void;
  /** Sends what waits. Resolves when the server has it; rejects where it cannot be had. */
  flush(): Promise<void>;
  keep(which: 'mine' | 'theirs'): void;
  /** The server has this by another way, such as a hand-in. */
  serverHas(draft: FindingDraft, version: number): void;
  subscribe(listener: () => void): () => void;
  close(): void;
}

export interface DraftKeeperOptions {
  readonly key: string;
  readonly draft: FindingDraft;
  readonly version: number;
  readonly storage: Pick<Storage, 'getItem' | 'setItem' | 'removeItem'>;
  readonly send: (draft: FindingDraft, version: number) => Promise<DraftSaved>;
}

const SEND_AFTER_MS = 900;
const RETRY_MS = 5_000;

/** Keeps a finding as it is typed: in this browser at once, on the server soon after, under a version number. */
export function createDraftKeeper(options: DraftKeeperOptions): DraftKeeper {
  return new Keeper(options);
}

class Keeper implements DraftKeeper {
  view: DraftView;
  private version: number;
  private waiting = false;
  /** What this page has put into the browser's store, or found there. */
  private kept: string | null = null;
  private timer: ReturnType<typeof setTimeout> | undefined;
  private sending: Promise<void> | null = null;
  private readonly listeners = new Set<() => void>();
  private readonly options: DraftKeeperOptions;

  constructor(options: DraftKeeperOptions) {
    this.options = options;
    this.version = options.version;
    this.view = { draft: options.draft, state: { kind: 'saved' }, names: [] };
    this.recover();
  }

  edit(change: Partial<FindingDraft>): void {
    const draft = { ...this.view.draft, ...change };
    this.waiting = true;
    this.kept = JSON.stringify({ draft, version: this.version });
    this.options.storage.setItem(this.options.key, this.kept);
    this.show({ draft, state: this.view.state.kind === 'conflict' ? this.view.state : { kind: 'saving' } });
    this.sendIn(SEND_AFTER_MS);
  }

  async flush(): Promise<void> {
    clearTimeout(this.timer);
    while (this.sending) await this.sending;
    if (this.waiting) await this.send();
    if (this.waiting) throw new ApiProblem({ type: 'conflict', title: 'Not saved yet', status: 409 });
  }

  keep(which: 'mine' | 'theirs'): void {
    const { state } = this.view;
    if (state.kind !== 'conflict') return;
    this.version = state.version;
    if (which === 'theirs') return this.serverHas(state.theirs, state.version);
    this.show({ state: { kind: 'saving' } });
    this.edit({});
  }

  serverHas(draft: FindingDraft, version: number): void {
    clearTimeout(this.timer);
    this.waiting = false;
    this.version = version;
    this.forget();
    this.show({ draft, state: { kind: 'saved' } });
  }

  subscribe = (listener: () => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };

  close(): void {
    clearTimeout(this.timer);
    if (this.waiting && !this.sending) void this.send();
  }

  /** What a closed or crashed page left behind: taken up where the server has not moved on, else asked about. */
  private recover(): void {
    this.kept = this.options.storage.getItem(this.options.key);
    const left = parse(this.kept);
    if (!left) return;
    this.waiting = true;
    if (left.version === this.version) {
      this.view = { draft: left.draft, state: { kind: 'saving' }, names: [] };
      this.sendIn(0);
      return;
    }
    this.view = {
      draft: left.draft,
      state: { kind: 'conflict', theirs: this.options.draft, version: this.version },
      names: [],
    };
  }

  /** The server has it. What another window has typed since stays. */
  private forget(): void {
    const { storage, key } = this.options;
    if (this.kept !== null && storage.getItem(key) === this.kept) storage.removeItem(key);
    this.kept = null;
  }

  private sendIn(ms: number): void {
    clearTimeout(this.timer);
    if (this.view.state.kind !== 'conflict') this.timer = setTimeout(() => void this.send(), ms);
  }

  private send(): Promise<void> {
    if (this.sending || this.view.state.kind === 'conflict') return this.sending ?? Promise.resolve();
    this.sending = this.sendNow().finally(() => {
      this.sending = null;
    });
    return this.sending;
  }

  private async sendNow(): Promise<void> {
    const { draft } = this.view;
    try {
      const saved = await this.options.send(draft, this.version);
      this.version = saved.version;
      if (draft === this.view.draft) {
        this.waiting = false;
        this.forget();
        this.show({ state: { kind: 'saved' }, names: saved.names });
      } else {
        this.show({ names: saved.names });
        this.sendIn(SEND_AFTER_MS);
      }
    } catch (error) {
      this.failed(error);
    }
  }

  private failed(error: unknown): void {
    if (!(error instanceof ApiProblem)) throw error;
    const theirs = findingDraftSchema.safeParse(error.extra['draft']);
    const version = error.extra['version'];
    if (error.type === 'conflict' && theirs.success && typeof version === 'number') {
      this.show({ state: { kind: 'conflict', theirs: theirs.data, version } });
    } else if (error.status === 0 || error.status >= 500) {
      this.show({ state: { kind: 'offline' } });
      this.sendIn(RETRY_MS);
    } else {
      this.show({ state: { kind: 'refused', detail: error.errors[0]?.detail ?? error.detail ?? error.title } });
    }
  }

  private show(change: Partial<DraftView>): void {
    this.view = { ...this.view, ...change };
    for (const listener of this.listeners) listener();
  }
}

function parse(text: string | null): { draft: FindingDraft; version: number } | null {
  try {
    const left = JSON.parse(text ?? '') as { draft?: unknown; version?: unknown };
    const draft = findingDraftSchema.safeParse(left.draft);
    return draft.success && typeof left.version === 'number' ? { draft: draft.data, version: left.version } : null;
  } catch {
    return null;
  }
}
