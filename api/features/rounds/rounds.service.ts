import type { DataSource, EntityManager } from 'typeorm';
import type {
  RoundAnswer,
  RoundChange,
  RoundChoices,
  RoundForm,
  RoundListItem,
  StageMove,
  StagePreview,
} from '../../../shared/schemas/round.ts';
import { INSTANTS } from '../../../shared/schemas/round.ts';
import { notFound, ProblemError } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import type { Now } from '../../lib/clock.ts';
import { Class } from '../classes/classes.entity.ts';
import { Task } from '../tasks/tasks.entity.ts';
import { toRoundAnswer } from './round-answer.ts';
import { getStaffRound } from './round-access.ts';
import { listRounds, listRoundChoices } from './round-lists.ts';
import { previewNext } from './round-preview.ts';
import { createRoundRecord } from './round-record.ts';
import type { RoundStages } from './round-stages.ts';
import { Round } from './rounds.entity.ts';

export interface RoundsDeps {
  readonly db: DataSource;
  readonly now: Now;
  readonly stages: RoundStages;
}
export type RoundsService = ReturnType<typeof createRoundsService>;

/** Planning, changing and moving rounds; a round is open to the staff of its class only. */
export function createRoundsService({ db, now, stages }: RoundsDeps) {
  const record = createRoundRecord(now);

  return {
    listRounds: (viewer: Viewer, classId: string | null): Promise<RoundListItem[]> =>
      listRounds(db.manager, viewer.userId, classId),

    listChoices: (viewer: Viewer): Promise<RoundChoices> => listRoundChoices(db.manager, viewer.userId),

    async getRound(viewer: Viewer, roundId: string): Promise<RoundAnswer> {
      return await toRoundAnswer(db.manager, await getStaffRound(db.manager, viewer, roundId));
    },

    async planRound(viewer: Viewer, form: RoundForm): Promise<{ id: string }> {
      refusePast(form.writingEndsAt, now(), '/writingEndsAt');
      return await db.transaction(async (manager) => {
        // The class's row is held so that two rounds planned at once get two numbers.
        const schoolClass = await lockOwnClass(manager, viewer, form.classId);
        await refuseForeignTask(manager, viewer, form.taskId);
        const [last]: { number: number }[] = await manager.query(
          'select coalesce(max(number), 0)::int as number from round where class_id = $1',
          [form.classId],
        );
        const round = await manager.save(
          manager.create(Round, {
            ...toColumns(form),
            classId: form.classId,
            taskId: form.taskId,
            schoolId: schoolClass.schoolId,
            number: (last?.number ?? 0) + 1,
            createdById: viewer.userId,
            createdAt: now(),
          }),
        );
        await stages.schedule(manager, round);
        await record(manager, viewer, round, 'round.planned', { before: null, after: toFacts(round), reason: '' });
        return { id: round.id };
      });
    },

    /** While planned everything changes; later the instants that have not passed, and what dealing has not used yet. */
    async changeRound(viewer: Viewer, roundId: string, form: RoundChange): Promise<RoundAnswer> {
      return await db.transaction(async (manager) => {
        const staff = await getStaffRound(manager, viewer, roundId, { teacherOnly: true, lock: true });
        const { round } = staff;
        if (round.version !== form.version) {
          throw new ProblemError('conflict', {
            detail: 'This round has changed in the meantime. Look at it again before you save.',
            extra: { current: await toRoundAnswer(manager, staff) },
          });
        }
        refuseFixedChanges(round, form, now());
        if (form.taskId !== round.taskId) await refuseForeignTask(manager, viewer, form.taskId);
        const before = toFacts(round);
        await manager.save(
          Object.assign(round, { ...toColumns(form), taskId: form.taskId, version: round.version + 1 }),
        );
        await stages.schedule(manager, round);
        await record(manager, viewer, round, 'round.changed', { before, after: toFacts(round), reason: '' });
        return await toRoundAnswer(manager, await getStaffRound(manager, viewer, roundId));
      });
    },

    async deleteRound(viewer: Viewer, roundId: string): Promise<void> {
      await db.transaction(async (manager) => {
        const { round } = await getStaffRound(manager, viewer, roundId, { teacherOnly: true, lock: true });
        if (round.stage !== 'planned') {
          throw new ProblemError('wrong-stage', { detail: 'A round that has opened cannot be deleted.' });
        }
        await manager.delete(Round, { id: round.id });
        await record(manager, viewer, round, 'round.deleted', { before: toFacts(round), after: null, reason: '' });
      });
    },

    async previewNext(viewer: Viewer, roundId: string): Promise<StagePreview> {
      const { round } = await getStaffRound(db.manager, viewer, roundId, { teacherOnly: true });
      return await previewNext(db.manager, round, now());
    },

    async moveByHand(viewer: Viewer, roundId: string, { to, force, reason }: StageMove): Promise<RoundAnswer> {
      await getStaffRound(db.manager, viewer, roundId, { teacherOnly: true });
      await stages.moveStage(roundId, to, { by: viewer.userId, force, reason });
      return await toRoundAnswer(db.manager, await getStaffRound(db.manager, viewer, roundId));
    },
  };
}

