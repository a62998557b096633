import type { EntityManager } from 'typeorm';
import { ownReviewingEnd, ownWritingEnd } from '../../../shared/lib/round-times.ts';
import type { QueueMail, RoundMailData } from '../mail/queue-mail.ts';
import { listRoundPeople, type RoundPerson } from './round-people.ts';
import type { Round } from './rounds.entity.ts';

/** Writes the mails of a stage change in its transaction; the same mail to the same person is written once. */
export function createRoundMail(queueMail: QueueMail) {
  async function toData(manager: EntityManager, round: Round): Promise<Omit<RoundMailData, 'name'>> {
    const [row]: { class_name: string; time_zone: string; title: string }[] = await manager.query(
      `select c.name as class_name, c.time_zone, coalesce(r.frozen->>'title', t.title) as title
         from round r join class c on c.id = r.class_id join task t on t.id = r.task_id where r.id = $1`,
      [round.id],
    );
    if (!row) throw new Error(`Round ${round.id} is gone`);
    return { className: row.class_name, timeZone: row.time_zone, taskTitle: row.title, roundId: round.id };
  }

  return {
    async writingOpened(manager: EntityManager, round: Round): Promise<number> {
      const data = await toData(manager, round);
      const people = (await listRoundPeople(manager, round)).filter(({ excused }) => !excused);
      for (const { userId, name, extension } of people) {
        const endsAt = ownWritingEnd(round, extension);
        const dedupeKey = `writing-opened:${round.id}:${userId}`;
        await queueMail(manager, { kind: 'writing-opened', userId, dedupeKey, data: { ...data, name, endsAt } });
      }
      return people.length;
    },

    /** To everybody who has reviews to do and was not told yet. */
    async reviewingOpened(manager: EntityManager, round: Round): Promise<number> {
      return await mailReviewers(manager, round, 'reviewing-opened', await listReviewers(manager, round.id, false));
    },

    /** To everybody with a review that is not handed in, once for each end of reviewing. */
    async reviewDue(manager: EntityManager, round: Round): Promise<number> {
      return await mailReviewers(manager, round, 'review-due', await listReviewers(manager, round.id, true));
    },

    /** One mail an author, however many findings there are. */
    async findingsToAnswer(manager: EntityManager, round: Round): Promise<number> {
      const data = await toData(manager, round);
      const authors: { user_id: string; name: string; derivation_id: string }[] = await manager.query(AUTHORS_SQL, [
        round.id,
      ]);
      for (const { user_id: userId, name, derivation_id: derivationId } of authors) {
        await queueMail(manager, {
          kind: 'findings-to-answer',
          userId,
          dedupeKey: `findings-to-answer:${round.id}:${userId}`,
          data: { ...data, name, derivationId, endsAt: round.answeringEndsAt },
        });
      }
      return authors.length;
    },

    async settled(manager: EntityManager, round: Round): Promise<number> {
      const data = await toData(manager, round);
      const people: { user_id: string; name: string }[] = await manager.query(TAKEN_PART_SQL, [round.id]);
      for (const { user_id: userId, name } of people) {
        const dedupeKey = `round-settled:${round.id}:${userId}`;
        await queueMail(manager, { kind: 'round-settled', userId, dedupeKey, data: { ...data, name } });
      }
      return people.length;
    },
  };

  async function mailReviewers(
    manager: EntityManager,
    round: Round,
    kind: 'reviewing-opened' | 'review-due',
    reviewers: ReadonlySet<string>,
  ): Promise<number> {
    const data = await toData(manager, round);
    const people: RoundPerson[] = await listRoundPeople(manager, round);
    for (const { userId, name, extension } of people.filter((person) => reviewers.has(person.userId))) {
      const endsAt = ownReviewingEnd(round, extension);
      const dedupeKey = `${kind}:${round.id}:${userId}:${kind === 'review-due' ? endsAt.getTime() : ''}`;
      await queueMail(manager, { kind, userId, dedupeKey, data: { ...data, name, endsAt } });
    }
    return reviewers.size;
  }
}
export type RoundMail = ReturnType<typeof createRoundMail>;

async function listReviewers(manager: EntityManager, roundId: string, onlyOpen: boolean): Promise<Set<string>> {
  const rows: { user_id: string }[] = await manager.query(REVIEWERS_SQL, [roundId, onlyOpen]);
  return new Set(rows.map(({ user_id }) => user_id));
}

const REVIEWERS_SQL = `
  select distinct r.reviewer_id as user_id from review r
   where r.round_id = $1 and r.set_aside is null
     and not exists (select 1 from excuse x where x.round_id = r.round_id and x.user_id = r.reviewer_id)
     and (not $2 or not exists (select 1 from finding f where f.review_id = r.id and f.taken_back_at is null))`;

/** Every author of whose derivation a step was marked, whether or not that is right. */
const AUTHORS_SQL = `
  select distinct p.id as user_id, p.name, d.id as derivation_id
    from derivation d join person p on p.id = d.author_id
    join review r on r.derivation_id = d.id
    join finding f on f.review_id = r.id and f.taken_back_at is null and f.pick is not null
   where d.round_id = $1 and d.kind = 'own'`;

const TAKEN_PART_SQL = `
  select p.id as user_id, p.name from person p
   where p.disabled_at is null and p.id in (
     select d.author_id from derivation d where d.round_id = $1 and d.current_version_id is not null
     union select r.reviewer_id from review r where r.round_id = $1)`;
