import { IsNull, type DataSource, type EntityManager } from 'typeorm';
import type { AnswerForm } from '../../../shared/schemas/finding.ts';
import type { AuthorDerivation, TeacherDerivation } from '../../../shared/schemas/review.ts';
import { GRACE_MS } from '../../../shared/lib/round-times.ts';
import { notFound, ProblemError } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import { contestEndsAt } from '../../lib/contest-window.ts';
import { lockRound } from '../../lib/lock-round.ts';
import { Membership } from '../classes/classes.entity.ts';
import { Derivation, DerivationVersion } from '../derivations/derivations.entity.ts';
import { Dispute } from '../disputes/disputes.entity.ts';
import type { Round } from '../rounds/rounds.entity.ts';
import { Finding, type Review } from '../reviews/reviews.entity.ts';
import { saveAnswer, syncDispute } from './contested-findings.ts';
import { findAuthorView, findTeacherView, type ViewDeps } from './derivation-views.ts';

export interface AnswersDeps extends ViewDeps {
  readonly db: DataSource;
}

export type AnswersService = ReturnType<typeof createAnswersService>;

const UUID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/i;

/** What an author does with the findings on the own derivation; and the same derivation from the teacher's side. */
export function createAnswersService(deps: AnswersDeps) {
  const { db, now } = deps;

  async function read(viewer: Viewer, derivationId: string): Promise<AuthorDerivation | TeacherDerivation> {
    const { manager } = db;
    const derivation = await manager.findOne(Derivation, {
      where: { id: derivationId },
      relations: { round: { class: true } },
    });
    if (!derivation?.round) throw notFound();
    if (derivation.authorId === viewer.userId) return await findAuthorView(deps, manager, derivation);
    const member = await manager.findOneBy(Membership, {
      classId: derivation.round.classId,
      userId: viewer.userId,
      removedAt: IsNull(),
    });
    const seesNames =
      member?.role === 'teacher' || (member?.role === 'assistant' && derivation.round.class?.assistantsSeeNames);
    if (!seesNames) throw notFound();
    return await findTeacherView(deps, manager, derivation);
  }

  async function answer(viewer: Viewer, authorKey: string, form: AnswerForm): Promise<void> {
    if (!UUID.test(authorKey)) throw notFound();
    await db.transaction(async (manager) => {
      const { finding, review } = await getOwnFinding(manager, authorKey, viewer);
      requireAnswering(await lockRound(manager, review.roundId, 'read'));
      // Two windows at once: the second waits here, and changes the answer of the first.
      await manager.findOneOrFail(Finding, { where: { id: finding.id }, lock: { mode: 'pessimistic_write' } });
      await saveAnswer(manager, finding.id, form, now());
      await syncDispute(deps, manager, { finding, review }, form, viewer.userId);
    });
  }

  async function contestVerdict(
    viewer: Viewer,
    derivationId: string,
    step: number,
    words: string,
  ): Promise<AuthorDerivation> {
    return await db.transaction(async (manager) => {
      const derivation = await getOwn(manager, derivationId, viewer);
      const { settledAt, stage } = await lockRound(manager, derivation.roundId, 'write');
      if (stage !== 'settled' || !settledAt)
        throw new ProblemError('wrong-stage', { detail: 'The round is not settled yet.' });
      if (now() > contestEndsAt(settledAt))
        throw new ProblemError('too-late', { detail: 'The week for contesting is over.' });
      const versionId = await getVersionId(manager, derivation, step);
      if (await manager.existsBy(Dispute, { versionId, raisedById: viewer.userId, closedAt: IsNull() })) {
        throw new ProblemError('conflict', {
          detail: 'You have contested this already; your teacher will look at it.',
        });
      }
      await manager.insert(Dispute, {
        roundId: derivation.roundId,
        versionId,
        kind: 'contested-verdict',
        step,
        raisedById: viewer.userId,
        words,
        openedAt: now(),
      });
      return await findAuthorView(deps, manager, derivation);
    });
  }

  async function answerQuestion(viewer: Viewer, derivationId: string, text: string): Promise<AuthorDerivation> {
    return await db.transaction(async (manager) => {
      const derivation = await getOwn(manager, derivationId, viewer);
      const round = await lockRound(manager, derivation.roundId, 'write');
      const asked = await findAsked(manager, derivation);
      if (round.stage !== 'settled' || !asked)
        throw new ProblemError('conflict', { detail: 'There is no question open.' });
      await manager.update(Dispute, asked.id, { questionAnswer: text });
      return await findAuthorView(deps, manager, derivation);
    });
  }

  function requireAnswering(round: Round): void {
    if (round.stage !== 'answering') throw new ProblemError('wrong-stage', { detail: 'Answering is not open.' });
    if (now().getTime() > round.answeringEndsAt.getTime() + GRACE_MS)
      throw new ProblemError('too-late', { detail: 'Answering has ended.' });
  }

  return { read, answer, contestVerdict, answerQuestion };
}

async function getOwn(manager: EntityManager, derivationId: string, viewer: Viewer): Promise<Derivation> {
  const derivation = await manager.findOne(Derivation, {
    where: { id: derivationId, authorId: viewer.userId },
    relations: { round: { class: true } },
  });
  if (!derivation) throw notFound();
  return derivation;
}

/** @throws {ProblemError} not-found unless the finding is in force and on the viewer's own derivation, once answering is open. */
async function getOwnFinding(
  manager: EntityManager,
  authorKey: string,
  viewer: Viewer,
): Promise<{ finding: Finding; review: Review }> {
  const finding = await manager.findOne(Finding, {
    where: { authorKey, takenBackAt: IsNull(), review: { derivation: { authorId: viewer.userId } } },
    relations: { review: { round: true } },
  });
  const review = finding?.review;
  // Before answering opens, a finding is not there for its author.
  if (!review || !['answering', 'settled'].includes(review.round?.stage ?? '')) throw notFound();
  const last = await manager.findOne(Finding, {
    where: { reviewId: review.id, takenBackAt: IsNull() },
    order: { handedInAt: 'DESC', id: 'DESC' },
  });
  if (last?.id !== finding.id) throw notFound();
  return { finding, review };
}

async function getVersionId(manager: EntityManager, derivation: Derivation, step: number): Promise<string> {
  if (!derivation.currentVersionId) throw new ProblemError('wrong-stage', { detail: 'Nothing was handed in.' });
  const version = await manager.findOneByOrFail(DerivationVersion, { id: derivation.currentVersionId });
  if (step >= version.lines.length) {
    throw new ProblemError('invalid-fields', { errors: [{ pointer: '/step', detail: 'There is no such step.' }] });
  }
  return version.id;
}

async function findAsked(manager: EntityManager, derivation: Derivation): Promise<Dispute | null> {
  if (!derivation.currentVersionId) return null;
  return await manager
    .createQueryBuilder(Dispute, 'dispute')
    .where('dispute.versionId = :versionId', { versionId: derivation.currentVersionId })
    .andWhere('dispute.closedAt is null and dispute.question is not null and dispute.questionAnswer is null')
    .orderBy('dispute.openedAt', 'ASC')
    .getOne();
}
