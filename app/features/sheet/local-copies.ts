import type { SheetDocument } from '../../../shared/schemas/sheet.ts';

/** What one open page has typed and the server has not got yet. */
export interface LocalCopy {
  readonly document: SheetDocument;
  /** The draft's version that it was made from. */
  readonly baseVersion: number;
  readonly touchedAt: number;
}

export interface FoundCopy extends LocalCopy {
  readonly key: string;
}

/** The browser's store; every page writes under a key of its own, so that two tabs never write over each other. */
export interface LocalCopies {
  keep(copy: LocalCopy): void;
  /** Forgets this page's own copy: the server has it. */
  forget(): void;
  /** Copies that pages now closed, or crashed, have left, the latest first. */
  findLeft(): Promise<readonly FoundCopy[]>;
  remove(key: string): void;
  close(): void;
}

/** What is needed of a browser's store. */
type Store = Pick<Storage, 'getItem' | 'setItem' | 'removeItem' | 'key' | 'length'>;

/** The browser's store, or one that lasts as long as the page where the browser keeps its own closed. */
export function openStore(find: () => Storage): Store {
  try {
    return find();
  } catch {
    const kept = new Map<string, string>();
    return {
      getItem: (key) => kept.get(key) ?? null,
      setItem: (key, value) => void kept.set(key, value),
      removeItem: (key) => void kept.delete(key),
      key: (index) => [...kept.keys()][index] ?? null,
      get length() {
        return kept.size;
      },
    };
  }
}

interface Locks {
  request(name: string, callback: () => Promise<void>): Promise<unknown>;
  query(): Promise<{ readonly held?: readonly { readonly name?: string }[] }>;
}

export interface LocalCopiesOptions {
  /** Person, derivation and purpose; no other person's copies are ever looked at. */
  readonly scope: string;
  readonly pageId: string;
  readonly storage: Store;
  /** Remembers the page that stood in this tab before. */
  readonly tab: Store;
  /** The browser's locks, where it has them: a page that is still open holds one. */
  readonly locks?: Locks;
  readonly now: () => number;
}

/** Without locks, a page that has not typed for this long counts as closed. */
const QUIET_MS = 60_000;

export function openLocalCopies(options: LocalCopiesOptions): LocalCopies {
  const { scope, pageId, storage, tab, locks, now } = options;
  const prefix = `slipstone.sheet.${scope}.`;
  const own = prefix + pageId;
  const before = tab.getItem(prefix);
  tab.setItem(prefix, own);
  let release = () => {};
  void locks?.request(own, () => new Promise<void>((resolve) => (release = resolve))).catch(() => {});

  async function isOpenElsewhere(key: string, copy: LocalCopy): Promise<boolean> {
    if (key === before) return false;
    if (!locks) return now() - copy.touchedAt < QUIET_MS;
    const { held = [] } = await locks.query();
    return held.some(({ name }) => name === key);
  }

  return {
    keep: (copy) => storage.setItem(own, JSON.stringify(copy)),
    forget: () => storage.removeItem(own),
    remove: (key) => storage.removeItem(key),
    async findLeft() {
      const left: FoundCopy[] = [];
      for (const key of keysOf(storage, prefix)) {
        if (key === own) continue;
        const copy = parseCopy(storage.getItem(key));
        if (!copy) storage.removeItem(key);
        else if (!(await isOpenElsewhere(key, copy))) left.push({ ...copy, key });
      }
      return left.sort((one, other) => other.touchedAt - one.touchedAt);
    },
    close: () => release(),
  };
}

function keysOf(storage: Store, prefix: string): string[] {
  return Array.from({ length: storage.length }, (_, i) => storage.key(i) ?? '').filter((key) => key.startsWith(prefix));
}

function parseCopy(text: string | null): LocalCopy | null {
  try {
    const copy = JSON.parse(text ?? '') as Partial<LocalCopy>;
    if (copy.document?.type !== 'doc' || typeof copy.baseVersion !== 'number') return null;
    return { document: copy.document, baseVersion: copy.baseVersion, touchedAt: copy.touchedAt ?? 0 };
  } catch {
    return null;
  }
}
