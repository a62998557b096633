import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Derivation, DerivationVersion } from '../../api/features/derivations/derivations.entity.ts';
import type { User } from '../../api/features/people/people.entity.ts';
import { Round } from '../../api/features/rounds/rounds.entity.ts';
import { CHECKER_VERSION } from '../../api/features/verdicts/checker-version.ts';
import { VerdictRecord } from '../../api/features/verdicts/verdicts.entity.ts';
import { createVerdictsService } from '../../api/features/verdicts/verdicts.service.ts';
import type { MendView, SheetView } from '../../shared/schemas/derivation.ts';
import { startTestServer, type Client, type TestServer } from '../support/test-server.ts';
import { frozenTask, sheet, step } from '../support/sheets.ts';

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.stop());

let round: Round;
let author: User;
let client: Client;

beforeEach(async () => {
  const people = await server.create.classWith({ students: 2 });
  const task = await server.create.task(people.teacher);
  round = await server.create.round(people.class, task, { stage: 'writing', frozen: frozenTask(task) as object });
  author = people.students[0] as User;
  client = await server.signIn(author);
});

const db = () => server.dataSource.manager;

async function handIn(lines: readonly string[]): Promise<SheetView> {
  const path = `/rounds/${round.id}/sheet`;
  const view = (await client.get(path).expect(200)).body as SheetView;
  const document = sheet(...lines.map((tex) => step(tex)));
  const saved = await client.put(path, { document, baseVersion: view.draft.version }).expect(200);
  return (await client.post(`${path}/hand-in`, { draftVersion: saved.body.version }).expect(200)).body as SheetView;
}

function service(check: () => Promise<never>) {
  const { db: dataSource, now, queue } = server.platform;
  return createVerdictsService({ db: dataSource, now, queue, check, checkerVersion: CHECKER_VERSION });
}

describe('the check of what was handed in', () => {
  it('stores ruling, how reached, evidence and version once, however often it runs', async () => {
    const { derivationId } = await handIn(['x^2-3x+2x-6', 'x^2-5x-6', 'x^2-5x-6+0']);
    await server.runJobs();
    const version = await db().findOneByOrFail(DerivationVersion, { derivationId });
    const [verdict, ...more] = await db().findBy(VerdictRecord, { versionId: version.id });
    expect(more).toEqual([]);
    expect(verdict).toMatchObject({
      outcome: 'faulty',
      firstFault: 2,
      source: 'checker',
      checkerVersion: CHECKER_VERSION,
    });
    expect(verdict?.steps.map(({ ruling }) => ruling)).toEqual(['holds', 'fails', 'holds']);
    expect(verdict?.steps[1]?.evidence.witness).toBeDefined();
    await service(() => Promise.reject(new Error('not to be asked again'))).checkVersion(version.id);
    expect(await db().countBy(VerdictRecord, { versionId: version.id })).toBe(1);
  });

  it('is not queued when the handing in is rolled back', async () => {
    const { queueCheck } = service(() => Promise.reject(new Error('never')));
    await server.runJobs();
    await expect(
      server.dataSource.transaction(async (manager) => {
        await queueCheck(manager, randomUUID());
        throw new Error('rolled back');
      }),
    ).rejects.toThrow('rolled back');
    expect(await server.runJobs()).toBe(0);
  });

  it('lets the latest ruling stand above the checker', async () => {
    const { derivationId } = await handIn(['x^2-6']);
    await server.runJobs();
    const version = await db().findOneByOrFail(DerivationVersion, { derivationId });
    const { currentVerdict } = service(() => Promise.reject(new Error('never')));
    expect(await currentVerdict(db(), version.id)).toMatchObject({ source: 'checker', outcome: 'faulty' });
    await db().insert(VerdictRecord, {
      versionId: version.id,
      source: 'ruling',
      rulingId: null,
      outcome: 'sound',
      firstFault: null,
      steps: [],
      checkerVersion: CHECKER_VERSION,
      ms: 0,
    });
    expect(await currentVerdict(db(), version.id)).toMatchObject({ source: 'ruling', outcome: 'sound' });
    expect(await currentVerdict(db(), randomUUID())).toBeNull();
  });
});

