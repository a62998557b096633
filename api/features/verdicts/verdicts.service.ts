import type { DataSource, EntityManager } from 'typeorm';
import type { TryTask } from '../../../shared/schemas/derivation.ts';
import type { DerivationInput, Verdict } from '../../../shared/schemas/verdict.ts';
import type { Now } from '../../lib/clock.ts';
import { lockRound } from '../../lib/lock-round.ts';
import type { Queue } from '../../lib/queue.ts';
import { Derivation, DerivationVersion } from '../derivations/derivations.entity.ts';
import { Score } from '../reviews/reviews.entity.ts';
import { Round } from '../rounds/rounds.entity.ts';
import { toCheckInput } from './check-input.ts';
import { VerdictRecord } from './verdicts.entity.ts';

export const CHECK_JOB = 'check-derivation';

export interface VerdictsDeps {
  readonly db: DataSource;
  readonly now: Now;
  readonly queue: Pick<Queue, 'enqueueInTransaction'>;
  /** Checks in a worker, within its limits. */
  readonly check: (input: DerivationInput) => Promise<Verdict & { readonly ms: number }>;
  /** Names the rules that a verdict was found by. */
  readonly checkerVersion: string;
}

export type VerdictsService = ReturnType<typeof createVerdictsService>;

/** Verdicts on what was handed in. They are only ever added, and leave only through those who may show them. */
export function createVerdictsService({ db, now, queue, check, checkerVersion }: VerdictsDeps) {
  return {
    /** Writes the check of a version into the caller's transaction. */
    async queueCheck(manager: EntityManager, versionId: string): Promise<void> {
      await queue.enqueueInTransaction(manager, CHECK_JOB, { versionId }, { key: versionId });
    },

    /** The latest ruling on a version, else the checker's latest verdict. */
    async currentVerdict(manager: EntityManager, versionId: string): Promise<VerdictRecord | null> {
      return await manager
        .createQueryBuilder(VerdictRecord, 'verdict')
        .where('verdict.versionId = :versionId', { versionId })
        .orderBy("(verdict.source = 'ruling')", 'DESC')
        .addOrderBy('verdict.createdAt', 'DESC')
        .limit(1)
        .getOne();
    },

    /** Checks without keeping anything. */
    async checkNow(input: DerivationInput): Promise<Verdict> {
      return toVerdict(await check(input));
    },

    /** A teacher's model derivation on a task that may not be saved yet. */
    async tryTask({ given, lines, ...terms }: TryTask): Promise<Verdict> {
      const written = [given, ...lines].map((tex) => ({ tex, uses: null }));
      return toVerdict(await check(toCheckInput(terms, written)));
    },

    /** Checks a version unless this checker has done so already, or its findings were scored without. */
    async checkVersion(versionId: string): Promise<void> {
      const found = await findInput(db.manager, versionId);
      // A version whose round has been deleted in the meantime needs no verdict.
      if (!found || (await isChecked(db.manager, versionId, checkerVersion))) return;
      const verdict = await check(found.input);
      await db.transaction(async (manager) => {
        // A settled round does not change by itself: what was undecided then stays so until a teacher acts.
        await lockRound(manager, found.roundId, 'read');
        if (await isScored(manager, versionId)) return;
        // Two runs of one job at once would both have found nothing: the row's lock lets one of them write.
        await manager.findOne(DerivationVersion, { where: { id: versionId }, lock: { mode: 'pessimistic_write' } });
        if (await isChecked(manager, versionId, checkerVersion)) return;
        await manager.insert(VerdictRecord, {
          versionId,
          source: 'checker',
          rulingId: null,
          outcome: verdict.outcome,
          firstFault: verdict.firstFault,
          steps: verdict.steps as object[],
          checkerVersion,
          ms: verdict.ms,
          createdAt: now(),
        });
      });
    },
  };
}

function toVerdict({ outcome, firstFault, steps }: Verdict): Verdict {
  return { outcome, firstFault, steps };
}

async function isChecked(manager: EntityManager, versionId: string, checkerVersion: string): Promise<boolean> {
  return await manager.existsBy(VerdictRecord, { versionId, source: 'checker', checkerVersion });
}

async function isScored(manager: EntityManager, versionId: string): Promise<boolean> {
  return await manager.existsBy(Score, { review: { versionId } });
}

async function findInput(
  manager: EntityManager,
  versionId: string,
): Promise<{ input: DerivationInput; roundId: string } | null> {
  const version = await manager.findOneBy(DerivationVersion, { id: versionId });
  const derivation = version && (await manager.findOneBy(Derivation, { id: version.derivationId }));
  const round = derivation && (await manager.findOneBy(Round, { id: derivation.roundId }));
  return round?.frozen && version ? { input: toCheckInput(round.frozen, version.lines), roundId: round.id } : null;
}
