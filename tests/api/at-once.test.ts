import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Invitation, Membership } from '../../api/features/classes/classes.entity.ts';
import { DerivationVersion } from '../../api/features/derivations/derivations.entity.ts';
import { Dispute, Ruling } from '../../api/features/disputes/disputes.entity.ts';
import { Finding, Review, Score } from '../../api/features/reviews/reviews.entity.ts';
import { sha256 } from '../../api/lib/secrets.ts';
import { finding, OPEN, reviewedRound } from '../support/reviewed-round.ts';
import { handIn, listReviews, sheetOf } from '../support/round-work.ts';
import { startTestServer, type TestServer } from '../support/test-server.ts';

/** What several people, windows or processes do in the same moment. */

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.stop());

const statuses = (answers: readonly { status: number }[]) => answers.map(({ status }) => status).sort();

async function openRound(students: number) {
  const school = await server.create.classWith({ students });
  const desk = await server.signIn(school.teacher);
  const round = await server.create.round(school.class, await server.create.task(school.teacher));
  server.clock.set(round.opensAt);
  await desk.post(`/rounds/${round.id}/stage`, { to: 'writing' }).expect(200);
  return { ...school, desk, round };
}

describe('a whole class that joins in the same moment', () => {
  it('is in, everybody with an alias of their own', async () => {
    const { class: of } = await server.create.classWith();
    const tokens = Array.from({ length: 8 }, (_, i) => `a-link-of-our-own-making-${i}`);
    await server.dataSource.getRepository(Invitation).insert(
      tokens.map((token, i) => ({
        schoolId: of.schoolId,
        classId: of.id,
        role: 'student' as const,
        tokenHash: sha256(token),
        name: `Newcomer ${i}`,
        email: `newcomer${i}@school.test`,
        expiresAt: new Date(server.clock.now().getTime() + 86_400_000),
      })),
    );
    const answers = await Promise.all(
      tokens.map((token, i) =>
        server
          .visitor()
          .post(`/invitations/${token}/account`, { name: `Newcomer ${i}`, password: 'seven quiet herons' }),
      ),
    );
    expect(statuses(answers)).toEqual(Array.from({ length: 8 }, () => 201));
    const members = await server.dataSource.getRepository(Membership).findBy({ classId: of.id, role: 'student' });
    expect(new Set(members.map(({ alias }) => alias)).size).toBe(8);
  });

  it('uses one link once', async () => {
    const { class: of } = await server.create.classWith();
    const token = 'one-link-that-two-people-follow';
    await server.dataSource.getRepository(Invitation).insert({
      schoolId: of.schoolId,
      classId: of.id,
      role: 'student',
      tokenHash: sha256(token),
      name: '',
      expiresAt: new Date(server.clock.now().getTime() + 86_400_000),
    });
    const answers = await Promise.all(
      ['first.one', 'second.one', 'third.one'].map((userName) =>
        server
          .visitor()
          .post(`/invitations/${token}/account`, { name: 'Somebody', userName, password: 'seven quiet herons' }),
      ),
    );
    expect(statuses(answers)).toEqual([201, 410, 410]);
  });
});

