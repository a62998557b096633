import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Dispute } from '../../api/features/disputes/disputes.entity.ts';
import { FAULTY, finding, OPEN, reviewedRound, type Ruled } from '../support/reviewed-round.ts';
import { startTestServer, type TestServer } from '../support/test-server.ts';

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.stop());

async function answering(picks: (number | 'none')[], verdict: readonly Ruled[] = FAULTY) {
  const round = await reviewedRound(server, { verdicts: [verdict] });
  for (const [i, pick] of picks.entries()) {
    const review = await round.review(0, i + 1);
    await (
      await server.signIn(round.students[i + 1]!)
    )
      .post(`/reviews/${review.id}/finding`, finding({ pick }))
      .expect(200);
  }
  await round.move('answering');
  const author = await server.signIn(round.students[0]!);
  const path = `/derivations/${round.derivations[0]!.derivation.id}`;
  const { body } = await author.get(path).expect(200);
  const keyOf = (pick: number | null) =>
    body.findings.find((each: { pick: number | null }) => each.pick === pick).key as string;
  const disputes = () => server.dataSource.getRepository(Dispute).findBy({ roundId: round.round.id });
  return { round, author, path, body, keyOf, disputes, reviewer: await server.signIn(round.students[1]!) };
}

describe('reading the own derivation', () => {
  it('shows no finding before answering opens', async () => {
    const round = await reviewedRound(server);
    const review = await round.review(0, 1);
    await (await server.signIn(round.students[1]!)).post(`/reviews/${review.id}/finding`, finding()).expect(200);
    const author = await server.signIn(round.students[0]!);
    const { body } = await author.get(`/derivations/${round.derivations[0]!.derivation.id}`).expect(200);
    expect(body).toMatchObject({ as: 'author', findings: [], canAnswer: false, settled: null });
  });

  it('shows findings without names, points or times, and how sure in words', async () => {
    const { body } = await answering([2, 'none']);
    expect(body.canAnswer).toBe(true);
    const found = body.findings.find((each: { pick: number | null }) => each.pick === 2);
    expect(Object.keys(found).sort()).toEqual([
      'answer',
      'key',
      'markedSpan',
      'noFault',
      'outcome',
      'pick',
      'shouldBe',
      'slipKind',
      'slipNamed',
      'sure',
      'termMarked',
      'why',
    ]);
    expect(found).toMatchObject({ sure: 'half', outcome: null, slipNamed: null, termMarked: null });
  });

  it('shows teachers both sides, and nobody else anything', async () => {
    const { round, path, reviewer } = await answering([2]);
    const { body } = await (await server.signIn(round.teacher)).get(path).expect(200);
    expect(body).toMatchObject({ as: 'teacher', author: round.students[0]!.name, verdict: { firstFault: 2 } });
    expect(body.findings[0]).toMatchObject({ reviewer: round.students[1]!.name, outcome: 'right' });
    await reviewer.get(path).expect(404);
    await server.visitor().get(path).expect(401);
  });

  it('shows an assistant nothing unless the teacher allows names', async () => {
    const { round, path } = await answering([2]);
    const assistant = await server.create.user('teacher', { schoolId: round.teacher.schoolId });
    await server.create.membership(round.class, assistant, { role: 'assistant' });
    const client = await server.signIn(assistant);
    await client.get(path).expect(404);
    await server.dataSource.query('update class set assistants_see_names = true where id = $1', [round.class.id]);
    await client.get(path).expect(200);
  });
});

