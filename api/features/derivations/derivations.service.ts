import { IsNull, Not, type DataSource, type EntityManager } from 'typeorm';
import type { HandInPreview, SaveAnswer, SaveSheet, SheetView } from '../../../shared/schemas/derivation.ts';
import { givenLine, linesOf, proseOf, stepOf, type SheetDocument } from '../../../shared/schemas/sheet.ts';
import type { FrozenTask } from '../../../shared/schemas/task.ts';
import { ProblemError } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import type { Now } from '../../lib/clock.ts';
import { Membership, RosterEntry } from '../classes/classes.entity.ts';
import { User } from '../people/people.entity.ts';
import { Review } from '../reviews/reviews.entity.ts';
import { Derivation, DerivationVersion, type Draft } from './derivations.entity.ts';
import {
  addVersion,
  holdDerivation,
  nothingWritten,
  openDerivation,
  openDraft,
  refuseStale,
  saveDraft,
  tooLate,
} from './drafts.ts';
import { namesInWords, wordsInTex } from './names-in-words.ts';
import { openRound, type OpenedRound } from './sheet-access.ts';
import { toSheetView } from './sheet.presenter.ts';
import { writingWindow, type WritingWindow } from './writing-window.ts';

export interface DerivationsDeps {
  readonly db: DataSource;
  readonly now: Now;
  /** Writes the check of a version into the caller's transaction. */
  readonly queueCheck: (manager: EntityManager, versionId: string) => Promise<void>;
}

export type DerivationsService = ReturnType<typeof createDerivationsService>;

/** Writing, handing in and taking back; an author only ever reaches the own sheet. */
export function createDerivationsService({ db, now, queueCheck }: DerivationsDeps) {
  async function change<T>(
    roundId: string,
    viewer: Viewer,
    act: (manager: EntityManager, held: Held) => Promise<T>,
  ): Promise<T> {
    return await db.transaction(async (manager) => {
      const opened = await openRound(manager, roundId, viewer.userId, true);
      const window = await windowOf(manager, opened, viewer.userId, now());
      const { id } = await openDerivation(manager, roundId, viewer.userId, now(), window.open);
      const derivation = await holdDerivation(manager, id);
      return await act(manager, { ...opened, derivation, window });
    });
  }

  return {
    /** The sheet; the first look at it begins the derivation. */
    async readSheet(roundId: string, viewer: Viewer): Promise<SheetView> {
      return await db.transaction(async (manager) => {
        const opened = await openRound(manager, roundId, viewer.userId);
        const { open } = await windowOf(manager, opened, viewer.userId, now());
        const derivation = await openDerivation(manager, roundId, viewer.userId, now(), open);
        return await present(manager, opened, derivation, now());
      });
    },

    async save(roundId: string, viewer: Viewer, body: SaveSheet): Promise<SaveAnswer> {
      return await change(roundId, viewer, async (manager, held) => {
        refuseClosed(held);
        const draft = await openDraft(manager, held.derivation.id, 'submission', now());
        return await saveDraft(manager, draft, body, now());
      });
    },

    async preview(roundId: string, viewer: Viewer): Promise<HandInPreview> {
      return await db.transaction(async (manager) => {
        const opened = await openRound(manager, roundId, viewer.userId);
        const { open } = await windowOf(manager, opened, viewer.userId, now());
        const derivation = await openDerivation(manager, roundId, viewer.userId, now(), open);
        const draft = await openDraft(manager, derivation.id, 'submission', now());
        return toPreview(draft, opened.frozen, await namesOfClass(manager, opened.of.id));
      });
    },

    async handIn(roundId: string, viewer: Viewer, draftVersion: number): Promise<SheetView> {
      return await change(roundId, viewer, async (manager, held) => {
        const { version, derivation } = await addHandedIn(manager, held, draftVersion, now());
        await queueCheck(manager, version.id);
        return await present(manager, held, derivation, now());
      });
    },

    async takeBack(roundId: string, viewer: Viewer): Promise<SheetView> {
      return await change(roundId, viewer, async (manager, held) => {
        const { derivation, window } = held;
        if (!window.open) throw tooLate();
        if (await isDealt(manager, derivation)) {
          throw new ProblemError('wrong-stage', { detail: 'Reviewing has begun, so this derivation stays handed in.' });
        }
        const takenBack = { currentVersionId: null, handedInAt: null, late: false };
        await manager.update(Derivation, { id: derivation.id }, takenBack);
        return await present(manager, held, { ...derivation, ...takenBack }, now());
      });
    },
  };
}