describe('one sheet handed in twice at once', () => {
  it('is one version', async () => {
    const { round, students } = await openRound(1);
    const client = await server.signIn(students[0]!);
    const { draft } = (await client.get(`/rounds/${round.id}/sheet`).expect(200)).body;
    const saved = await client
      .put(`/rounds/${round.id}/sheet`, { document: sheetOf(['x^2-x-6']), baseVersion: draft.version })
      .expect(200);
    const form = { draftVersion: saved.body.version };
    const answers = await Promise.all([1, 2, 3].map(() => client.post(`/rounds/${round.id}/sheet/hand-in`, form)));
    expect(statuses(answers)).toEqual([200, 409, 409]);
    expect(
      await server.dataSource.getRepository(DerivationVersion).countBy({ derivation: { roundId: round.id } }),
    ).toBe(1);
  });

  it('is dealt or stays with its author, never half of it, when the stage moves meanwhile', async () => {
    const { round, students, desk } = await openRound(4);
    const [late, ...others] = students;
    for (const { id } of others)
      await handIn(server.dataSource, { roundId: round.id, authorId: id, at: server.clock.now() });
    const client = await server.signIn(late!);
    const { draft } = (await client.get(`/rounds/${round.id}/sheet`).expect(200)).body;
    const document = sheetOf(['x^2-3x+2x-6', 'x^2-x-6']);
    const saved = await client.put(`/rounds/${round.id}/sheet`, { document, baseVersion: draft.version }).expect(200);
    const [handedIn] = await Promise.all([
      client.post(`/rounds/${round.id}/sheet/hand-in`, { draftVersion: saved.body.version }),
      desk.post(`/rounds/${round.id}/stage`, { to: 'reviewing' }).expect(200),
    ]);
    expect(handedIn.status).toBe(200);
    const reviews = await listReviews(server.dataSource, round.id);
    for (const { derivation, versionId } of reviews) expect(versionId).toBe(derivation.currentVersionId);
  });
});

describe('the stage machine', () => {
  it('deals, opens answering and settles once when several processes run it at once', async () => {
    const { round, students, desk } = await openRound(5);
    for (const { id } of students)
      await handIn(server.dataSource, { roundId: round.id, authorId: id, at: server.clock.now() });
    const move = (to: string) =>
      Promise.all([1, 2, 3].map(() => desk.post(`/rounds/${round.id}/stage`, { to, force: true, reason: 'test' })));
    expect(statuses(await move('reviewing'))).toEqual([200, 409, 409]);
    expect(await server.dataSource.getRepository(Review).countBy({ roundId: round.id })).toBe(10);
    await server.runJobs();
    expect(statuses(await move('answering'))).toEqual([200, 409, 409]);
    expect(statuses(await move('settled'))).toEqual([200, 409, 409]);
    expect(await server.dataSource.getRepository(Score).countBy({ review: { roundId: round.id } })).toBe(10);
    const mails = await server.dataSource.query(
      `select user_id, kind from outgoing_mail where dedupe_key like $1 group by user_id, kind having count(*) > 1`,
      [`%${round.id}%`],
    );
    expect(mails).toEqual([]);
  });
});

describe('two rulings on one dispute', () => {
  it('are one ruling; the second is told', async () => {
    const round = await reviewedRound(server, { verdicts: [OPEN] });
    const reviewer = await server.signIn(round.students[1]!);
    await reviewer.post(`/reviews/${(await round.review(0, 1)).id}/finding`, finding()).expect(200);
    await round.move('answering');
    const dispute = await server.dataSource.getRepository(Dispute).findOneByOrFail({ roundId: round.round.id });
    const desk = await server.signIn(round.teacher);
    const answers = await Promise.all(
      (['holds', 'fails'] as const).map((decision) =>
        desk.post(`/disputes/${dispute.id}/ruling`, { decision, reason: 'Seen twice.' }),
      ),
    );
    expect(statuses(answers)).toEqual([204, 409]);
    expect(await server.dataSource.getRepository(Ruling).countBy({ roundId: round.round.id })).toBe(1);
  });
});

describe('a finding', () => {
  it('is not handed in once answering has opened, however close it is', async () => {
    const round = await reviewedRound(server, { verdicts: [OPEN] });
    const reviewer = await server.signIn(round.students[1]!);
    const { id } = await round.review(0, 1);
    const desk = await server.signIn(round.teacher);
    const answers = await Promise.all([
      reviewer.post(`/reviews/${id}/finding`, finding()),
      desk.post(`/rounds/${round.round.id}/stage`, { to: 'answering' }),
    ]);
    expect(answers[1].status).toBe(200);
    const kept = await server.dataSource.getRepository(Finding).countBy({ reviewId: id });
    expect(kept).toBe(answers[0].status === 200 ? 1 : 0);
  });
});
