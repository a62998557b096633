import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Dispute } from '../../api/features/disputes/disputes.entity.ts';
import { OutgoingMail } from '../../api/features/mail/mail.entity.ts';
import type { User } from '../../api/features/people/people.entity.ts';
import { Review } from '../../api/features/reviews/reviews.entity.ts';
import { Round } from '../../api/features/rounds/rounds.entity.ts';
import type { ClassWithPeople } from '../support/factories.ts';
import { find, handIn, listReviews, write } from '../support/round-work.ts';
import { startTestServer, type Client, type TestServer } from '../support/test-server.ts';

let server: TestServer;
let school: ClassWithPeople;
let desk: Client;
let stranger: Client;
let round: Round;

beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.stop());

/** A class of six and a round that opens in a day, then two days for each stage, with its jobs as planning makes them. */
beforeEach(async () => {
  school = await server.create.classWith({ students: 6 });
  desk = await server.signIn(school.teacher);
  stranger = await server.signIn(await server.create.user('teacher', { schoolId: school.teacher.schoolId }));
  round = await planRound();
});

async function planRound(values: object = {}): Promise<Round> {
  const task = await server.create.task(school.teacher);
  const in_ = (days: number) => new Date(server.clock.now().getTime() + days * 86_400_000).toISOString();
  const { body } = await desk
    .post('/rounds', {
      classId: school.class.id,
      taskId: task.id,
      opensAt: in_(1),
      writingEndsAt: in_(3),
      reviewingEndsAt: in_(5),
      answeringEndsAt: in_(7),
      settlesAt: in_(9),
      ...values,
    })
    .expect(201);
  return await reload(body.id);
}

async function reload(id: string = round.id): Promise<Round> {
  return await server.dataSource.getRepository(Round).findOneByOrFail({ id });
}

async function move(to: string, body: object = {}): Promise<void> {
  await desk.post(`/rounds/${round.id}/stage`, { to, ...body }).expect(200);
}

async function allHandIn(people: readonly User[] = school.students): Promise<void> {
  const at = server.clock.now();
  for (const { id } of people) await handIn(server.dataSource, { roundId: round.id, authorId: id, at });
}

async function mailsOf(kind: string): Promise<string[]> {
  const mails = await server.dataSource.getRepository(OutgoingMail).findBy({ kind });
  const people = new Set(school.students.map(({ id }) => id));
  return mails.flatMap(({ userId }) => (userId && people.has(userId) ? [userId] : [])).sort();
}

const everyone = () => school.students.map(({ id }) => id).sort();

describe('by itself', () => {
  it('goes through every stage at its instants, two minutes later where people hand in', async () => {
    server.clock.advance({ days: 1 });
    await server.runJobs();
    expect((await reload()).stage).toBe('writing');
    await allHandIn();
    server.clock.set(round.writingEndsAt);
    server.clock.advance({ minutes: 1 });
    await server.runJobs();
    expect((await reload()).stage).toBe('writing');
    server.clock.advance({ minutes: 1 });
    await server.runJobs();
    expect((await reload()).stage).toBe('reviewing');
    server.clock.set(round.reviewingEndsAt);
    server.clock.advance({ minutes: 2 });
    await server.runJobs();
    expect((await reload()).stage).toBe('answering');
    server.clock.set(round.settlesAt);
    await server.runJobs();
    const settled = await reload();
    expect(settled.waitingForRulings || settled.stage === 'settled').toBe(true);
  });

  it('catches up after a time away, by the sweep alone, and running it again changes nothing', async () => {
    const sweep = server.features.jobs.find(({ name }) => name === 'rounds-sweep');
    server.clock.set(round.reviewingEndsAt);
    server.clock.advance({ hours: 1 });
    await sweep?.handle({} as never);
    const once = await reload();
    expect(once.stage).toBe('answering');
    await sweep?.handle({} as never);
    await server.runJobs();
    expect(await reload()).toEqual(once);
    expect(await mailsOf('writing-opened')).toEqual(everyone());
  });

  it('deals once when two workers come at the same time', async () => {
    await move('writing');
    await allHandIn();
    server.clock.set(round.writingEndsAt);
    server.clock.advance({ minutes: 3 });
    const due = server.features.jobs.find(({ name }) => name === 'round-due');
    await Promise.all([1, 2, 3].map(() => due?.handle({ roundId: round.id } as never)));
    expect(await listReviews(server.dataSource, round.id)).toHaveLength(12);
  });

  it('does nothing at an instant that was moved', async () => {
    await move('writing');
    await desk.post(`/rounds/${round.id}/more-time`, { minutes: 2880 }).expect(204);
    server.clock.set(round.writingEndsAt);
    server.clock.advance({ hours: 1 });
    await server.runJobs();
    expect((await reload()).stage).toBe('writing');
    server.clock.advance({ days: 2 });
    await server.runJobs();
    expect((await reload()).stage).toBe('reviewing');
  });
});

