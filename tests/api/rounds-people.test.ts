import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { AuditEntry } from '../../api/features/audit/audit.entity.ts';
import type { User } from '../../api/features/people/people.entity.ts';
import { Review } from '../../api/features/reviews/reviews.entity.ts';
import { Round } from '../../api/features/rounds/rounds.entity.ts';
import type { BoardAnswer, BoardPerson } from '../../shared/schemas/round.ts';
import type { ClassWithPeople } from '../support/factories.ts';
import { find, handIn, listReviews, write } from '../support/round-work.ts';
import { startTestServer, type Client, type TestServer } from '../support/test-server.ts';

let server: TestServer;
let school: ClassWithPeople;
let desk: Client;
let stranger: Client;
let student: Client;
let round: Round;
let one: User;

beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.stop());

/** A class of seven whose round has just opened: two days for each stage. */
beforeEach(async () => {
  school = await server.create.classWith({ students: 7 });
  desk = await server.signIn(school.teacher);
  one = school.students[0] as User;
  student = await server.signIn(one);
  stranger = await server.signIn(await server.create.user('teacher', { schoolId: school.teacher.schoolId }));
  const made = await server.create.round(school.class, await server.create.task(school.teacher));
  server.clock.set(made.opensAt);
  await move(made.id, 'writing');
  round = await server.dataSource.getRepository(Round).findOneByOrFail({ id: made.id });
});

async function move(roundId: string, to: string): Promise<void> {
  await desk.post(`/rounds/${roundId}/stage`, { to }).expect(200);
}

const after = (instant: Date, hours: number) => new Date(instant.getTime() + hours * 3_600_000).toISOString();
const pathOf = (what: string, userId = one.id) => `/rounds/${round.id}/people/${userId}/${what}`;

async function openReviewing(
  people: readonly User[] = school.students,
): Promise<(Review & { derivation: { authorId: string | null } })[]> {
  for (const { id } of people) {
    await handIn(server.dataSource, { roundId: round.id, authorId: id, at: server.clock.now() });
  }
  await move(round.id, 'reviewing');
  return await listReviews(server.dataSource, round.id);
}

async function getBoard(): Promise<BoardAnswer> {
  return (await desk.get(`/rounds/${round.id}/board`).expect(200)).body;
}

async function getPerson(user: User): Promise<BoardPerson | undefined> {
  return (await getBoard()).people.find(({ userId }) => userId === user.id);
}

