import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Extension } from '../../api/features/rounds/rounds.entity.ts';
import { Finding } from '../../api/features/reviews/reviews.entity.ts';
import { finding, reviewedRound } from '../support/reviewed-round.ts';
import { startTestServer, type TestServer } from '../support/test-server.ts';

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.stop());

async function dealt() {
  const round = await reviewedRound(server);
  const review = await round.review(0, 1);
  return {
    round,
    review,
    reviewer: await server.signIn(round.students[1]!),
    author: await server.signIn(round.students[0]!),
  };
}

describe('reading a review', () => {
  it('gives the reviewer the lines, the task and nothing about anybody', async () => {
    const { review, reviewer, round } = await dealt();
    const { body } = await reviewer.get(`/reviews/${review.id}`).expect(200);
    expect(body.lines).toHaveLength(5);
    expect(body.lines[1]).toEqual({
      number: 1,
      tex: '(x-5)(x+1)-2x^2-6x',
      reason: 'second product out',
      prose: '',
      uses: null,
    });
    expect(body).toMatchObject({ canEdit: true, finding: null, result: null, position: 1, total: 1 });
    const text = JSON.stringify(body);
    expect(text).not.toContain(round.students[0]!.id);
    expect(text).not.toContain(round.students[0]!.name);
    expect(text).not.toContain(round.derivations[0]!.version.id);
    expect(text).not.toContain(round.derivations[0]!.derivation.id);
    expect(text).not.toContain(round.derivations[0]!.version.lines[1]!.stepId);
  });

  it('is not there for anyone else', async () => {
    const { review, author, reviewer, round } = await dealt();
    await reviewer.get(`/reviews/${review.id}`).expect(200);
    await author.get(`/reviews/${review.id}`).expect(404);
    await (await server.signIn(round.teacher)).get(`/reviews/${review.id}`).expect(404);
    await server.visitor().get(`/reviews/${review.id}`).expect(401);
  });
});

describe('a draft', () => {
  it('is saved under its version, and a second window is told of the change', async () => {
    const { review, reviewer } = await dealt();
    const draft = finding({ pick: 3, why: 'Not' });
    const saved = await reviewer.put(`/reviews/${review.id}/draft`, { draft, version: 0 }).expect(200);
    expect(saved.body).toEqual({ version: 1, names: [] });
    const stale = await reviewer.put(`/reviews/${review.id}/draft`, { draft: finding(), version: 0 }).expect(409);
    expect(stale.body.extra).toEqual({ draft, version: 1 });
    expect((await reviewer.get(`/reviews/${review.id}`)).body).toMatchObject({ draft, draftVersion: 1 });
  });

  it('tells the reviewer when the name of a classmate stands in it', async () => {
    const round = await reviewedRound(server);
    await server.dataSource.query('update person set name = $1 where id = $2', [
      'Ottilie Brandvik',
      round.students[0]!.id,
    ]);
    const review = await round.review(0, 1);
    const reviewer = await server.signIn(round.students[1]!);
    const { body } = await reviewer.put(`/reviews/${review.id}/draft`, {
      draft: finding({ why: 'I think Ottilie did this' }),
      version: 0,
    });
    expect(body.names).toEqual(['Ottilie']);
  });

  it('refuses strangers, the signed out, and what is no draft', async () => {
    const { review, author, reviewer } = await dealt();
    const path = `/reviews/${review.id}/draft`;
    await server.visitor().put(path, { draft: finding(), version: 0 }).expect(401);
    await author.put(path, { draft: finding(), version: 0 }).expect(404);
    await reviewer.put(path, { draft: { ...finding(), sureness: 9 }, version: 0 }).expect(422);
    await reviewer.put(path, { draft: finding({ pick: 5 }), version: 0 }).expect(422);
    await reviewer.put(path, { draft: finding({ markedSpan: { start: 0, end: 400 } }), version: 0 }).expect(422);
    await reviewer.put(path, { draft: finding(), version: 0 }).expect(200);
  });
});

