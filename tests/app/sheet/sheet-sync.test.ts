import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { openLocalCopies, openStore, type LocalCopies } from '../../../app/features/sheet/local-copies.ts';
import { createSheetSync, type SheetSync } from '../../../app/features/sheet/sheet-sync.ts';
import { ApiProblem } from '../../../app/lib/api.ts';
import type { SaveAnswer, SavedDraft } from '../../../shared/schemas/derivation.ts';
import type { ProblemType } from '../../../shared/schemas/problem.ts';
import type { SheetDocument } from '../../../shared/schemas/sheet.ts';

/** A server that keeps one draft, and can be told to fail. */
class Server {
  draft: SavedDraft = { document: sheet('x=1'), version: 1, savedAt: '2031-03-03T09:00:00.000Z' };
  failing: ProblemType | 'offline' | null = null;
  /** Takes the save but loses the answer. */
  losesAnswer = false;
  saves = 0;

  save = async (document: SheetDocument, baseVersion: number): Promise<SaveAnswer> => {
    this.saves += 1;
    if (this.failing) throw problem(this.failing);
    if (baseVersion !== this.draft.version) throw problem('conflict', { draft: this.draft });
    this.draft = { document, version: baseVersion + 1, savedAt: '2031-03-03T09:01:00.000Z' };
    if (this.losesAnswer) throw problem('offline');
    return { version: this.draft.version, savedAt: this.draft.savedAt };
  };
}

function problem(type: ProblemType | 'offline', extra = {}): ApiProblem {
  return new ApiProblem({ type, title: type, status: 0, extra });
}

let count = 0;
function sheet(...lines: string[]): SheetDocument {
  const content = lines.map((tex) => {
    count += 1;
    return { type: 'step', attrs: { stepId: `id-${count}`, tex, reason: '', uses: null } };
  });
  return { type: 'doc', content };
}
const linesOf = ({ content }: SheetDocument) => content.map(({ attrs }) => attrs?.['tex']);

let server: Server;
let replaced: SheetDocument[];
const open: SheetSync[] = [];

function copies(pageId: string): LocalCopies {
  return openLocalCopies({
    scope: 'mira.d1.submission',
    pageId,
    storage: localStorage,
    tab: sessionStorage,
    now: Date.now,
  });
}

function start(pageId = 'page-1', draft = server.draft): SheetSync {
  const sync = createSheetSync({
    draft,
    copies: copies(pageId),
    send: server.save,
    onReplace: (document) => replaced.push(document),
    now: Date.now,
  });
  open.push(sync);
  return sync;
}

beforeEach(() => {
  vi.useFakeTimers();
  localStorage.clear();
  sessionStorage.clear();
  server = new Server();
  replaced = [];
});
afterEach(() => {
  server.failing = null;
  for (const sync of open.splice(0)) sync.close();
  vi.useRealTimers();
});

const kept = () => Object.values(localStorage as unknown as Record<string, string>).length;

describe('typing', () => {
  it('is kept in the browser at once and sent within two seconds, as one save', async () => {
    const sync = start();
    sync.edit(sheet('x=1', 'x=2'));
    sync.edit(sheet('x=1', 'x=23'));
    expect(kept()).toBe(1);
    expect(sync.state.kind).toBe('saving');
    await vi.advanceTimersByTimeAsync(2_000);
    expect(server.saves).toBe(1);
    expect(linesOf(server.draft.document)).toEqual(['x=1', 'x=23']);
    expect(sync.state.kind).toBe('saved');
    expect(kept()).toBe(0);
  });

  it('goes out while somebody types without a pause', async () => {
    const sync = start();
    for (let i = 0; i < 30; i += 1) {
      sync.edit(sheet(`x=${i}`));
      await vi.advanceTimersByTimeAsync(100);
    }
    expect(server.saves).toBeGreaterThanOrEqual(2);
  });

  it('while a save is under way goes with the next one', async () => {
    const sync = start();
    sync.edit(sheet('a'));
    const flushed = sync.flush();
    sync.edit(sheet('a', 'b'));
    expect(await flushed).toBe(3);
    expect(linesOf(server.draft.document)).toEqual(['a', 'b']);
  });
});

describe('without a connection', () => {
  it('says so, keeps everything, and sends it when the connection is back', async () => {
    const sync = start();
    server.failing = 'offline';
    sync.edit(sheet('offline'));
    await vi.advanceTimersByTimeAsync(2_000);
    expect(sync.state.kind).toBe('offline');
    expect(kept()).toBe(1);
    server.failing = null;
    await vi.advanceTimersByTimeAsync(5_000);
    expect(sync.state.kind).toBe('saved');
    expect(linesOf(server.draft.document)).toEqual(['offline']);
  });

  it('tries at once when told to', async () => {
    const sync = start();
    server.failing = 'offline';
    sync.edit(sheet('soon'));
    await vi.advanceTimersByTimeAsync(1_500);
    server.failing = null;
    sync.retry();
    await vi.advanceTimersByTimeAsync(0);
    expect(sync.state.kind).toBe('saved');
  });

  it('takes a lost answer for what it was', async () => {
    const sync = start();
    server.losesAnswer = true;
    sync.edit(sheet('a'));
    await vi.advanceTimersByTimeAsync(1_500);
    server.losesAnswer = false;
    sync.edit(sheet('a', 'b'));
    await vi.advanceTimersByTimeAsync(8_000);
    expect(sync.state.kind).toBe('saved');
    expect(linesOf(server.draft.document)).toEqual(['a', 'b']);
  });
});