describe('more time for one person', () => {
  it('is given and ended by the class’s teacher, to students of the class', async () => {
    const form = { writingEndsAt: after(round.writingEndsAt, 5), reason: 'orchestra' };
    await server.visitor().put(pathOf('extension'), form).expect(401);
    await student.put(pathOf('extension'), form).expect(403);
    await stranger.put(pathOf('extension'), form).expect(404);
    await desk.put(pathOf('extension', school.teacher.id), form).expect(404);
    await desk.put(pathOf('extension'), {}).expect(422);
    await desk.put(pathOf('extension'), form).expect(204);
    expect((await getPerson(one))?.ownWritingEndsAt).toBe(form.writingEndsAt);
    await server.visitor().delete(pathOf('extension')).expect(401);
    await student.delete(pathOf('extension')).expect(403);
    await stranger.delete(pathOf('extension')).expect(404);
    await desk.delete(pathOf('extension')).expect(204);
    await desk.delete(pathOf('extension')).expect(404);
    expect((await getPerson(one))?.ownWritingEndsAt).toBeNull();
    const trail = await server.dataSource
      .getRepository(AuditEntry)
      .findBy({ objectId: round.id, action: 'round.extended' });
    expect(trail).toMatchObject([{ actorId: school.teacher.id, reason: 'orchestra' }]);
  });

  it('stays between the round’s own instants', async () => {
    const sayings = async (form: object) =>
      (await desk.put(pathOf('extension'), form).expect(422)).body.errors[0].pointer;
    expect(await sayings({ writingEndsAt: after(round.writingEndsAt, -1) })).toBe('/writingEndsAt');
    expect(await sayings({ writingEndsAt: after(round.reviewingEndsAt, 1) })).toBe('/writingEndsAt');
    expect(await sayings({ reviewingEndsAt: after(round.reviewingEndsAt, 0) })).toBe('/reviewingEndsAt');
    expect(await sayings({ reviewingEndsAt: after(round.answeringEndsAt, 1) })).toBe('/reviewingEndsAt');
  });

  it('takes back reviews that were dealt and not opened, and finds others for them', async () => {
    const before = await openReviewing(school.students.slice(1));
    const own = before.filter(({ reviewerId }) => reviewerId === one.id);
    await desk.put(pathOf('extension'), { writingEndsAt: after(round.writingEndsAt, 5) }).expect(204);
    const now = await listReviews(server.dataSource, round.id);
    expect(now.filter(({ reviewerId }) => reviewerId === one.id)).toEqual([]);
    const countOf = (all: readonly Review[], id: string) => all.filter((r) => r.derivationId === id).length;
    for (const { derivationId } of own) expect(countOf(now, derivationId)).toBe(countOf(before, derivationId));
  });

  it('is refused to whoever has handed in when others review', async () => {
    await openReviewing();
    const { body } = await desk.put(pathOf('extension'), { writingEndsAt: after(round.writingEndsAt, 5) }).expect(409);
    expect(body.detail).toContain('handed in');
  });

  it('is refused to whoever has opened a classmate’s derivation', async () => {
    const [review] = (await openReviewing(school.students.slice(1))).filter(({ reviewerId }) => reviewerId === one.id);
    await server.dataSource.getRepository(Review).update({ id: review?.id }, { openedAt: server.clock.now() });
    await desk.put(pathOf('extension'), { writingEndsAt: after(round.writingEndsAt, 5) }).expect(409);
  });

  it('keeps reviewing open for one person before answering opens for all', async () => {
    await openReviewing();
    await desk.put(pathOf('extension'), { reviewingEndsAt: after(round.reviewingEndsAt, 6) }).expect(204);
    const stage = async () => (await getBoard()).round.stage;
    server.clock.set(after(round.reviewingEndsAt, 1));
    await server.runJobs();
    expect(await stage()).toBe('reviewing');
    server.clock.set(after(round.reviewingEndsAt, 7));
    const sweep = server.features.jobs.find(({ name }) => name === 'rounds-sweep');
    await sweep?.handle({} as never);
    expect(await stage()).toBe('answering');
    await desk.put(pathOf('extension'), { reviewingEndsAt: after(round.reviewingEndsAt, 8) }).expect(409);
  });
});

describe('an excuse', () => {
  it('is given and taken back by the class’s teacher', async () => {
    const form = { excused: true, reason: 'ill' };
    await server.visitor().put(pathOf('excuse'), form).expect(401);
    await student.put(pathOf('excuse'), form).expect(403);
    await stranger.put(pathOf('excuse'), form).expect(404);
    await desk.put(pathOf('excuse'), {}).expect(422);
    await desk.put(pathOf('excuse'), form).expect(204);
    await desk.put(pathOf('excuse'), form).expect(204);
    expect((await getPerson(one))?.state).toBe('excused');
    await desk.put(pathOf('excuse'), { excused: false }).expect(204);
    expect((await getPerson(one))?.state).toBe('not-begun');
  });

  it('gives unbegun reviews to others and leaves what was begun', async () => {
    const own = (await openReviewing()).filter(({ reviewerId }) => reviewerId === one.id);
    const [begun, untouched] = own as [Review, Review];
    await find(server.dataSource, begun, server.clock.now());
    await desk.put(pathOf('excuse'), { excused: true }).expect(204);
    const now = await listReviews(server.dataSource, round.id);
    expect(now.filter(({ reviewerId }) => reviewerId === one.id).map(({ id }) => id)).toEqual([begun.id]);
    const instead = now.filter(({ derivationId }) => derivationId === untouched.derivationId);
    expect(instead).toHaveLength(2);
    expect(now).toHaveLength(14);
  });

  it('comes too late when the round is settled', async () => {
    await server.dataSource.getRepository(Round).update({ id: round.id }, { stage: 'settled' });
    await desk.put(pathOf('excuse'), { excused: true }).expect(409);
  });
});

