import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Dispute } from '../../api/features/disputes/disputes.entity.ts';
import type { Route } from '../../api/http/route.ts';
import { FAULTY, finding, OPEN, reviewedRound, SOUND, type ReviewedRound } from '../support/reviewed-round.ts';
import { startTestServer, type Client, type TestServer } from '../support/test-server.ts';

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.stop());

/** Six students, three derivations, every kind of verdict; each reviewer has handed in, one author has contested. */
async function played(): Promise<ReviewedRound> {
  const round = await reviewedRound(server, {
    students: 6,
    verdicts: [FAULTY, SOUND, OPEN],
    deal: [
      [0, 1],
      [0, 2],
      [1, 3],
      [1, 0],
      [2, 4],
      [2, 5],
    ],
  });
  for (const [author, reviewer] of [
    [0, 1],
    [0, 2],
    [1, 3],
    [1, 0],
    [2, 4],
    [2, 5],
  ] as const) {
    const review = await round.review(author, reviewer);
    await (await server.signIn(round.students[reviewer]!)).post(`/reviews/${review.id}/finding`, finding()).expect(200);
  }
  return round;
}

interface Asked {
  readonly who: string;
  readonly path: string;
  readonly text: string;
}

/** Every GET that a student may call, with every id there is put into it: the answers given (drawn aliases left out). */
async function snoop(
  round: ReviewedRound,
  student: number,
  ids: Readonly<Record<string, readonly string[]>>,
): Promise<Asked[]> {
  const client = await server.signIn(round.students[student]!);
  const routes = server.features.routes.filter(
    (route) => route.method === 'get' && ['signed-in', 'student', 'anyone'].includes(route.who),
  );
  const asked: Asked[] = [];
  for (const route of routes) {
    for (const path of fill(route, ids)) {
      const { status, text } = await client.get(path);
      if (status < 400 && !path.startsWith('/mailbox') && !path.startsWith('/health') && !path.endsWith('/aliases'))
        asked.push({ who: round.students[student]!.id, path, text });
    }
  }
  return asked;
}

function fill({ path }: Route, ids: Readonly<Record<string, readonly string[]>>): string[] {
  const [name] = /:(\w+)/.exec(path)?.slice(1) ?? [];
  if (!name) return [path];
  return (ids[name] ?? []).flatMap((id) => fill({ path: path.replace(`:${name}`, id) } as Route, ids));
}

async function idsOf(round: ReviewedRound) {
  const reviews = await Promise.all(
    [
      [0, 1],
      [0, 2],
      [1, 3],
      [1, 0],
      [2, 4],
      [2, 5],
    ].map(([a, r]) => round.review(a!, r!)),
  );
  const disputes = await server.dataSource.getRepository(Dispute).findBy({ roundId: round.round.id });
  return {
    classId: [round.class.id],
    roundId: [round.round.id],
    taskId: [round.round.taskId],
    reviewId: reviews.map(({ id }) => id),
    derivationId: round.derivations.map(({ derivation }) => derivation.id),
    disputeId: disputes.map(({ id }) => id),
  };
}

/** Nothing of these may stand in any answer to a student before the round is settled. */
const OF_A_VERDICT = [
  /"ruling":/,
  /"witness"/,
  /"firstFault":\s*\d/,
  /"wrongPart"/,
  /"mended"/,
  /"reached"/,
  /checkerVersion/,
  /"points":/,
  /sign-of-a-product/,
  /not-covered/,
];

function expectClean(round: ReviewedRound, student: number, asked: readonly Asked[]): void {
  expect(asked.length).toBeGreaterThan(3);
  for (const { path, text } of asked) {
    for (const pattern of OF_A_VERDICT) expect(text, `${path} tells of a verdict`).not.toMatch(pattern);
    for (const [i, { id, name }] of round.students.entries()) {
      if (i === student) continue;
      expect(text, `${path} names a classmate's id`).not.toContain(id);
      expect(text, `${path} names a classmate`).not.toContain(`"${name}"`);
    }
    for (const [author, { version }] of round.derivations.entries()) {
      // One's own sheet has the ids of one's own steps.
      if (author === student) continue;
      expect(text, `${path} carries a version`).not.toContain(version.id);
      for (const { stepId } of version.lines)
        if (stepId !== 'given') expect(text, `${path} carries a step's id`).not.toContain(stepId);
    }
  }
}

describe('a snooping student', () => {
  it.each(['reviewing', 'answering'] as const)('learns nothing while the round is in %s', async (stage) => {
    const round = await played();
    if (stage === 'answering') await round.move('answering');
    const ids = await idsOf(round);
    for (const student of [0, 1, 3, 5]) expectClean(round, student, await snoop(round, student, ids));
  });

  it('learns nothing from a ruling before settling, nor from the mail', async () => {
    const round = await played();
    await round.move('answering');
    const ids = await idsOf(round);
    const before = await Promise.all([2, 4].map((student) => snoop(round, student, ids)));
    const teacher = await server.signIn(round.teacher);
    for (const disputeId of ids.disputeId) {
      await teacher
        .post(`/disputes/${disputeId}/ruling`, { decision: 'fails', reason: 'A product was lost.' })
        .expect(204);
    }
    const after = await Promise.all([2, 4].map((student) => snoop(round, student, ids)));
    expect(after).toEqual(before);
    await server.runJobs();
    for (const mail of server.mails) expect(mail.text).not.toContain('A product was lost.');
  });

  it('is answered alike whether or not a contest goes to the desk', async () => {
    const round = await played();
    await round.move('answering');
    const answers: unknown[] = [];
    for (const student of [0, 1, 2]) {
      const client: Client = await server.signIn(round.students[student]!);
      const path = `/derivations/${round.derivations[student]!.derivation.id}`;
      const [first] = (await client.get(path)).body.findings;
      const { status, text } = await client.put(`/findings/${first.key}/answer`, { kind: 'contest', reason: 'No.' });
      answers.push({ status, text });
    }
    expect(new Set(answers.map((answer) => JSON.stringify(answer))).size).toBe(1);
  });

  it('cannot tell who reviewed: keys and order are drawn at random', async () => {
    const round = await played();
    await round.move('answering');
    const client = await server.signIn(round.students[0]!);
    const { body } = await client.get(`/derivations/${round.derivations[0]!.derivation.id}`);
    const ids = await idsOf(round);
    for (const reviewId of ids.reviewId) expect(JSON.stringify(body.findings)).not.toContain(reviewId);
    const keys = body.findings.map((each: { key: string }) => each.key);
    expect(keys).toEqual([...keys].sort());
  });

  it('reads no times of others: hand-in instants leave with nobody', async () => {
    const round = await played();
    await round.move('answering');
    const asked = await snoop(round, 0, await idsOf(round));
    for (const { path, text } of asked.filter(
      ({ path: at }) => at.startsWith('/reviews') || at.startsWith('/derivations'),
    )) {
      expect(text, path).not.toMatch(/handedInAt|createdAt|savedAt|takenBackAt|openedAt/);
    }
  });
});