describe('by hand', () => {
  it('shows first what it will do, and does it for the class’s teacher only', async () => {
    const student = await server.signIn(school.students[0] as User);
    const [next, stage] = [`/rounds/${round.id}/next`, `/rounds/${round.id}/stage`];
    await server.visitor().get(next).expect(401);
    await student.get(next).expect(403);
    await stranger.get(next).expect(404);
    await server.visitor().post(stage, { to: 'writing' }).expect(401);
    await student.post(stage, { to: 'writing' }).expect(403);
    await stranger.post(stage, { to: 'writing' }).expect(404);
    await desk.post(stage, { to: 'planned' }).expect(422);
    const { body } = await desk.get(next).expect(200);
    expect(body).toMatchObject({ from: 'planned', to: 'writing', at: round.opensAt.toISOString(), warnings: [] });
    expect(body.effects).toEqual([
      { kind: 'freezes-task', count: 1 },
      { kind: 'opens-writing', count: 6 },
      { kind: 'mails', count: 6 },
    ]);
    await move('writing');
    const opened = await reload();
    expect(opened).toMatchObject({ stage: 'writing', opensAt: server.clock.now() });
    expect(opened.frozen).toMatchObject({ given: '(x+2)(x-3)', taskId: round.taskId, taskVersion: 1 });
  });

  it('refuses a stage that does not follow', async () => {
    await desk.post(`/rounds/${round.id}/stage`, { to: 'reviewing' }).expect(409);
    await move('writing');
    const { body } = await desk.post(`/rounds/${round.id}/stage`, { to: 'writing' }).expect(409);
    expect(body.type).toBe('wrong-stage');
  });

  it('tells before dealing who still writes, what is too short and how much each one gets', async () => {
    await move('writing');
    const [a, b, c, d] = school.students as [User, User, User, User];
    await allHandIn([a, b]);
    await handIn(server.dataSource, { roundId: round.id, authorId: c.id, at: server.clock.now(), lines: ['x^2-x-6'] });
    await write(server.dataSource, { roundId: round.id, authorId: d.id, at: server.clock.now(), lines: ['x'] });
    const { body } = await desk.get(`/rounds/${round.id}/next`).expect(200);
    expect(body.effects).toEqual([
      { kind: 'closes-writing', count: 3 },
      { kind: 'deals', count: 2, each: 1 },
      { kind: 'mails', count: 6 },
    ]);
    expect(body.warnings).toEqual([
      { kind: 'still-writing', count: 1 },
      { kind: 'not-dealt', count: 1 },
      { kind: 'few-derivations', count: 2 },
      { kind: 'reviews-cut', count: 1 },
    ]);
  });

  it('waits for open disputes, unless the teacher settles all the same', async () => {
    await move('writing');
    await allHandIn();
    await move('reviewing');
    await move('answering');
    const [review] = await listReviews(server.dataSource, round.id);
    await server.dataSource
      .getRepository(Dispute)
      .update({ roundId: round.id }, { closedAt: server.clock.now(), closedBy: 'withdrawn' });
    await server.dataSource.getRepository(Dispute).save({
      roundId: round.id,
      versionId: review?.versionId,
      kind: 'undecided',
      step: 1,
      openedAt: server.clock.now(),
    });
    const { body } = await desk.get(`/rounds/${round.id}/next`).expect(200);
    expect(body.needsForce).toBe(true);
    await desk.post(`/rounds/${round.id}/stage`, { to: 'settled' }).expect(409);
    server.clock.set(round.settlesAt);
    await server.runJobs();
    expect(await reload()).toMatchObject({ stage: 'answering', waitingForRulings: true });
    const board = (await desk.get(`/rounds/${round.id}/board`)).body;
    expect(board.alerts[0].kind).toBe('waiting-for-rulings');
    await move('settled', { force: true, reason: 'end of term' });
    expect(await reload()).toMatchObject({ stage: 'settled', waitingForRulings: false, settledAt: server.clock.now() });
    expect(await mailsOf('round-settled')).toEqual(everyone());
    expect((await desk.get(`/rounds/${round.id}/next`)).body).toMatchObject({ to: null, effects: [] });
  });
});