describe('handing in', () => {
  it('counts the last one, and a taken-back one brings no earlier one back', async () => {
    const { review, reviewer } = await dealt();
    await reviewer.post(`/reviews/${review.id}/finding`, finding({ pick: 3 })).expect(200);
    const second = await reviewer.post(`/reviews/${review.id}/finding`, finding({ pick: 2 })).expect(200);
    expect(second.body.finding).toMatchObject({ pick: 2 });
    const back = await reviewer.post(`/reviews/${review.id}/take-back`).expect(200);
    expect(back.body.finding).toBeNull();
    expect(await server.dataSource.getRepository(Finding).countBy({ reviewId: review.id })).toBe(2);
  });

  it('keeps nothing of a pick when it says "can\'t tell"', async () => {
    const { review, reviewer } = await dealt();
    const given = finding({ pick: 2, sureness: 0, shouldBe: 'x', markedSpan: { start: 0, end: 2 } });
    const { body } = await reviewer.post(`/reviews/${review.id}/finding`, given).expect(200);
    expect(body.finding).toMatchObject({ pick: null, sureness: 0, shouldBe: '', markedSpan: null });
  });

  it('needs a pick for any sureness', async () => {
    const { review, reviewer, author } = await dealt();
    const path = `/reviews/${review.id}/finding`;
    const { body } = await reviewer.post(path, finding({ pick: null })).expect(422);
    expect(body.errors).toEqual([{ pointer: '/pick', detail: 'Choose a step, or say that there is no fault.' }]);
    await author.post(path, finding()).expect(404);
    await server.visitor().post(path, finding()).expect(401);
    await reviewer.post(path, finding()).expect(200);
  });

  it('is open for two minutes after the end, and no longer', async () => {
    const { review, reviewer, round } = await dealt();
    const before = server.clock.now();
    server.clock.set(new Date(round.round.reviewingEndsAt.getTime() + 119_000));
    await reviewer.post(`/reviews/${review.id}/finding`, finding()).expect(200);
    server.clock.advance({ seconds: 2 });
    const late = await reviewer.post(`/reviews/${review.id}/finding`, finding()).expect(409);
    expect(late.body.type).toBe('too-late');
    await server.dataSource.getRepository(Extension).save({
      roundId: round.round.id,
      userId: round.students[1]!.id,
      createdById: round.teacher.id,
      reviewingEndsAt: new Date(server.clock.now().getTime() + 3_600_000),
    });
    await reviewer.post(`/reviews/${review.id}/finding`, finding()).expect(200);
    await round.move('answering');
    const over = await reviewer.post(`/reviews/${review.id}/take-back`).expect(409);
    expect(over.body.type).toBe('wrong-stage');
    server.clock.set(before);
  });

  it('can be taken back by its reviewer alone', async () => {
    const { review, author, reviewer } = await dealt();
    await reviewer.post(`/reviews/${review.id}/finding`, finding()).expect(200);
    await author.post(`/reviews/${review.id}/take-back`).expect(404);
    await server.visitor().post(`/reviews/${review.id}/take-back`).expect(401);
    await reviewer.post(`/reviews/${review.id}/take-back`).expect(200);
  });
});

describe('setting aside', () => {
  it('closes the review with its reason', async () => {
    const { review, reviewer, author } = await dealt();
    const path = `/reviews/${review.id}/set-aside`;
    await author.post(path, { reason: 'cannot-read' }).expect(404);
    await server.visitor().post(path, { reason: 'cannot-read' }).expect(401);
    await reviewer.post(path, { reason: 'bored' }).expect(422);
    const { body } = await reviewer.post(path, { reason: 'know-the-author' }).expect(200);
    expect(body).toMatchObject({ setAside: 'know-the-author', canEdit: false });
    await reviewer.post(`/reviews/${review.id}/finding`, finding()).expect(409);
  });

  it('asks to take a finding back first', async () => {
    const { review, reviewer } = await dealt();
    await reviewer.post(`/reviews/${review.id}/finding`, finding()).expect(200);
    await reviewer.post(`/reviews/${review.id}/set-aside`, { reason: 'cannot-read' }).expect(409);
  });
});

describe('the result', () => {
  it('tells the reviewer, once settled, how the own pick fared', async () => {
    const { review, reviewer, round } = await dealt();
    await reviewer.post(`/reviews/${review.id}/finding`, finding({ pick: 3, sureness: 4 })).expect(200);
    await round.move('answering');
    expect((await reviewer.get(`/reviews/${review.id}`)).body.result).toBeNull();
    await round.move('settled');
    const { body } = await reviewer.get(`/reviews/${review.id}`).expect(200);
    expect(body.result).toMatchObject({ outcome: 'carried', counted: true, rescored: false });
    expect(body.result.verdict).toMatchObject({ outcome: 'faulty', firstFault: 2, decidedBy: 'checker' });
    expect(Number.isInteger(body.result.points)).toBe(true);
  });

  it('rules on what the reviewer would have written, only then', async () => {
    const { review, reviewer, round } = await dealt();
    const given = finding({ shouldBe: 'x^2+x-5x-5-2x^2-6x' });
    const handedIn = await reviewer.post(`/reviews/${review.id}/finding`, given).expect(200);
    expect(handedIn.body.result).toBeNull();
    await round.move('settled');
    expect((await reviewer.get(`/reviews/${review.id}`)).body.result.shouldBe).toBe('holds');
    const other = await dealt();
    await other.reviewer.post(`/reviews/${other.review.id}/finding`, finding({ shouldBe: 'x^2+7' })).expect(200);
    await other.round.move('settled');
    expect((await other.reviewer.get(`/reviews/${other.review.id}`)).body.result.shouldBe).toBe('fails');
  });

  it('can be contested for a week, once at a time', async () => {
    const { review, reviewer, author, round } = await dealt();
    const path = `/reviews/${review.id}/contest`;
    await reviewer.post(`/reviews/${review.id}/finding`, finding({ pick: 3, sureness: 4 }));
    const early = await reviewer.post(path, { words: 'Look again.' }).expect(409);
    expect(early.body.type).toBe('wrong-stage');
    await round.move('settled');
    await author.post(path, { words: 'Look again.' }).expect(404);
    await server.visitor().post(path, { words: 'Look again.' }).expect(401);
    await reviewer.post(path, { words: '' }).expect(422);
    const { body } = await reviewer.post(path, { words: 'Step 3 drops a term.' }).expect(200);
    expect(body.result.contest.mine).toMatchObject({ words: 'Step 3 drops a term.', open: true });
    await reviewer.post(path, { words: 'Once more.' }).expect(409);
    const before = server.clock.now();
    server.clock.advance({ days: 7, seconds: 1 });
    expect((await reviewer.get(`/reviews/${review.id}`)).body.result.contest.openUntil).toBeNull();
    server.clock.set(before);
  });
});
