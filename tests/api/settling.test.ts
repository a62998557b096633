import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Dispute } from '../../api/features/disputes/disputes.entity.ts';
import { Score } from '../../api/features/reviews/reviews.entity.ts';
import { Excuse, Round } from '../../api/features/rounds/rounds.entity.ts';
import type { FindingDraft } from '../../shared/schemas/finding.ts';
import {
  FAULT,
  FAULTY,
  finding,
  OPEN,
  reviewedRound,
  settlingOf,
  SOUND,
  type ReviewedRound,
  type Ruled,
} from '../support/reviewed-round.ts';
import { startTestServer, type TestServer } from '../support/test-server.ts';

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.stop());

/** Hands in one finding by student 1 on a derivation with this verdict, settles, and answers the score. */
async function scoreOf(
  verdict: readonly Ruled[],
  given: Partial<FindingDraft> | null,
  before?: (round: ReviewedRound) => Promise<unknown>,
) {
  const round = await reviewedRound(server, { verdicts: [verdict], deal: [[0, 1]] });
  const review = await round.review(0, 1);
  if (given)
    await (await server.signIn(round.students[1]!)).post(`/reviews/${review.id}/finding`, finding(given)).expect(200);
  await round.move('answering');
  await before?.(round);
  await round.move('settled');
  return await server.dataSource.getRepository(Score).findOneByOrFail({ reviewId: review.id });
}

describe('scores at settling', () => {
  // n = 4: b is 17/16 on a step and 5/16 on "no fault"; by hand from the formula.
  it.each<[string, readonly Ruled[], Partial<FindingDraft> | null, Partial<Score>]>([
    ['the first fault', FAULTY, { pick: 2, sureness: 5 }, { outcome: 'right', points: 79.6875, counted: true }],
    ['a carried step', FAULTY, { pick: 3, sureness: 5 }, { outcome: 'carried', points: -20.3125, counted: true }],
    [
      'a step before the fault',
      FAULTY,
      { pick: 1, sureness: 5 },
      { outcome: 'not-first', points: -20.3125, counted: true },
    ],
    ['"no fault" on a faulty one', FAULTY, { pick: 'none', sureness: 5 }, { outcome: 'missed', counted: true }],
    [
      '"no fault" on a sound one',
      SOUND,
      { pick: 'none', sureness: 5 },
      { outcome: 'right', points: 23.4375, counted: true },
    ],
    [
      'a step of a sound one',
      SOUND,
      { pick: 2, sureness: 5 },
      { outcome: 'false-alarm', points: -57.8125, counted: true },
    ],
    ['"can\'t tell"', FAULTY, { pick: null, sureness: 0 }, { outcome: 'no-pick', points: 0, counted: true }],
    ['nothing handed in', FAULTY, null, { outcome: 'not-handed-in', points: 0, counted: true }],
    ['anything on an undecided one', OPEN, { pick: 2, sureness: 8 }, { outcome: 'void', points: 0, counted: false }],
    [
      'a later step that fails by itself',
      ['holds', FAULT, { ruling: 'fails' }, 'holds'],
      { pick: 3, sureness: 5 },
      { outcome: 'not-first', counted: true },
    ],
  ])('%s', async (_name, verdict, given, expected) => {
    expect(await scoreOf(verdict, given)).toMatchObject(expected);
  });

  it.each(['presentation', 'domain', 'constant', 'one-way'] as const)(
    'voids a pick on a step with a %s note',
    async (note) => {
      const noted: Ruled = { ruling: 'holds', notes: [note] };
      expect(await scoreOf([noted, FAULT, 'holds', 'holds'], { pick: 1, sureness: 8 })).toMatchObject({
        outcome: 'void',
        counted: false,
        points: 0,
      });
      const fault: Ruled = { ...FAULT, notes: [note] };
      expect(await scoreOf(['holds', fault, 'holds', 'holds'], { pick: 2, sureness: 8 })).toMatchObject({
        outcome: 'right',
        counted: true,
      });
    },
  );

  it('counts the named slip and the marked term apart, where they could be named', async () => {
    const named = await scoreOf(FAULTY, { slipKind: 'sign', markedSpan: { start: 8, end: 10 } });
    expect(named).toMatchObject({ slipNamed: true, termMarked: true });
    const wide = await scoreOf(FAULTY, { slipKind: 'brackets', markedSpan: { start: 5, end: 10 } });
    expect(wide).toMatchObject({ slipNamed: false, termMarked: false, points: named.points });
    expect(await scoreOf(SOUND, { pick: 'none' })).toMatchObject({ slipNamed: null, termMarked: null });
    const unnamed: Ruled = { ...FAULT, evidence: { witness: FAULT.evidence!.witness! } };
    expect(await scoreOf(['holds', unnamed, 'holds', 'holds'], { slipKind: 'sign' })).toMatchObject({
      slipNamed: null,
      termMarked: null,
    });
  });

  it('excuses whoever is excused or set the review aside', async () => {
    const excused = await scoreOf(FAULTY, null, ({ round, students, teacher }) =>
      server.dataSource
        .getRepository(Excuse)
        .save({ roundId: round.id, userId: students[1]!.id, createdById: teacher.id }),
    );
    expect(excused).toMatchObject({ outcome: 'excused', counted: false });
    const round = await reviewedRound(server, { deal: [[0, 1]] });
    const review = await round.review(0, 1);
    await (
      await server.signIn(round.students[1]!)
    )
      .post(`/reviews/${review.id}/set-aside`, { reason: 'cannot-read' })
      .expect(200);
    await round.move('settled');
    expect(await server.dataSource.getRepository(Score).findOneByOrFail({ reviewId: review.id })).toMatchObject({
      outcome: 'excused',
      counted: false,
    });
  });
});

