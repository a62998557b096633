import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { AuditEntry } from '../../api/features/audit/audit.entity.ts';
import { Dispute, Ruling } from '../../api/features/disputes/disputes.entity.ts';
import { Score } from '../../api/features/reviews/reviews.entity.ts';
import { VerdictRecord } from '../../api/features/verdicts/verdicts.entity.ts';
import { FAULTY, finding, LINES, OPEN, reviewedRound, SOUND, type RoundOptions } from '../support/reviewed-round.ts';
import { startTestServer, type TestServer } from '../support/test-server.ts';

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.stop());

/** A round in answering whose first derivation is undecided at step 2, with findings 2 and "no fault" on it. */
async function open(options: RoundOptions = { verdicts: [OPEN] }) {
  const round = await reviewedRound(server, options);
  for (const [i, pick] of [2, 'none' as const].entries()) {
    const review = await round.review(0, i + 1);
    await (
      await server.signIn(round.students[i + 1]!)
    )
      .post(`/reviews/${review.id}/finding`, finding({ pick }))
      .expect(200);
  }
  await round.move('answering');
  const disputes = await server.dataSource
    .getRepository(Dispute)
    .find({ where: { roundId: round.round.id }, order: { openedAt: 'ASC' } });
  const dispute = disputes.find(({ versionId }) => versionId === round.derivations[0]!.version.id)!;
  return {
    round,
    dispute,
    teacher: await server.signIn(round.teacher),
    student: await server.signIn(round.students[1]!),
  };
}

const ruling = (decision: string, values: object = {}) => ({ decision, reason: 'The drawing says so.', ...values });

describe('the queue', () => {
  it('lists what is open for the teachers and assistants of the class, most people first', async () => {
    const { round, teacher, student } = await open();
    const { body } = await teacher.get('/disputes').expect(200);
    expect(body).toMatchObject([
      {
        kind: 'undecided',
        step: 2,
        people: 3,
        taskTitle: 'Two products',
        states: ['holds', 'undecided', 'holds', 'holds'],
        asked: false,
      },
    ]);
    expect((await teacher.get(`/disputes?classId=${round.class.id}`)).body).toHaveLength(1);
    expect((await student.get('/disputes').expect(200)).body).toEqual([]);
    await server.visitor().get('/disputes').expect(401);
    await teacher.get('/disputes?classId=x').expect(422);
  });
});

describe('a case', () => {
  it('has all that is needed to rule, and no name', async () => {
    const { round, dispute, teacher, student } = await open();
    const { body } = await teacher.get(`/disputes/${dispute.id}`).expect(200);
    expect(body).toMatchObject({
      kind: 'undecided',
      step: 2,
      sameStep: 0,
      mayAsk: false,
      mayReveal: true,
      raisedBy: null,
    });
    expect(body.findings.map((each: { reviewer: unknown; points: unknown }) => [each.reviewer, each.points])).toEqual([
      [null, null],
      [null, null],
    ]);
    for (const { name } of round.students) expect(JSON.stringify(body)).not.toContain(name);
    await student.get(`/disputes/${dispute.id}`).expect(404);
    await server.visitor().get(`/disputes/${dispute.id}`).expect(401);
  });

  it('tells names only when asked, and keeps that it was asked', async () => {
    const { round, dispute, teacher, student } = await open();
    const path = `/disputes/${dispute.id}/names`;
    const { body } = await teacher.post(path).expect(200);
    expect(body.author).toBe(round.students[0]!.name);
    expect(Object.values(body.reviewers).sort()).toEqual([round.students[1]!.name, round.students[2]!.name].sort());
    const trail = await server.dataSource
      .getRepository(AuditEntry)
      .findBy({ objectId: dispute.id, action: 'dispute.names-shown' });
    expect(trail).toMatchObject([{ actorId: round.teacher.id }]);
    await student.post(path).expect(404);
    await server.visitor().post(path).expect(401);
  });

  it('keeps names from an assistant unless the class allows it', async () => {
    const { round, dispute } = await open();
    const assistant = await server.create.user('teacher', { schoolId: round.teacher.schoolId });
    await server.create.membership(round.class, assistant, { role: 'assistant' });
    const client = await server.signIn(assistant);
    expect((await client.get(`/disputes/${dispute.id}`).expect(200)).body.mayReveal).toBe(false);
    await client.post(`/disputes/${dispute.id}/names`).expect(403);
    await server.dataSource.query('update class set assistants_see_names = true where id = $1', [round.class.id]);
    await client.post(`/disputes/${dispute.id}/names`).expect(200);
  });
});

