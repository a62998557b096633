import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Derivation } from '../../api/features/derivations/derivations.entity.ts';
import type { User } from '../../api/features/people/people.entity.ts';
import { Review, Score } from '../../api/features/reviews/reviews.entity.ts';
import { Round } from '../../api/features/rounds/rounds.entity.ts';
import { VerdictRecord } from '../../api/features/verdicts/verdicts.entity.ts';
import type { TodayAnswer } from '../../shared/schemas/today.ts';
import type { ClassWithPeople } from '../support/factories.ts';
import { find, handIn, listReviews, write } from '../support/round-work.ts';
import { startTestServer, type Client, type TestServer } from '../support/test-server.ts';

let server: TestServer;
let school: ClassWithPeople;
let desk: Client;
let student: Client;
let one: User;
let round: Round;

beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.stop());

beforeEach(async () => {
  school = await server.create.classWith({ students: 5 });
  desk = await server.signIn(school.teacher);
  one = school.students[0] as User;
  student = await server.signIn(one);
  const task = await server.create.task(school.teacher, { title: 'A product' });
  round = await server.create.round(school.class, task, { reviewsPerDerivation: 2 });
  server.clock.set(round.opensAt);
  await move('writing');
});

async function move(to: string, body: object = {}): Promise<void> {
  await desk.post(`/rounds/${round.id}/stage`, { to, ...body }).expect(200);
}

async function getToday(client: Client = student): Promise<TodayAnswer> {
  return (await client.get('/today').expect(200)).body;
}

async function allHandIn(): Promise<Derivation[]> {
  const made: Derivation[] = [];
  for (const { id } of school.students) {
    made.push(await handIn(server.dataSource, { roundId: round.id, authorId: id, at: server.clock.now() }));
  }
  return made;
}

/** What must not reach a student: other people, in any shape. */
function expectNobodyElse(answer: unknown, derivations: readonly Derivation[]): void {
  const text = JSON.stringify(answer);
  for (const { id, name } of school.students.slice(1)) {
    expect(text).not.toContain(id);
    expect(text).not.toContain(`"${name}"`);
  }
  for (const { id, currentVersionId, authorId } of derivations) {
    if (authorId === one.id) continue;
    expect(text).not.toContain(id);
    expect(text).not.toContain(String(currentVersionId));
  }
}

