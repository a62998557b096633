import { randomUUID } from 'node:crypto';
import type { DataSource, EntityManager } from 'typeorm';
import type { MendHandedIn, MendView, SaveAnswer, SaveSheet } from '../../../shared/schemas/derivation.ts';
import { linesOf, type HandedInLine, type SheetDocument } from '../../../shared/schemas/sheet.ts';
import type { FrozenTask } from '../../../shared/schemas/task.ts';
import { notFound, ProblemError } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import type { Now } from '../../lib/clock.ts';
import { Class } from '../classes/classes.entity.ts';
import { Round } from '../rounds/rounds.entity.ts';
import type { VerdictRecord } from '../verdicts/verdicts.entity.ts';
import { Derivation, DerivationVersion, type Draft } from './derivations.entity.ts';
import { addVersion, holdDerivation, nothingWritten, openDraft, refuseStale, saveDraft } from './drafts.ts';
import { toSavedDraft, toSheetTask } from './sheet.presenter.ts';

export interface MendDeps {
  readonly db: DataSource;
  readonly now: Now;
  readonly queueCheck: (manager: EntityManager, versionId: string) => Promise<void>;
  readonly currentVerdict: (manager: EntityManager, versionId: string) => Promise<VerdictRecord | null>;
}

export type MendService = ReturnType<typeof createMendService>;

/** The author's corrected derivation, from the first fault on; open once the round is settled, and never before. */
export function createMendService({ db, now, queueCheck, currentVerdict }: MendDeps) {
  async function open(manager: EntityManager, derivationId: string, viewer: Viewer): Promise<Mendable> {
    const { derivation, round, frozen } = await findSettled(manager, derivationId, viewer);
    const { currentVersionId } = derivation;
    const verdict = currentVersionId && (await currentVerdict(manager, currentVersionId));
    if (!currentVersionId || !verdict || verdict.firstFault === null) {
      throw new ProblemError('wrong-stage', { detail: 'There is no first fault in this derivation to mend.' });
    }
    const version = await manager.findOneByOrFail(DerivationVersion, { id: currentVersionId });
    const { firstFault } = verdict;
    const of = await manager.findOneByOrFail(Class, { id: round.classId });
    const mendable = {
      derivation,
      frozen,
      firstFault,
      timeZone: of.timeZone,
      fixed: version.lines.slice(0, firstFault),
      written: version.lines.slice(firstFault),
    };
    const draft = await openDraft(manager, derivationId, 'mend', now(), toFirstDocument(mendable.written));
    return { ...mendable, draft };
  }

  const present = (manager: EntityManager, mendable: Mendable) => toMendView(manager, mendable, currentVerdict);

  return {
    async readMend(derivationId: string, viewer: Viewer): Promise<MendView> {
      return await db.transaction(async (manager) => present(manager, await open(manager, derivationId, viewer)));
    },

    async save(derivationId: string, viewer: Viewer, body: SaveSheet): Promise<SaveAnswer> {
      return await db.transaction(async (manager) => {
        await findSettled(manager, derivationId, viewer);
        await holdDerivation(manager, derivationId);
        const { draft } = await open(manager, derivationId, viewer);
        return await saveDraft(manager, draft, body, now());
      });
    },

    async handIn(derivationId: string, viewer: Viewer, draftVersion: number): Promise<MendView> {
      return await db.transaction(async (manager) => {
        await findSettled(manager, derivationId, viewer);
        await holdDerivation(manager, derivationId);
        const mendable = await open(manager, derivationId, viewer);
        const version = await addMend(manager, mendable, draftVersion, now());
        await queueCheck(manager, version.id);
        return await present(manager, mendable);
      });
    },
  };
}

async function addMend(
  manager: EntityManager,
  { draft, fixed }: Mendable,
  draftVersion: number,
  at: Date,
): Promise<DerivationVersion> {
  refuseStale(draft, draftVersion);
  const lines = linesOf(draft.document, fixed);
  if (lines.length === fixed.length) throw nothingWritten();
  const { derivationId, document } = draft;
  return await addVersion(manager, { derivationId, purpose: 'mend', document, lines, handedInAt: at });
}

async function toMendView(
  manager: EntityManager,
  mendable: Mendable,
  currentVerdict: MendDeps['currentVerdict'],
): Promise<MendView> {
  const { derivation, draft, frozen, firstFault, timeZone, fixed, written } = mendable;
  return {
    derivationId: derivation.id,
    timeZone,
    task: toSheetTask(frozen),
    firstFault,
    fixed,
    written,
    draft: toSavedDraft(draft),
    handedIn: await findHandedIn(manager, derivation.id, currentVerdict),
  };
}

async function findHandedIn(
  manager: EntityManager,
  derivationId: string,
  currentVerdict: MendDeps['currentVerdict'],
): Promise<MendHandedIn | null> {
  const last = await manager.findOne(DerivationVersion, {
    where: { derivationId, purpose: 'mend' },
    order: { number: 'DESC' },
  });
  if (!last) return null;
  const verdict = await currentVerdict(manager, last.id);
  return {
    number: last.number,
    at: last.handedInAt.toISOString(),
    lines: last.lines,
    verdict: verdict && { outcome: verdict.outcome, firstFault: verdict.firstFault, steps: verdict.steps },
  };
}

interface Mendable {
  readonly derivation: Derivation;
  readonly draft: Draft;
  readonly frozen: FrozenTask;
  readonly firstFault: number;
  readonly timeZone: string;
  readonly fixed: readonly HandedInLine[];
  readonly written: readonly HandedInLine[];
}

/** The own derivation in a settled round; anything else answers as if it did not exist. */
async function findSettled(
  manager: EntityManager,
  derivationId: string,
  viewer: Viewer,
): Promise<{ derivation: Derivation; round: Round; frozen: FrozenTask }> {
  const derivation = await manager.findOneBy(Derivation, { id: derivationId, authorId: viewer.userId });
  if (!derivation) throw notFound();
  const round = await manager.findOneByOrFail(Round, { id: derivation.roundId });
  if (!round.frozen) throw notFound();
  if (round.stage !== 'settled') {
    throw new ProblemError('wrong-stage', { detail: 'A mend can be written when the round is settled.' });
  }
  return { derivation, round, frozen: round.frozen };
}

/** A mend begins with what was written from the fault on, under new step ids. */
function toFirstDocument(written: readonly HandedInLine[]): SheetDocument {
  return {
    type: 'doc',
    content: written.slice(0, 1).map(({ tex, reason }) => ({
      type: 'step',
      attrs: { stepId: randomUUID(), tex, reason, uses: null },
    })),
  };
}