describe('the effect of a ruling', () => {
  it('is told before it is made', async () => {
    const { dispute, teacher, student } = await open();
    const path = `/disputes/${dispute.id}/effect`;
    const { body } = await teacher.get(`${path}?decision=holds`).expect(200);
    expect(body).toEqual({
      people: 3,
      becomes: { sound: 1, faulty: 0, undecided: 0 },
      unchanged: 0,
      findings: 2,
      settled: false,
    });
    expect((await teacher.get(`${path}?decision=fails`)).body.becomes).toEqual({ sound: 0, faulty: 1, undecided: 0 });
    await teacher.get(`${path}?decision=maybe`).expect(422);
    await student.get(`${path}?decision=holds`).expect(404);
    await server.visitor().get(`${path}?decision=holds`).expect(401);
  });

  it('counts the same step in other derivations when it is ruled along', async () => {
    const { dispute, teacher } = await open({
      students: 5,
      verdicts: [OPEN, OPEN, SOUND],
      lines: [
        LINES,
        [LINES[0], LINES[1], LINES[2], LINES[4], LINES[4]],
        [LINES[0], LINES[1], '-x^2-10x-5', '-x^2-10x-5', '-(x^2+10x+5)'],
      ],
      deal: [
        [0, 1],
        [0, 2],
        [1, 3],
        [1, 4],
      ],
    });
    expect((await teacher.get(`/disputes/${dispute.id}`)).body).toMatchObject({ sameStep: 1, people: 5 });
    const { body } = await teacher.get(`/disputes/${dispute.id}/effect?decision=fails&along=true`).expect(200);
    expect(body).toMatchObject({ people: 5, becomes: { faulty: 2 }, findings: 2 });
  });
});

describe('a ruling before settling', () => {
  it('adds a verdict and closes the dispute, and no student learns of it', async () => {
    const { round, dispute, teacher, student } = await open();
    const author = await server.signIn(round.students[0]!);
    const path = `/derivations/${round.derivations[0]!.derivation.id}`;
    const before = JSON.stringify((await author.get(path)).body);
    await teacher.post(`/disputes/${dispute.id}/ruling`, ruling('fails')).expect(204);
    const verdicts = await server.dataSource
      .getRepository(VerdictRecord)
      .find({ where: { versionId: dispute.versionId }, order: { createdAt: 'ASC' } });
    expect(verdicts).toMatchObject([
      { source: 'checker', outcome: 'undecided' },
      { source: 'ruling', outcome: 'faulty', firstFault: 2 },
    ]);
    expect((await teacher.get('/disputes')).body).toEqual([]);
    expect(JSON.stringify((await author.get(path)).body)).toBe(before);
    expect((await student.get(`/reviews/${(await round.review(0, 1)).id}`)).body.result).toBeNull();
    await server.runJobs();
    expect(server.mails).toEqual([]);
    expect(await server.dataSource.getRepository(Score).count({ where: { verdictId: verdicts[1]!.id } })).toBe(0);
  });

  it('scores by it when the round settles', async () => {
    const { round, dispute, teacher, student } = await open();
    await teacher.post(`/disputes/${dispute.id}/ruling`, ruling('holds')).expect(204);
    await round.move('settled');
    const { body } = await student.get(`/reviews/${(await round.review(0, 1)).id}`);
    expect(body.result).toMatchObject({
      outcome: 'false-alarm',
      verdict: { outcome: 'sound', decidedBy: 'teacher', reason: 'The drawing says so.' },
    });
  });

  it('refuses strangers, a second ruling, and one without a reason', async () => {
    const { dispute, teacher, student } = await open();
    const path = `/disputes/${dispute.id}/ruling`;
    await student.post(path, ruling('holds')).expect(404);
    await server.visitor().post(path, ruling('holds')).expect(401);
    await teacher.post(path, ruling('holds', { reason: ' ' })).expect(422);
    await teacher.post(path, ruling('holds')).expect(204);
    await teacher.post(path, ruling('fails')).expect(409);
  });

  it('rules the same step along where the teacher chooses so', async () => {
    const { round, dispute, teacher } = await open({
      students: 5,
      verdicts: [OPEN, OPEN],
      deal: [
        [0, 1],
        [0, 2],
        [1, 3],
      ],
    });
    await teacher.post(`/disputes/${dispute.id}/ruling`, ruling('fails', { along: true })).expect(204);
    expect(await server.dataSource.getRepository(Ruling).countBy({ roundId: round.round.id })).toBe(2);
    expect((await teacher.get('/disputes')).body).toEqual([]);
  });

  it('asks nobody before settling', async () => {
    const { dispute, teacher, student } = await open();
    const path = `/disputes/${dispute.id}/question`;
    expect((await teacher.post(path, { question: 'Why?' }).expect(409)).body.type).toBe('wrong-stage');
    await student.post(path, { question: 'Why?' }).expect(404);
    await server.visitor().post(path, { question: 'Why?' }).expect(401);
    await teacher.post(path, { question: '' }).expect(422);
  });
});

