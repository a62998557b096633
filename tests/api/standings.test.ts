import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Membership } from '../../api/features/classes/classes.entity.ts';
import { Review, Score } from '../../api/features/reviews/reviews.entity.ts';
import { Round } from '../../api/features/rounds/rounds.entity.ts';
import { createStandingsService } from '../../api/features/standings/standings.service.ts';
import { reviewedRound } from '../support/reviewed-round.ts';
import { startTestServer, type TestServer } from '../support/test-server.ts';

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.stop());

const refresh = () => createStandingsService({ db: server.dataSource, now: () => server.clock.now() }).refresh();

/** A class whose student k has four findings worth about 10k points, settled `daysAgo` days ago. */
async function scored(students: number, daysAgo = 3) {
  const authors = 4;
  const everyone = Array.from({ length: students }, (_, k) => k);
  const people = await server.create.classWith({ students: students + authors });
  const deal = everyone.flatMap((k) => [0, 1, 2, 3].map((author) => [students + author, k] as const));
  const round = await reviewedRound(server, {
    people: { ...people, students: [...people.students] },
    verdicts: Array.from({ length: students + authors }, () => ['holds', 'holds', 'holds', 'holds'] as const),
    deal,
  });
  const reviews = await server.dataSource.getRepository(Review).findBy({ roundId: round.round.id });
  const at = new Date(server.clock.now().getTime() - daysAgo * 86_400_000);
  await server.dataSource.getRepository(Score).insert(
    reviews.map((review) => {
      const k = people.students.findIndex((student) => student.id === review.reviewerId);
      const author = round.derivations.findIndex(({ version }) => version.id === review.versionId) - students;
      return {
        id: randomUUID(),
        reviewId: review.id,
        points: 10 * (k + 1) + author - 1.3,
        counted: true,
        outcome: 'right' as const,
        createdAt: at,
      };
    }),
  );
  await server.dataSource
    .getRepository(Round)
    .update(round.round.id, { stage: 'settled', settledAt: at, settlesAt: at });
  return { ...round, path: `/classes/${people.class.id}/standings` };
}

describe('the list', () => {
  it('names the upper third by alias with whole points, and nothing else', async () => {
    const { students, path } = await scored(9);
    await refresh();
    const best = await server.signIn(students[8]!);
    const { body } = await best.get(path).expect(200);
    const aliases = await server.dataSource.getRepository(Membership).findBy({ role: 'student' });
    const aliasOf = (k: number) => aliases.find(({ userId }) => userId === students[k]!.id)!.alias;
    expect(body.listed).toEqual([
      { place: 1, alias: aliasOf(8), standing: expect.any(Number) as number },
      { place: 2, alias: aliasOf(7), standing: expect.any(Number) as number },
      { place: 3, alias: aliasOf(6), standing: expect.any(Number) as number },
    ]);
    for (const { standing } of body.listed) expect(Number.isInteger(standing)).toBe(true);
    for (const { id, name } of students) {
      expect(JSON.stringify(body.listed)).not.toContain(id);
      expect(JSON.stringify(body.listed)).not.toContain(name);
    }
  });

  it('is withheld below eight reviewers, and before the first sheet', async () => {
    const { students, path } = await scored(7);
    const student = await server.signIn(students[0]!);
    expect((await student.get(path)).body).toMatchObject({ withheld: 'not-yet', listed: [] });
    await refresh();
    expect((await student.get(path)).body).toMatchObject({ withheld: 'too-few', listed: [] });
  });

  it('is off where the class or the school switches it off', async () => {
    const { students, path, class: of } = await scored(9);
    await refresh();
    const student = await server.signIn(students[0]!);
    await server.dataSource.query('update class set standings_on = false where id = $1', [of.id]);
    expect((await student.get(path)).body).toMatchObject({ withheld: 'off', listed: [] });
    await server.dataSource.query('update class set standings_on = true where id = $1', [of.id]);
    await server.dataSource.query('update school set standings_allowed = false where id = $1', [of.schoolId]);
    expect((await student.get(path)).body).toMatchObject({ withheld: 'off', listed: [] });
  });

  it('is made once a week, and never within a day of a settling', async () => {
    const before = server.clock.now();
    const { class: of, path, teacher } = await scored(9, 0.5);
    const client = await server.signIn(teacher);
    const madeAt = async () => (await client.get(path)).body.madeAt as string | null;
    await refresh();
    expect(await madeAt()).toBeNull();
    server.clock.advance({ hours: 13 });
    await refresh();
    const first = await madeAt();
    expect(first).not.toBeNull();
    server.clock.advance({ days: 2 });
    await refresh();
    expect(await madeAt()).toBe(first);
    server.clock.advance({ days: 5 });
    const soon = new Date(server.clock.now().getTime() + 3_600_000);
    await server.dataSource.query("update round set stage = 'answering', settles_at = $2 where class_id = $1", [
      of.id,
      soon,
    ]);
    await refresh();
    expect(await madeAt()).toBe(first);
    await server.dataSource.query("update round set stage = 'settled' where class_id = $1", [of.id]);
    await refresh();
    expect(await madeAt()).not.toBe(first);
    server.clock.set(before);
  });

  it('is for the people of the class', async () => {
    const { path, teacher } = await scored(2);
    await (await server.signIn(teacher)).get(path).expect(200);
    const stranger = await server.signIn(await server.create.user('student'));
    await stranger.get(path).expect(404);
    await server.visitor().get(path).expect(401);
  });
});

describe('the own line', () => {
  it('is told to its owner alone, in whole points', async () => {
    const { students, path, teacher } = await scored(9);
    const { body } = await (await server.signIn(students[4]!)).get(path);
    expect(body.own).toMatchObject({ optedOut: false, rounds: [{ mean: 50 }] });
    expect(Number.isInteger(body.own.standing)).toBe(true);
    expect((await (await server.signIn(teacher)).get(path)).body.own).toBeNull();
  });

  it('leaves out findings older than 90 days', async () => {
    const { students, path } = await scored(9, 91);
    expect((await (await server.signIn(students[4]!)).get(path)).body.own).toMatchObject({
      standing: null,
      rounds: [],
    });
  });
});

describe('opting out', () => {
  it('takes one out of the list at once and moves nobody else up', async () => {
    const { students, path, teacher } = await scored(9);
    await refresh();
    const second = await server.signIn(students[7]!);
    const listed = (await second.get(path)).body.listed as { alias: string; place: number }[];
    const { body } = await second.put(`${path}/opt-out`, { optOut: true }).expect(200);
    expect(body.listed.map((each: { alias: string; place: number }) => [each.alias, each.place])).toEqual([
      [listed[0]!.alias, 1],
      [listed[2]!.alias, 2],
    ]);
    expect(body.own.optedOut).toBe(true);
    await second.put(`${path}/opt-out`, { optOut: 'yes' }).expect(422);
    await (await server.signIn(teacher)).put(`${path}/opt-out`, { optOut: true }).expect(404);
    await server.visitor().put(`${path}/opt-out`, { optOut: true }).expect(401);
  });
});
