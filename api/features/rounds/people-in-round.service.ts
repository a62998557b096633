import { IsNull, type DataSource, type EntityManager } from 'typeorm';
import type { z } from 'zod';
import type { excuseSchema, ExtensionForm } from '../../../shared/schemas/round.ts';
import { notFound, ProblemError } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import type { Now } from '../../lib/clock.ts';
import { Membership } from '../classes/classes.entity.ts';
import { releaseReviews } from './dealing.ts';
import { getStaffRound } from './round-access.ts';
import { createRoundRecord } from './round-record.ts';
import { Excuse, Extension, Round } from './rounds.entity.ts';

export interface PeopleInRoundDeps {
  readonly db: DataSource;
  readonly now: Now;
}
export type PeopleInRoundService = ReturnType<typeof createPeopleInRoundService>;

/** More time for one person, and people who are excused. */
export function createPeopleInRoundService({ db, now }: PeopleInRoundDeps) {
  const record = createRoundRecord(now);

  return {
    /** One person's own time; whoever gets more time to write gives back reviews that were dealt and not begun. */
    async extend(viewer: Viewer, roundId: string, userId: string, form: ExtensionForm): Promise<void> {
      await db.transaction(async (manager) => {
        const { round } = await getStaffRound(manager, viewer, roundId, { teacherOnly: true, lock: true });
        await getStudent(manager, round, userId);
        const values = {
          writingEndsAt: form.writingEndsAt ? new Date(form.writingEndsAt) : null,
          reviewingEndsAt: form.reviewingEndsAt ? new Date(form.reviewingEndsAt) : null,
          reason: form.reason,
        };
        refuseExtension(round, values, now());
        const before = await manager.findOneBy(Extension, { roundId, userId });
        const hadWriting = before?.writingEndsAt ?? null;
        if (values.writingEndsAt && round.stage === 'reviewing') await refuseReader(manager, roundId, userId);
        await manager.upsert(Extension, { ...values, roundId, userId, createdById: viewer.userId, createdAt: now() }, [
          'roundId',
          'userId',
        ]);
        if (values.writingEndsAt && !hadWriting && round.stage === 'reviewing') {
          await releaseReviews(manager, round, userId, now());
          // Their derivation still has to be dealt, so a late batch that has gone out is not the last one.
          await manager.update(Round, { id: round.id }, { lateDealtAt: null });
        }
        await record(manager, viewer, round, 'round.extended', {
          before: before && { writingEndsAt: before.writingEndsAt, reviewingEndsAt: before.reviewingEndsAt },
          after: { userId, ...values },
          reason: form.reason,
        });
      });
    },

    async endExtension(viewer: Viewer, roundId: string, userId: string): Promise<void> {
      await db.transaction(async (manager) => {
        const { round } = await getStaffRound(manager, viewer, roundId, { teacherOnly: true, lock: true });
        const { affected } = await manager.delete(Extension, { roundId, userId });
        if (!affected) throw notFound();
        await record(manager, viewer, round, 'round.extension-ended', { before: { userId }, after: null, reason: '' });
      });
    },

    /** An excused person's missing work counts for nothing, and the reviews they have not begun go to others. */
    async excuse(viewer: Viewer, roundId: string, userId: string, form: z.infer<typeof excuseSchema>): Promise<void> {
      await db.transaction(async (manager) => {
        const { round } = await getStaffRound(manager, viewer, roundId, { teacherOnly: true, lock: true });
        await getStudent(manager, round, userId);
        if (round.stage === 'settled') {
          throw new ProblemError('wrong-stage', { detail: 'The round is settled: excuse people before that.' });
        }
        const was = await manager.existsBy(Excuse, { roundId, userId });
        if (was === form.excused) return;
        if (form.excused) {
          const { reason } = form;
          await manager.insert(Excuse, { roundId, userId, reason, createdById: viewer.userId, createdAt: now() });
          if (round.stage === 'reviewing') await releaseReviews(manager, round, userId, now());
        } else await manager.delete(Excuse, { roundId, userId });
        await record(manager, viewer, round, form.excused ? 'round.excused' : 'round.excuse-ended', {
          before: { userId, excused: was },
          after: { userId, excused: form.excused },
          reason: form.reason,
        });
      });
    },
  };
}

async function getStudent(manager: EntityManager, round: Round, userId: string): Promise<void> {
  const where = { classId: round.classId, userId, role: 'student' as const, removedAt: IsNull() };
  if (!(await manager.existsBy(Membership, where))) throw notFound();
}

function refuseExtension(
  round: Round,
  own: { writingEndsAt: Date | null; reviewingEndsAt: Date | null },
  now: Date,
): void {
  const errors: { pointer: string; detail: string }[] = [];
  const say = (pointer: string, detail: string) => errors.push({ pointer, detail });
  if (round.stage === 'answering' || round.stage === 'settled') {
    throw new ProblemError('wrong-stage', { detail: 'Writing and reviewing are over in this round.' });
  }
  if (own.writingEndsAt) {
    if (own.writingEndsAt <= now) say('/writingEndsAt', 'This time has passed already.');
    else if (own.writingEndsAt <= round.writingEndsAt) say('/writingEndsAt', 'This is no longer than for everyone.');
    else if (own.writingEndsAt >= round.reviewingEndsAt) {
      say('/writingEndsAt', 'Nobody could review it: choose a time before reviewing ends.');
    }
  }
  if (own.reviewingEndsAt) {
    if (own.reviewingEndsAt <= round.reviewingEndsAt) say('/reviewingEndsAt', 'This is no longer than for everyone.');
    else if (own.reviewingEndsAt >= round.answeringEndsAt) {
      say('/reviewingEndsAt', 'The author could not answer: choose a time before answering ends.');
    }
  }
  if (errors.length > 0) throw new ProblemError('invalid-fields', { errors });
}

/** While others review, more time to write is for people who have neither handed in nor read a classmate's derivation. */
async function refuseReader(manager: EntityManager, roundId: string, userId: string): Promise<void> {
  const [row]: { handed_in: boolean; has_read: boolean }[] = await manager.query(
    `select exists (select 1 from derivation where round_id = $1 and author_id = $2
                     and current_version_id is not null) as handed_in,
            exists (select 1 from review where round_id = $1 and reviewer_id = $2
                     and (opened_at is not null or draft is not null)) as has_read`,
    [roundId, userId],
  );
  if (row?.handed_in) throw new ProblemError('conflict', { detail: 'This person has handed in already.' });
  if (row?.has_read) {
    throw new ProblemError('conflict', {
      detail: 'This person has opened a review already, so writing is over for them.',
    });
  }
}