describe('a ruling after settling', () => {
  it('scores again at once, keeps the old, writes the trail and mails everyone concerned', async () => {
    const { round, teacher, student } = await open({ verdicts: [FAULTY] }).catch(async () => {
      throw new Error('no dispute is opened on a decided derivation');
    });
    await round.move('settled');
    const review = await round.review(0, 1);
    const first = (await student.get(`/reviews/${review.id}`)).body.result;
    expect(first).toMatchObject({ outcome: 'right' });
    const author = await server.signIn(round.students[0]!);
    await author
      .post(`/derivations/${round.derivations[0]!.derivation.id}/contest`, { step: 2, words: 'It holds.' })
      .expect(200);
    const [item] = (await teacher.get(`/disputes?classId=${round.class.id}`)).body;
    expect((await teacher.get(`/disputes/${item.disputeId}/effect?decision=holds`)).body).toMatchObject({
      settled: true,
      becomes: { sound: 1 },
      findings: 2,
    });
    await teacher.post(`/disputes/${item.disputeId}/ruling`, ruling('holds')).expect(204);
    const second = (await student.get(`/reviews/${review.id}`)).body.result;
    expect(second).toMatchObject({ outcome: 'false-alarm', rescored: true });
    expect(await server.dataSource.getRepository(Score).countBy({ reviewId: review.id })).toBe(2);
    const [kept] = await server.dataSource.getRepository(Ruling).findBy({ roundId: round.round.id });
    expect(kept!.before).toMatchObject({ outcome: 'faulty', firstFault: 2 });
    expect(kept!.after).toMatchObject({ outcome: 'sound', firstFault: null });
    expect(kept!.before.scores).toHaveLength(2);
    const trail = await server.dataSource
      .getRepository(AuditEntry)
      .findOneByOrFail({ action: 'ruling.made', objectId: kept!.versionId });
    expect(trail).toMatchObject({
      actorId: round.teacher.id,
      reason: 'The drawing says so.',
      before: kept!.before,
      after: kept!.after,
    });
    await server.runJobs();
    expect(server.mails).toHaveLength(3);
  });

  it('makes "presentation only" a note and the pick on it void', async () => {
    const { round, teacher, student } = await open({ verdicts: [FAULTY] });
    await round.move('settled');
    const author = await server.signIn(round.students[0]!);
    await author.post(`/derivations/${round.derivations[0]!.derivation.id}/contest`, {
      step: 2,
      words: 'Brackets only.',
    });
    const [item] = (await teacher.get(`/disputes?classId=${round.class.id}`)).body;
    await teacher.post(`/disputes/${item.disputeId}/ruling`, ruling('presentation')).expect(204);
    const { body } = await student.get(`/reviews/${(await round.review(0, 1)).id}`);
    expect(body.result).toMatchObject({ outcome: 'void', points: 0, counted: false, verdict: { outcome: 'sound' } });
  });
});

describe('overruling a verdict', () => {
  it('lets the teacher put the first fault anywhere, or nowhere', async () => {
    const { round, teacher, student } = await open();
    const path = `/derivations/${round.derivations[0]!.derivation.id}/ruling`;
    await student.post(path, { firstFault: 1, reason: 'Mine.' }).expect(404);
    await server.visitor().post(path, { firstFault: 1, reason: 'Mine.' }).expect(401);
    await teacher.post(path, { firstFault: 7, reason: 'None such.' }).expect(422);
    await teacher.post(path, { firstFault: 3, reason: '' }).expect(422);
    await teacher.post(path, { firstFault: 3, reason: 'Terms were lost.' }).expect(204);
    const { body } = await teacher.get(`/derivations/${round.derivations[0]!.derivation.id}`);
    expect(body.verdict).toMatchObject({
      outcome: 'faulty',
      firstFault: 3,
      decidedBy: 'teacher',
      reason: 'Terms were lost.',
    });
    await teacher.post(path, { firstFault: null, reason: 'All is well.' }).expect(204);
    expect((await teacher.get(`/derivations/${round.derivations[0]!.derivation.id}`)).body.verdict.outcome).toBe(
      'sound',
    );
  });
});