function toColumns(form: Omit<RoundChange, 'version' | 'taskId'>) {
  return {
    opensAt: new Date(form.opensAt),
    writingEndsAt: new Date(form.writingEndsAt),
    reviewingEndsAt: new Date(form.reviewingEndsAt),
    answeringEndsAt: new Date(form.answeringEndsAt),
    settlesAt: new Date(form.settlesAt),
    reviewsPerDerivation: form.reviewsPerDerivation,
    lateRule: form.lateRule,
  };
}

/** What of a round's plan may touch a mark, for the trail. */
function toFacts(round: Round) {
  const instants = Object.fromEntries(INSTANTS.map((name) => [name, round[name].toISOString()]));
  const { taskId, reviewsPerDerivation, lateRule } = round;
  return { ...instants, taskId, reviewsPerDerivation, lateRule };
}

function refusePast(instant: string, now: Date, pointer: string): void {
  if (Date.parse(instant) > now.getTime()) return;
  throw new ProblemError('invalid-fields', { errors: [{ pointer, detail: 'This time has passed already.' }] });
}

const PASSED: Record<Round['stage'], number> = { planned: 0, writing: 1, reviewing: 2, answering: 3, settled: 5 };

/** @throws {ProblemError} naming each field that the running round no longer lets change. */
function refuseFixedChanges(round: Round, form: RoundChange, now: Date): void {
  if (round.stage === 'settled') throw new ProblemError('wrong-stage', { detail: 'A settled round stays as it is.' });
  const errors = INSTANTS.slice(0, PASSED[round.stage])
    .filter((name) => Date.parse(form[name]) !== round[name].getTime())
    .map((name) => ({ pointer: `/${name}`, detail: 'This has happened already.' }));
  if (round.stage !== 'planned' && form.taskId !== round.taskId) {
    errors.push({ pointer: '/taskId', detail: 'The task was fixed when the round opened.' });
  }
  if (PASSED[round.stage] >= 2 && form.reviewsPerDerivation !== round.reviewsPerDerivation) {
    errors.push({ pointer: '/reviewsPerDerivation', detail: 'The derivations have been dealt already.' });
  }
  const next = INSTANTS[Math.max(1, PASSED[round.stage])];
  if (next && Date.parse(form[next]) <= now.getTime()) {
    const isUnchanged = Date.parse(form[next]) === round[next].getTime() && round.stage !== 'planned';
    if (!isUnchanged) errors.push({ pointer: `/${next}`, detail: 'This time has passed already.' });
  }
  if (errors.length > 0) throw new ProblemError('invalid-fields', { errors });
}

async function lockOwnClass(manager: EntityManager, viewer: Viewer, classId: string): Promise<Class> {
  const [row]: { id: string }[] = await manager.query(
    `select c.id from class c where c.id = $1 and c.archived_at is null and exists (
       select 1 from membership m
        where m.class_id = c.id and m.user_id = $2 and m.role = 'teacher' and m.removed_at is null)
     for no key update`,
    [classId, viewer.userId],
  );
  if (!row) throw notFound();
  return await manager.findOneByOrFail(Class, { id: classId });
}

async function refuseForeignTask(manager: EntityManager, viewer: Viewer, taskId: string): Promise<void> {
  if (await manager.existsBy(Task, { id: taskId, ownerId: viewer.userId })) return;
  throw new ProblemError('invalid-fields', { errors: [{ pointer: '/taskId', detail: 'Choose one of your tasks.' }] });
}