describe('answering a finding', () => {
  it('accepts, changes its mind, and needs a reason to contest', async () => {
    const { author, path, keyOf } = await answering([2]);
    const at = `/findings/${keyOf(2)}/answer`;
    await author.put(at, { kind: 'accept' }).expect(204);
    await author.put(at, { kind: 'contest', reason: ' ' }).expect(422);
    await author.put(at, { kind: 'contest', reason: 'It is right as it stands.' }).expect(204);
    expect((await author.get(path)).body.findings[0].answer).toEqual({
      kind: 'contest',
      reason: 'It is right as it stands.',
    });
  });

  it('goes to the desk where the finding agrees with the verdict, and leaves it when accepted after all', async () => {
    const { author, keyOf, disputes } = await answering([2]);
    const at = `/findings/${keyOf(2)}/answer`;
    await author.put(at, { kind: 'contest', reason: 'No.' }).expect(204);
    expect(await disputes()).toMatchObject([{ kind: 'contested-finding', step: 2, words: 'No.', closedAt: null }]);
    await author.put(at, { kind: 'contest', reason: 'Still no.' }).expect(204);
    await author.put(at, { kind: 'accept' }).expect(204);
    expect(await disputes()).toMatchObject([{ words: 'Still no.', closedBy: 'withdrawn' }]);
  });

  it('takes two windows at once', async () => {
    const { author, path, keyOf, disputes } = await answering([2]);
    const at = `/findings/${keyOf(2)}/answer`;
    const answers = ['One.', 'Two.', 'Three.'].map((reason) => author.put(at, { kind: 'contest', reason }));
    for (const { status } of await Promise.all(answers)) expect(status).toBe(204);
    expect(await disputes()).toHaveLength(1);
    expect((await author.get(path)).body.findings[0].answer.kind).toBe('contest');
  });

  it('is left to the verdict where the finding says otherwise, with the same reply', async () => {
    const { author, keyOf, disputes } = await answering([3]);
    await author.put(`/findings/${keyOf(3)}/answer`, { kind: 'contest', reason: 'No.' }).expect(204);
    expect(await disputes()).toEqual([]);
  });

  it('goes to the desk where nothing is decided', async () => {
    const { author, keyOf, disputes } = await answering([4], OPEN);
    await author.put(`/findings/${keyOf(4)}/answer`, { kind: 'contest', reason: 'No.' }).expect(204);
    expect((await disputes()).map(({ kind }) => kind).sort()).toEqual(['contested-finding', 'undecided']);
  });

  it('is for the author alone, while answering is open', async () => {
    const { author, reviewer, round, keyOf } = await answering([2]);
    const at = `/findings/${keyOf(2)}/answer`;
    await reviewer.put(at, { kind: 'accept' }).expect(404);
    await server.visitor().put(at, { kind: 'accept' }).expect(401);
    await author.put('/findings/nothing/answer', { kind: 'accept' }).expect(404);
    await author.put(at, { kind: 'accept' }).expect(204);
    await round.move('settled');
    expect((await author.put(at, { kind: 'accept' }).expect(409)).body.type).toBe('wrong-stage');
  });
});

describe('after settling', () => {
  it('shows the verdict, and of the findings right, carried or not the first, but never points', async () => {
    const { author, path, round } = await answering([2, 3]);
    await round.move('settled');
    const { body } = await author.get(path).expect(200);
    expect(body.settled.verdict).toMatchObject({ outcome: 'faulty', firstFault: 2 });
    expect(body.settled.verdict.steps.map((step: { state: string }) => step.state)).toEqual([
      'holds',
      'fault',
      'carried',
      'carried',
    ]);
    expect(body.findings.map((each: { outcome: string }) => each.outcome).sort()).toEqual(['carried', 'right']);
    expect(JSON.stringify(body)).not.toContain('points');
  });

  it('lets the author contest the verdict for a week', async () => {
    const { author, path, round, reviewer, disputes } = await answering([2]);
    await author.post(`${path}/contest`, { step: 2, words: 'A sign is no fault.' }).expect(409);
    await round.move('settled');
    await reviewer.post(`${path}/contest`, { step: 2, words: 'Mine.' }).expect(404);
    await server.visitor().post(`${path}/contest`, { step: 2, words: 'Mine.' }).expect(401);
    await author.post(`${path}/contest`, { step: 9, words: 'No such.' }).expect(422);
    await author.post(`${path}/contest`, { step: 2, words: '' }).expect(422);
    const { body } = await author.post(`${path}/contest`, { step: 2, words: 'A sign is no fault.' }).expect(200);
    expect(body.settled.contest.mine).toMatchObject({ words: 'A sign is no fault.', open: true });
    expect(await disputes()).toMatchObject([{ kind: 'contested-verdict', step: 2 }]);
    const before = server.clock.now();
    server.clock.advance({ days: 8 });
    expect((await author.post(`${path}/contest`, { step: 3, words: 'Late.' }).expect(409)).body.type).toBe('too-late');
    server.clock.set(before);
  });

  it('lets the teacher ask the author, who answers', async () => {
    const { author, path, round, reviewer, disputes } = await answering([2]);
    await round.move('settled');
    await author.post(`${path}/question-answer`, { answer: 'To what?' }).expect(409);
    await author.post(`${path}/contest`, { step: 2, words: 'A sign is no fault.' }).expect(200);
    const [dispute] = await disputes();
    const teacher = await server.signIn(round.teacher);
    await teacher.post(`/disputes/${dispute!.id}/question`, { question: 'What did you mean by it?' }).expect(204);
    await reviewer.post(`/disputes/${dispute!.id}/question`, { question: 'Mine?' }).expect(404);
    expect((await author.get(path)).body.settled.contest.mine.question).toBe('What did you mean by it?');
    await reviewer.post(`${path}/question-answer`, { answer: 'x' }).expect(404);
    await server.visitor().post(`${path}/question-answer`, { answer: 'x' }).expect(401);
    await author.post(`${path}/question-answer`, { answer: '' }).expect(422);
    await author.post(`${path}/question-answer`, { answer: 'I meant minus.' }).expect(200);
    expect((await teacher.get(`/disputes/${dispute!.id}`)).body.questionAnswer).toBe('I meant minus.');
  });
});