describe('POST /tasks/try', () => {
  const body = {
    given: '(x+1)^2',
    goal: { kind: 'expanded' },
    assumptions: [],
    settings: {},
    lines: ['x^2+1'],
  };

  it('rules on a model derivation and keeps nothing', async () => {
    const teacher = await server.signIn(await server.create.user('teacher'));
    const answer = await teacher.post('/tasks/try', body).expect(200);
    expect(answer.body).toMatchObject({ outcome: 'faulty', firstFault: 1 });
    expect(Object.keys(answer.body).sort()).toEqual(['firstFault', 'outcome', 'steps']);
    await teacher.post('/tasks/try', { ...body, lines: [] }).expect(422);
  });

  it('is closed to students and to people signed out', async () => {
    await client.post('/tasks/try', body).expect(403);
    await server.visitor().post('/tasks/try', body).expect(401);
  });
});

describe('a mend', () => {
  const path = (id: string) => `/derivations/${id}/mend`;

  async function settled(lines: readonly string[]): Promise<string> {
    const { derivationId } = await handIn(lines);
    await server.runJobs();
    await db().update(Round, { id: round.id }, { stage: 'settled', settledAt: server.clock.now() });
    return derivationId;
  }

  it('goes on from the fault and is checked like the first', async () => {
    const id = await settled(['x^2-3x+2x-6', 'x^2-5x-6']);
    const view = (await client.get(path(id)).expect(200)).body as MendView;
    expect(view).toMatchObject({ firstFault: 2, handedIn: null });
    expect(view.fixed.map(({ tex }) => tex)).toEqual(['(x+2)(x-3)', 'x^2-3x+2x-6']);
    expect(view.draft.document.content[0]?.attrs).toMatchObject({ tex: 'x^2-5x-6' });
    const saved = await client
      .put(path(id), { document: sheet(step('x^2-x-6')), baseVersion: view.draft.version })
      .expect(200);
    const posted = await client.post(`${path(id)}/hand-in`, { draftVersion: saved.body.version }).expect(200);
    expect(posted.body.handedIn).toMatchObject({ number: 1, verdict: null });
    await server.runJobs();
    const after = (await client.get(path(id)).expect(200)).body as MendView;
    expect(after.handedIn?.verdict).toMatchObject({ outcome: 'sound', firstFault: null });
    const derivation = await db().findOneByOrFail(Derivation, { id });
    const current = await db().findOneByOrFail(DerivationVersion, { id: derivation.currentVersionId ?? '' });
    expect(current.purpose).toBe('submission');
  });

  it('is closed before the round is settled, on every road', async () => {
    const { derivationId } = await handIn(['x^2-6']);
    await server.runJobs();
    for (const stage of ['writing', 'reviewing', 'answering'] as const) {
      await db().update(Round, { id: round.id }, { stage });
      const body = { document: sheet(step('x')), baseVersion: 1 };
      const answers = [
        await client.get(path(derivationId)).expect(409),
        await client.put(path(derivationId), body).expect(409),
        await client.post(`${path(derivationId)}/hand-in`, { draftVersion: 1 }).expect(409),
      ];
      for (const answer of answers) expect(JSON.stringify(answer.body)).not.toMatch(/firstFault|outcome|witness/);
    }
  });

  it('has nothing to mend where every step follows', async () => {
    const id = await settled(['x^2-x-6']);
    const { body } = await client.get(path(id)).expect(409);
    expect(body.type).toBe('wrong-stage');
  });

  it('answers 422 to bad input and to a mend without a line', async () => {
    const id = await settled(['x^2-6']);
    const view = (await client.get(path(id)).expect(200)).body as MendView;
    await client.put(path(id), { document: { type: 'doc' }, baseVersion: 1 }).expect(422);
    await client.post(`${path(id)}/hand-in`, {}).expect(422);
    const empty = await client
      .put(path(id), { document: sheet(step('')), baseVersion: view.draft.version })
      .expect(200);
    await client.post(`${path(id)}/hand-in`, { draftVersion: empty.body.version }).expect(422);
    await client.put(path(id), { document: sheet(step('x')), baseVersion: view.draft.version }).expect(409);
  });

  it('answers 401 signed out, 403 to a teacher, 404 to everyone but its author', async () => {
    const id = await settled(['x^2-6']);
    await client.get(path(id)).expect(200);
    const body = { document: sheet(step('x^2-x-6')), baseVersion: 1 };
    const saved = await client.put(path(id), body).expect(200);
    const post = { draftVersion: saved.body.version };
    const others = [
      [server.visitor(), 401],
      [await server.signIn(await server.create.user('teacher')), 403],
      [await server.signIn(await server.create.user('student')), 404],
    ] as const;
    for (const [someone, status] of others) {
      await someone.get(path(id)).expect(status);
      await someone.put(path(id), body).expect(status);
      await someone.post(`${path(id)}/hand-in`, post).expect(status);
    }
    await client.post(`${path(id)}/hand-in`, post).expect(200);
  });
});