/** Makes the version that is handed in, of exactly the draft that the author was shown. */
async function addHandedIn(
  manager: EntityManager,
  held: Held,
  draftVersion: number,
  at: Date,
): Promise<{ version: DerivationVersion; derivation: Derivation }> {
  refuseClosed(held);
  const { derivation, frozen, window } = held;
  const draft = await openDraft(manager, derivation.id, 'submission', at);
  refuseStale(draft, draftVersion);
  const lines = linesOf(draft.document, [givenLine(frozen.given)]);
  if (lines.length < 2) throw nothingWritten();
  const version = await addVersion(manager, {
    derivationId: derivation.id,
    purpose: 'submission',
    document: draft.document,
    lines,
    handedInAt: at,
  });
  const handedIn = { currentVersionId: version.id, handedInAt: at, late: window.late };
  await manager.update(Derivation, { id: derivation.id }, handedIn);
  return { version, derivation: { ...derivation, ...handedIn } };
}

interface Held extends OpenedRound {
  readonly derivation: Derivation;
  readonly window: WritingWindow;
}

function refuseClosed({ derivation, window }: Held): void {
  if (derivation.currentVersionId) {
    throw new ProblemError('wrong-stage', { detail: 'This derivation is handed in. Take it back to change it.' });
  }
  if (!window.open) throw tooLate();
}

async function present(
  manager: EntityManager,
  opened: OpenedRound,
  derivation: Derivation,
  at: Date,
): Promise<SheetView> {
  const draft = await openDraft(manager, derivation.id, 'submission', at);
  const version = derivation.currentVersionId
    ? await manager.findOneByOrFail(DerivationVersion, { id: derivation.currentVersionId })
    : null;
  return toSheetView({
    ...opened,
    derivation,
    draft,
    version,
    window: await windowOf(manager, opened, derivation.authorId ?? '', at),
    dealt: await isDealt(manager, derivation),
    now: at,
  });
}

/** The time for writing, which is over for whoever has read a classmate's derivation, whatever the clock says. */
async function windowOf(
  manager: EntityManager,
  { round, extendedTo }: OpenedRound,
  studentId: string,
  at: Date,
): Promise<WritingWindow> {
  const window = writingWindow(round, extendedTo, at);
  if (!window.open || round.stage === 'writing') return window;
  const read = { roundId: round.id, reviewerId: studentId };
  const hasRead = await manager.existsBy(Review, [
    { ...read, openedAt: Not(IsNull()) },
    { ...read, draft: Not(IsNull()) },
  ]);
  return { ...window, open: !hasRead };
}

/** Whether others review it, or its author has been dealt others' derivations and may have read them. */
async function isDealt(manager: EntityManager, { id, roundId, authorId }: Derivation): Promise<boolean> {
  const own = authorId === null ? [] : [{ roundId, reviewerId: authorId }];
  return await manager.existsBy(Review, [{ derivationId: id }, ...own]);
}

async function namesOfClass(manager: EntityManager, classId: string): Promise<string[]> {
  const people = await manager
    .createQueryBuilder(User, 'person')
    .innerJoin(Membership, 'member', 'member.userId = person.id AND member.classId = :classId', { classId })
    .where('member.removedAt IS NULL')
    .getMany();
  const listed = await manager.findBy(RosterEntry, { classId });
  return [...new Set([...people, ...listed].map(({ name }) => name))].sort();
}

function toPreview({ document, version }: Draft, frozen: FrozenTask, names: readonly string[]): HandInPreview {
  return {
    draftVersion: version,
    lines: linesOf(document, [givenLine(frozen.given)]),
    emptyLines: document.content.filter((block) => stepOf(block)?.tex.trim() === '').length,
    names: namesInWords(names, wordsOf(document)),
  };
}

/** Prose, reasons, and words set within a line of maths. */
function wordsOf(document: SheetDocument): string[] {
  return document.content.flatMap((block) => {
    const step = stepOf(block);
    return step ? [step.reason, ...wordsInTex(step.tex)] : [proseOf(block)];
  });
}