describe('dealing', () => {
  it('gives everyone two of others’ derivations, no mutual pairs, positions from 1, and keeps the seed', async () => {
    await move('writing');
    await allHandIn();
    await move('reviewing');
    const reviews = await listReviews(server.dataSource, round.id);
    for (const id of everyone()) {
      const own = reviews.filter(({ reviewerId }) => reviewerId === id);
      expect(own.map(({ position }) => position).sort()).toEqual([1, 2]);
      expect(own.some(({ derivation }) => derivation.authorId === id)).toBe(false);
      expect(reviews.filter(({ derivation }) => derivation.authorId === id)).toHaveLength(2);
    }
    const pairs = new Set(reviews.map((r) => `${r.reviewerId} ${r.derivation.authorId}`));
    expect(reviews.filter((r) => pairs.has(`${r.derivation.authorId} ${r.reviewerId}`))).toEqual([]);
    expect((await reload()).dealSeed).toMatch(/^[0-9a-f]{32}$/);
    expect(await mailsOf('reviewing-opened')).toEqual(everyone());
  });

  it('never deals a listed couple to each other, and leaves out one-step derivations', async () => {
    await move('writing');
    const [a, b, ...others] = school.students as [User, User, ...User[]];
    const [firstId, secondId] = [a.id, b.id].sort();
    await server.dataSource.query(`insert into conflict_pair (class_id, first_id, second_id) values ($1, $2, $3)`, [
      school.class.id,
      firstId,
      secondId,
    ]);
    await allHandIn([a, b, ...others.slice(1)]);
    const short = { roundId: round.id, authorId: others[0]?.id ?? '', at: server.clock.now(), lines: ['x^2-x-6'] };
    const oneStep = await handIn(server.dataSource, short);
    await move('reviewing');
    const reviews = await listReviews(server.dataSource, round.id);
    expect(reviews.some(({ derivationId }) => derivationId === oneStep.id)).toBe(false);
    const couple = [a.id, b.id];
    const between = reviews.filter(
      (r) => couple.includes(r.reviewerId) && couple.includes(r.derivation.authorId ?? ''),
    );
    expect(between).toEqual([]);
  });

  it('deals nothing to whoever may still write, until they hand in', async () => {
    await move('writing');
    const [late, ...others] = school.students as [User, ...User[]];
    const until = new Date(round.writingEndsAt.getTime() + 12 * 3_600_000);
    await desk
      .put(`/rounds/${round.id}/people/${late.id}/extension`, { writingEndsAt: until.toISOString() })
      .expect(204);
    await allHandIn(others);
    server.clock.set(round.writingEndsAt);
    server.clock.advance({ minutes: 3 });
    await server.runJobs();
    const ofLate = () => server.dataSource.getRepository(Review).findBy({ roundId: round.id, reviewerId: late.id });
    expect(await ofLate()).toEqual([]);
    server.clock.advance({ hours: 1 });
    await allHandIn([late]);
    const sweep = server.features.jobs.find(({ name }) => name === 'rounds-sweep');
    await sweep?.handle({} as never);
    expect(await ofLate()).toHaveLength(2);
    const before = await listReviews(server.dataSource, round.id);
    expect(before.some(({ derivation }) => derivation.authorId === late.id)).toBe(false);
    server.clock.set(new Date((round.writingEndsAt.getTime() + round.reviewingEndsAt.getTime()) / 2));
    await sweep?.handle({} as never);
    await sweep?.handle({} as never);
    const after = await listReviews(server.dataSource, round.id);
    expect(after.filter(({ derivation }) => derivation.authorId === late.id)).toHaveLength(2);
    expect(after).toHaveLength(before.length + 2);
    expect(await mailsOf('reviewing-opened')).toEqual(everyone());
  });

  it('takes late derivations in one batch where the rule says so, or when the teacher says', async () => {
    round = await planRound({ lateRule: 'late-batch' });
    await move('writing');
    const [late, ...others] = school.students as [User, ...User[]];
    await allHandIn(others);
    await move('reviewing');
    expect(await server.dataSource.getRepository(Review).findBy({ roundId: round.id, reviewerId: late.id })).toEqual(
      [],
    );
    server.clock.advance({ hours: 2 });
    await allHandIn([late]);
    expect((await desk.get(`/rounds/${round.id}/board`)).body.alerts).toContainEqual({
      kind: 'late-waiting',
      count: 1,
    });
    const path = `/rounds/${round.id}/late-batch`;
    await server.visitor().post(path).expect(401);
    await (await server.signIn(late)).post(path).expect(403);
    await stranger.post(path).expect(404);
    expect((await desk.post(path).expect(200)).body.reviews).toBeGreaterThanOrEqual(4);
    const reviews = await listReviews(server.dataSource, round.id);
    expect(reviews.filter(({ derivation }) => derivation.authorId === late.id)).toHaveLength(2);
    expect(reviews.filter(({ reviewerId }) => reviewerId === late.id)).toHaveLength(2);
  });

  it('keeps a derivation handed in once its author has been dealt others', async () => {
    await move('writing');
    const [late, ...others] = school.students as [User, ...User[]];
    const until = new Date(round.writingEndsAt.getTime() + 12 * 3_600_000);
    const path = `/rounds/${round.id}/people/${late.id}/extension`;
    await desk.put(path, { writingEndsAt: until.toISOString() }).expect(204);
    await allHandIn(others);
    await move('reviewing');
    await allHandIn([late]);
    const author = await server.signIn(late);
    expect((await author.get(`/rounds/${round.id}/sheet`).expect(200)).body.canTakeBack).toBe(true);
    const sweep = server.features.jobs.find(({ name }) => name === 'rounds-sweep');
    await sweep?.handle({} as never);
    expect((await author.get(`/rounds/${round.id}/sheet`).expect(200)).body.canTakeBack).toBe(false);
  });

  it('finds another derivation for whoever gives one back unread', async () => {
    await move('writing');
    await allHandIn();
    await move('reviewing');
    const [given] = await listReviews(server.dataSource, round.id);
    await server.dataSource.getRepository(Review).update({ id: given?.id }, { setAside: 'know-the-author' });
    const sweep = server.features.jobs.find(({ name }) => name === 'rounds-sweep');
    await sweep?.handle({} as never);
    await sweep?.handle({} as never);
    const own = (await listReviews(server.dataSource, round.id)).filter((r) => r.reviewerId === given?.reviewerId);
    expect(own).toHaveLength(3);
    expect(new Set(own.map(({ derivationId }) => derivationId)).size).toBe(3);
  });
});

describe('mail', () => {
  it('reminds those who are not done, a day before reviewing ends, and nobody twice', async () => {
    await move('writing');
    await allHandIn();
    await move('reviewing');
    const [done, ...others] = school.students as [User, ...User[]];
    const reviews = await listReviews(server.dataSource, round.id);
    for (const review of reviews.filter(({ reviewerId }) => reviewerId === done.id)) {
      await find(server.dataSource, review, server.clock.now());
    }
    server.clock.set(new Date(round.reviewingEndsAt.getTime() - 23 * 3_600_000));
    await server.runJobs();
    await server.runJobs();
    expect(await mailsOf('review-due')).toEqual(others.map(({ id }) => id).sort());
  });

  it('tells an author of all findings in one mail', async () => {
    await move('writing');
    await allHandIn();
    await move('reviewing');
    const reviews = await listReviews(server.dataSource, round.id);
    const author = school.students[0]?.id ?? '';
    for (const review of reviews.filter(({ derivation }) => derivation.authorId === author)) {
      await find(server.dataSource, review, server.clock.now());
    }
    await move('answering');
    expect(await mailsOf('findings-to-answer')).toEqual([author]);
  });
});