describe('open disputes', () => {
  async function settle(round: ReviewedRound, force: boolean) {
    return await server.dataSource.transaction(async (manager) =>
      settlingOf(server).settle(manager, await manager.findOneByOrFail(Round, { id: round.round.id }), { force }),
    );
  }

  it('keep the round waiting until they are ruled on', async () => {
    const round = await reviewedRound(server, { verdicts: [OPEN] });
    await round.move('answering');
    expect(await settle(round, false)).toEqual({ waiting: true });
    expect(await server.dataSource.getRepository(Score).count({ where: { review: { roundId: round.round.id } } })).toBe(
      0,
    );
    const [dispute] = await server.dataSource.getRepository(Dispute).findBy({ roundId: round.round.id });
    await (
      await server.signIn(round.teacher)
    )
      .post(`/disputes/${dispute!.id}/ruling`, { decision: 'holds', reason: 'It does.' })
      .expect(204);
    expect(await settle(round, false)).toEqual({ waiting: false });
  });

  it('are void when the teacher settles all the same, and a contested finding with them', async () => {
    const round = await reviewedRound(server, {
      deal: [
        [0, 1],
        [0, 2],
      ],
    });
    const reviewer = await server.signIn(round.students[1]!);
    const review = await round.review(0, 1);
    await reviewer.post(`/reviews/${review.id}/finding`, finding()).expect(200);
    await (
      await server.signIn(round.students[2]!)
    )
      .post(`/reviews/${(await round.review(0, 2)).id}/finding`, finding())
      .expect(200);
    await round.move('answering');
    const author = await server.signIn(round.students[0]!);
    const path = `/derivations/${round.derivations[0]!.derivation.id}`;
    const [first] = (await author.get(path)).body.findings;
    await author.put(`/findings/${first.key}/answer`, { kind: 'contest', reason: 'No.' }).expect(204);
    await round.move('settled');
    const outcomes = (await author.get(path)).body.findings.map((each: { outcome: string }) => each.outcome).sort();
    expect(outcomes).toEqual(['right', 'void']);
  });

  it('are opened once, also when answering opens twice', async () => {
    const round = await reviewedRound(server, { verdicts: [OPEN] });
    await round.move('answering');
    await round.move('answering');
    expect(await server.dataSource.getRepository(Dispute).countBy({ roundId: round.round.id })).toBe(1);
  });

  it('wait for a derivation that was never checked, too', async () => {
    const round = await reviewedRound(server, { verdicts: [null] });
    await round.move('answering');
    expect(await settle(round, false)).toEqual({ waiting: true });
  });

  it('settles twice without a second score', async () => {
    const round = await reviewedRound(server, {});
    await round.move('settled');
    await round.move('settled');
    expect(await server.dataSource.getRepository(Score).count({ where: { review: { roundId: round.round.id } } })).toBe(
      2,
    );
  });
});