it('keeps everything when the session has ended, and goes on after signing in', async () => {
  const sync = start();
  server.failing = 'signed-out';
  sync.edit(sheet('a'));
  await vi.advanceTimersByTimeAsync(2_000);
  expect(sync.state.kind).toBe('signed-out');
  expect(kept()).toBe(1);
  server.failing = null;
  sync.retry();
  await vi.advanceTimersByTimeAsync(0);
  expect(sync.state.kind).toBe('saved');
});

it('says what the server will not take, and keeps it', async () => {
  const sync = start();
  server.failing = 'too-late';
  sync.edit(sheet('a'));
  await vi.advanceTimersByTimeAsync(2_000);
  expect(sync.state).toMatchObject({ kind: 'refused' });
  expect(kept()).toBe(1);
});

describe('two windows', () => {
  async function conflicting(): Promise<SheetSync> {
    const sync = start();
    await server.save(sheet('x=1', 'theirs'), 1);
    sync.edit(sheet('x=1', 'mine'));
    await vi.advanceTimersByTimeAsync(2_000);
    expect(sync.state).toMatchObject({ kind: 'conflict', theirs: { version: 2 } });
    return sync;
  }

  it('are asked about, with both kept, and nothing is sent meanwhile', async () => {
    const sync = await conflicting();
    const { saves } = server;
    sync.edit(sheet('x=1', 'mine', 'more'));
    await vi.advanceTimersByTimeAsync(10_000);
    expect(server.saves).toBe(saves);
    expect(sync.state.kind === 'conflict' && linesOf(sync.state.mine)).toEqual(['x=1', 'mine', 'more']);
  });

  it('mine: goes over the other', async () => {
    const sync = await conflicting();
    sync.resolve('mine');
    await vi.advanceTimersByTimeAsync(0);
    expect(linesOf(server.draft.document)).toEqual(['x=1', 'mine']);
    expect(replaced).toEqual([]);
  });

  it('theirs: is taken over', async () => {
    const sync = await conflicting();
    sync.resolve('theirs');
    expect(linesOf(replaced.at(-1) ?? sheet())).toEqual(['x=1', 'theirs']);
    expect(sync.state.kind).toBe('saved');
    expect(kept()).toBe(0);
  });

  it('both: the other’s lines come after mine', async () => {
    const sync = await conflicting();
    sync.resolve('both');
    await vi.advanceTimersByTimeAsync(0);
    expect(linesOf(server.draft.document)).toEqual(['x=1', 'mine', 'theirs']);
    expect(sync.state.kind).toBe('saved');
  });

  it('are in step where nothing is waiting here', async () => {
    const sync = start();
    await server.save(sheet('x=1', 'theirs'), 1);
    sync.serverHas(server.draft);
    expect(linesOf(replaced.at(-1) ?? sheet())).toEqual(['x=1', 'theirs']);
    sync.edit(sheet('x=1', 'theirs', 'mine'));
    await vi.advanceTimersByTimeAsync(2_000);
    expect(sync.state.kind).toBe('saved');
  });
});

describe('after a crash', () => {
  async function crash(document: SheetDocument): Promise<void> {
    server.failing = 'offline';
    copies('crashed').keep({ document, baseVersion: server.draft.version, touchedAt: Date.now() });
    server.failing = null;
  }

  it('what was not sent is taken up and sent', async () => {
    await crash(sheet('x=1', 'unsent'));
    const sync = start('page-2');
    await sync.recover();
    await vi.advanceTimersByTimeAsync(0);
    expect(linesOf(replaced.at(-1) ?? sheet())).toEqual(['x=1', 'unsent']);
    expect(linesOf(server.draft.document)).toEqual(['x=1', 'unsent']);
    expect(kept()).toBe(0);
  });

  it('what was not sent is asked about where the server has gone on', async () => {
    await crash(sheet('x=1', 'unsent'));
    await server.save(sheet('x=1', 'gone on'), 1);
    const sync = start('page-2');
    await sync.recover();
    expect(sync.state.kind).toBe('conflict');
    expect(kept()).toBe(1);
  });

  it('a copy that says what the server has is forgotten', async () => {
    await crash(sheet('x=1'));
    const sync = start('page-2');
    await sync.recover();
    expect(sync.state.kind).toBe('saved');
    expect(kept()).toBe(0);
  });
});

describe('copies in the browser', () => {
  const held = (names: string[]) => ({
    request: () => new Promise<void>(() => {}),
    query: async () => ({ held: names.map((name) => ({ name })) }),
  });
  const openWith = (pageId: string, scope: string, names: string[] = []) =>
    openLocalCopies({ scope, pageId, storage: localStorage, tab: sessionStorage, locks: held(names), now: Date.now });

  it('of a page that is still open are left alone', async () => {
    openWith('one', 's').keep({ document: sheet('a'), baseVersion: 1, touchedAt: 1 });
    sessionStorage.clear();
    expect(await openWith('two', 's', ['slipstone.sheet.s.one']).findLeft()).toEqual([]);
    sessionStorage.clear();
    expect(await openWith('three', 's').findLeft()).toHaveLength(1);
  });

  it('of another person are never looked at', async () => {
    openWith('one', 'mira.d1').keep({ document: sheet('a'), baseVersion: 1, touchedAt: 1 });
    expect(await openWith('two', 'hanno.d1').findLeft()).toEqual([]);
  });

  it('last as long as the page where the browser keeps its store closed', () => {
    const store = openStore(() => {
      throw new DOMException('closed', 'SecurityError');
    });
    store.setItem('a', '1');
    expect([store.getItem('a'), store.length, store.key(0)]).toEqual(['1', 1, 'a']);
    store.removeItem('a');
    expect(store.getItem('a')).toBeNull();
  });

  it('that cannot be read are dropped', async () => {
    localStorage.setItem('slipstone.sheet.s.broken', '{');
    expect(await openWith('two', 's').findLeft()).toEqual([]);
    expect(localStorage.length).toBe(0);
  });
});