describe('who does what', () => {
  it('tells handed in, writing, stuck and not begun apart', async () => {
    const [done, writes, stuck, away, read] = school.students as [User, User, User, User, User];
    server.clock.advance({ hours: 3 });
    const minutesAgo = (minutes: number) => new Date(server.clock.now().getTime() - minutes * 60_000);
    const roundId = round.id;
    const lines = ['x^2', 'x^2-x'];
    await handIn(server.dataSource, { roundId, authorId: done.id, at: minutesAgo(60) });
    await write(server.dataSource, { roundId, authorId: writes.id, at: minutesAgo(1), lines });
    await write(server.dataSource, {
      roundId,
      authorId: stuck.id,
      at: minutesAgo(1),
      lineAddedAt: minutesAgo(22),
      lines,
    });
    await write(server.dataSource, { roundId, authorId: away.id, at: minutesAgo(150), lines });
    await write(server.dataSource, { roundId, authorId: read.id, at: minutesAgo(30), lines: [''] });
    const states = new Map((await getBoard()).people.map((person) => [person.userId, person]));
    expect(states.get(done.id)).toMatchObject({ state: 'handed-in', lines: 2 });
    expect(states.get(writes.id)).toMatchObject({ state: 'writing', lines: 2 });
    expect(states.get(stuck.id)).toMatchObject({ state: 'stuck', lines: 2 });
    expect(states.get(away.id)).toMatchObject({ state: 'writing' });
    expect(states.get(read.id)).toMatchObject({ state: 'not-begun', hasOpened: true, lines: 0 });
    expect(states.get(school.students[5]?.id ?? '')).toMatchObject({ state: 'not-begun', hasOpened: false });
  });

  it('says at which line several people stopped, with what they wrote', async () => {
    server.clock.advance({ hours: 1 });
    const at = server.clock.now();
    const lineAddedAt = new Date(at.getTime() - 20 * 60_000);
    for (const { id } of school.students.slice(0, 3)) {
      await write(server.dataSource, { roundId: round.id, authorId: id, at, lineAddedAt, lines: ['x^2', 'x^2-5x'] });
    }
    expect((await getBoard()).alerts).toEqual([{ kind: 'line-stops', line: 2, texts: ['x^2-5x', 'x^2-5x', 'x^2-5x'] }]);
  });

  it('counts reviews and, once they are to be answered, findings', async () => {
    const reviews = await openReviewing();
    const own = reviews.filter(({ reviewerId }) => reviewerId === one.id);
    const [first] = own as [Review & { derivation: { authorId: string | null } }];
    await find(server.dataSource, first, server.clock.now());
    expect((await getPerson(one))?.reviews).toEqual({ dealt: 2, begun: 0, done: 1 });
    const author = school.students.find(({ id }) => id === first.derivation.authorId) as User;
    expect((await getPerson(author))?.findings).toEqual({ received: 0, accepted: 0, contested: 0 });
    await move(round.id, 'answering');
    expect((await getPerson(author))?.findings).toEqual({ received: 1, accepted: 0, contested: 0 });
  });

  it('counts no finding that picks no step, because it asks for no answer', async () => {
    const [first] = (await openReviewing()) as [Review & { derivation: { authorId: string | null } }];
    await find(server.dataSource, first, server.clock.now(), { pick: null, noFault: true });
    await move(round.id, 'answering');
    const author = school.students.find(({ id }) => id === first.derivation.authorId) as User;
    expect((await getPerson(author))?.findings).toEqual({ received: 0, accepted: 0, contested: 0 });
  });
});