describe('for a student', () => {
  it('is open to the signed-in only, and empty for somebody without a class', async () => {
    await server.visitor().get('/today').expect(401);
    const alone = await server.signIn(await server.create.user('student', { schoolId: school.teacher.schoolId }));
    const today = await getToday(alone);
    expect(today).toMatchObject({ things: [], waiting: [], progress: null, rounds: [], joinRequests: [] });
  });

  it('asks for a derivation, and says where it was left and what cannot be read', async () => {
    const title = 'A product';
    expect((await getToday()).things).toMatchObject([
      { kind: 'write', title, begun: false, last: null, dueAt: round.writingEndsAt.toISOString() },
    ]);
    const at = server.clock.now();
    await write(server.dataSource, { roundId: round.id, authorId: one.id, at, lines: ['x^2-x-6', '(x+2', '', 'x^2+'] });
    expect((await getToday()).things).toMatchObject([
      { begun: true, last: { number: 3, tex: 'x^2+' }, unread: [2, 3], twoWays: [] },
    ]);
  });

  it('has nothing to ask once it is handed in, and says what comes next', async () => {
    await handIn(server.dataSource, { roundId: round.id, authorId: one.id, at: server.clock.now() });
    const today = await getToday();
    expect(today.things).toEqual([]);
    expect(today.waiting).toMatchObject([
      { roundId: round.id, stage: 'writing', handedIn: true, nextAt: round.writingEndsAt.toISOString() },
    ]);
  });

  it('gives a person’s own longer time', async () => {
    const until = new Date(round.writingEndsAt.getTime() + 3_600_000).toISOString();
    await desk.put(`/rounds/${round.id}/people/${one.id}/extension`, { writingEndsAt: until }).expect(204);
    expect((await getToday()).things).toMatchObject([{ kind: 'write', dueAt: until }]);
  });

  it('asks for reviews without telling whose they are', async () => {
    const derivations = await allHandIn();
    await move('reviewing');
    const mine = (await listReviews(server.dataSource, round.id)).filter(({ reviewerId }) => reviewerId === one.id);
    const today = await getToday();
    expect(today.things).toMatchObject([{ kind: 'review', dueAt: round.reviewingEndsAt.toISOString() }]);
    const [thing] = today.things;
    const reviews = thing?.kind === 'review' ? thing.reviews : [];
    expect(reviews.map(({ reviewId }) => reviewId).sort()).toEqual(mine.map(({ id }) => id).sort());
    expect(reviews.every(({ steps, state }) => steps === 2 && state === 'not-begun')).toBe(true);
    expectNobodyElse(today, derivations);
    for (const review of mine) await find(server.dataSource, review, server.clock.now());
    expect((await getToday()).things).toEqual([]);
  });

  it('asks for answers to findings that pick a step, in words only', async () => {
    const derivations = await allHandIn();
    await move('reviewing');
    const reviews = await listReviews(server.dataSource, round.id);
    const received = reviews.filter(({ derivation }) => derivation.authorId === one.id);
    await find(server.dataSource, received[0] as Review, server.clock.now(), { pick: 1, why: 'The sign turned.' });
    await find(server.dataSource, received[1] as Review, server.clock.now(), { pick: null, noFault: true });
    expect((await getToday()).things.some(({ kind }) => kind === 'answer')).toBe(false);
    await move('answering');
    const today = await getToday();
    expect(today.things).toMatchObject([
      {
        kind: 'answer',
        count: 1,
        first: { step: 1, why: 'The sign turned.' },
        dueAt: round.answeringEndsAt.toISOString(),
      },
    ]);
    expectNobodyElse(today, derivations);
    for (const { id, reviewerId } of received)
      expect(JSON.stringify(today)).not.toMatch(new RegExp(`${id}|${reviewerId}`));
  });

  it('shows nothing that depends on a verdict before the round settles, and the verdict after', async () => {
    const [own] = (await allHandIn()) as [Derivation];
    await move('reviewing');
    const before = await getToday();
    await server.dataSource.getRepository(VerdictRecord).save({
      versionId: own.currentVersionId ?? '',
      source: 'checker',
      outcome: 'faulty',
      firstFault: 2,
      steps: [],
      checkerVersion: 'test',
      ms: 1,
      createdAt: server.clock.now(),
    });
    expect(await getToday()).toEqual(before);
    await server.dataSource
      .getRepository(Round)
      .update({ id: round.id }, { stage: 'settled', settledAt: server.clock.now() });
    const [look] = (await getToday()).things;
    expect(look).toMatchObject({
      kind: 'look',
      own: { derivationId: own.id, steps: 2, outcome: 'faulty', firstFault: 2, mend: 'none' },
      contestUntil: new Date(server.clock.now().getTime() + 7 * 86_400_000).toISOString(),
    });
    server.clock.advance({ days: 8 });
    expect((await getToday()).things).toEqual([]);
  });

  it('counts how one’s own findings fared, of settled rounds only', async () => {
    await allHandIn();
    await move('reviewing');
    const mine = (await listReviews(server.dataSource, round.id)).filter(({ reviewerId }) => reviewerId === one.id);
    for (const [i, review] of mine.entries()) {
      const finding = await find(server.dataSource, review, server.clock.now(), { sureness: 7 - 3 * i });
      const outcome = i === 0 ? 'right' : 'missed';
      const row = { reviewId: review.id, findingId: finding.id, points: 1, counted: true, outcome } as const;
      await server.dataSource.getRepository(Score).save({ ...row, createdAt: server.clock.now() });
    }
    expect((await getToday()).progress).toBeNull();
    await server.dataSource
      .getRepository(Round)
      .update({ id: round.id }, { stage: 'settled', settledAt: server.clock.now() });
    expect((await getToday()).progress).toEqual({
      rounds: [{ number: round.number, right: 1, total: 2 }],
      nearlyCertain: { right: 1, total: 1 },
    });
    const other = await server.signIn(school.students[1] as User);
    expect((await getToday(other)).progress).toBeNull();
  });

  it('asks nothing of somebody who is excused', async () => {
    await desk.put(`/rounds/${round.id}/people/${one.id}/excuse`, { excused: true }).expect(204);
    expect((await getToday()).things).toEqual([]);
  });
});

describe('for a teacher', () => {
  it('lists the running rounds and the people who ask to join', async () => {
    const asking = await server.create.user('student', { schoolId: school.teacher.schoolId });
    await server.dataSource.query('insert into join_request (class_id, user_id) values ($1, $2)', [
      school.class.id,
      asking.id,
    ]);
    await allHandIn();
    const today = await getToday(desk);
    expect(today.things).toEqual([]);
    expect(today.joinRequests).toEqual([{ classId: school.class.id, className: school.class.name, count: 1 }]);
    expect(today.rounds).toMatchObject([
      { id: round.id, stage: 'writing', people: 5, handedIn: 5, title: 'A product' },
    ]);
  });
});
