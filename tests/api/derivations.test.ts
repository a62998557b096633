import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Derivation, DerivationVersion, Draft } from '../../api/features/derivations/derivations.entity.ts';
import { Membership } from '../../api/features/classes/classes.entity.ts';
import type { User } from '../../api/features/people/people.entity.ts';
import { Review } from '../../api/features/reviews/reviews.entity.ts';
import { Extension, Round } from '../../api/features/rounds/rounds.entity.ts';
import type { SheetView } from '../../shared/schemas/derivation.ts';
import { startTestServer, type Client, type TestServer } from '../support/test-server.ts';
import { frozenTask, prose, sheet, step } from '../support/sheets.ts';

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.stop());

const STEP = randomUUID();

let round: Round;
let author: User;
let other: User;
let client: Client;

beforeEach(async () => {
  ({ round, author, other } = await openRound());
  client = await server.signIn(author);
});

async function openRound(values: Partial<Round> = {}) {
  const people = await server.create.classWith({ students: 2 });
  const task = await server.create.task(people.teacher);
  const [first, second] = people.students as [User, User];
  const made = await server.create.round(people.class, task, {
    stage: 'writing',
    frozen: frozenTask(task) as object,
    ...(values as object),
  });
  return { round: made, author: first, other: second, teacher: people.teacher, of: people.class };
}

const path = () => `/rounds/${round.id}/sheet`;
const read = async () => (await client.get(path()).expect(200)).body as SheetView;
const save = (document: object, baseVersion: number) => client.put(path(), { document, baseVersion });

async function writeAndHandIn(lines = ['x^2-x-6']): Promise<SheetView> {
  const { draft } = await read();
  const saved = await save(sheet(...lines.map((tex) => step(tex))), draft.version).expect(200);
  const answer = await client.post(`${path()}/hand-in`, { draftVersion: saved.body.version }).expect(200);
  return answer.body as SheetView;
}

describe('GET /rounds/:roundId/sheet', () => {
  it('begins the derivation at the first look, and only then', async () => {
    const first = await read();
    const second = await read();
    expect(second.derivationId).toBe(first.derivationId);
    expect(first).toMatchObject({ stage: 'writing', canWrite: true, handedIn: null, task: { given: '(x+2)(x-3)' } });
    expect(await server.dataSource.manager.countBy(Derivation, { roundId: round.id })).toBe(1);
  });

  it('makes one derivation of two first looks at once', async () => {
    await Promise.all([read(), read(), read()]);
    expect(await server.dataSource.manager.countBy(Derivation, { roundId: round.id })).toBe(1);
    expect(await server.dataSource.manager.countBy(Draft, {})).toBeGreaterThan(0);
  });

  it('answers 401 signed out, 403 to a teacher, 404 to a stranger and to somebody removed', async () => {
    await read();
    await server.visitor().get(path()).expect(401);
    const stranger = await openRound();
    await (await server.signIn(stranger.teacher)).get(path()).expect(403);
    await (await server.signIn(stranger.author)).get(path()).expect(404);
    await server.dataSource.manager.update(Membership, { userId: author.id }, { removedAt: server.clock.now() });
    await client.get(path()).expect(404);
  });

  it('answers 409 before writing has begun', async () => {
    await server.dataSource.manager.update(Round, { id: round.id }, { stage: 'planned' });
    const { body } = await client.get(path()).expect(409);
    expect(body.type).toBe('wrong-stage');
  });

  it('begins nothing when writing is over', async () => {
    await server.dataSource.manager.update(Round, { id: round.id }, { stage: 'reviewing' });
    server.clock.set(new Date(round.writingEndsAt.getTime() + 3_600_000));
    await client.get(path()).expect(409);
    expect(await server.dataSource.manager.countBy(Derivation, { roundId: round.id })).toBe(0);
    server.clock.set('2031-03-03T09:00:00.000Z');
  });
});

describe('PUT /rounds/:roundId/sheet', () => {
  it('saves over the version it was made from', async () => {
    const { draft } = await read();
    const document = sheet(step('x^2-x-6', 'multiply'), prose('that is all'));
    const { body } = await save(document, draft.version).expect(200);
    expect(body.version).toBe(draft.version + 1);
    expect((await read()).draft).toMatchObject({ document, version: body.version });
  });

  it('answers 409 with what the other window saved', async () => {
    const { draft } = await read();
    const theirs = sheet(step('x^2-6'));
    await save(theirs, draft.version).expect(200);
    const { body } = await save(sheet(step('x^2')), draft.version).expect(409);
    expect(body).toMatchObject({
      type: 'conflict',
      extra: { draft: { version: draft.version + 1, document: theirs } },
    });
  });

  it('lets one of two saves at once win', async () => {
    const { draft } = await read();
    const answers = await Promise.all([save(sheet(step('a')), draft.version), save(sheet(step('b')), draft.version)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  });

  it.each([
    ['an unknown node', { type: 'doc', content: [{ type: 'image', attrs: { src: 'x' } }] }, 'not “image”'],
    [
      'an unknown node in words',
      { type: 'doc', content: [{ type: 'paragraph', content: [{ type: 'video' }] }] },
      'not “video”',
    ],
    [
      'another mark',
      sheet({ type: 'paragraph', content: [{ type: 'text', text: 'a', marks: [{ type: 'link' }] }] }),
      'bold or italic',
    ],
    ['a line too long', sheet(step('x'.repeat(4001))), 'at most 4000'],
    ['too many lines', sheet(...Array.from({ length: 201 }, () => step('x'))), 'at most 200 lines'],
    ['too much', sheet(...Array.from({ length: 60 }, () => step('x'.repeat(3900)))), 'at most 200 kB'],
    [
      'two lines of one id',
      sheet(
        { ...step('x'), attrs: { stepId: STEP, tex: 'x', reason: '', uses: null } },
        { type: 'step', attrs: { stepId: STEP, tex: 'y', reason: '', uses: null } },
      ),
      'share one id',
    ],
  ])('answers 422 to %s', async (_name, document, words) => {
    const { draft } = await read();
    const { body } = await save(document, draft.version).expect(422);
    expect(JSON.stringify(body.errors)).toContain(words);
  });

  it('answers 401 signed out, 403 to a teacher, 404 to a stranger', async () => {
    const { draft } = await read();
    const stranger = await openRound();
    const body = { document: sheet(step('x')), baseVersion: draft.version };
    await server.visitor().put(path(), body).expect(401);
    await (await server.signIn(stranger.teacher)).put(path(), body).expect(403);
    await (await server.signIn(stranger.author)).put(path(), body).expect(404);
    await client.put(path(), body).expect(200);
  });

  it('keeps each person to the own sheet', async () => {
    const { draft, derivationId } = await read();
    await save(sheet(step('mine')), draft.version).expect(200);
    const theirs = (await (await server.signIn(other)).get(path()).expect(200)).body as SheetView;
    expect(theirs.derivationId).not.toBe(derivationId);
    expect(theirs.draft.document.content).toEqual([]);
  });
});

describe('GET /rounds/:roundId/sheet/preview', () => {
  const preview = () => client.get(`${path()}/preview`);

  it('shows the lines as they would be posted, and names from the class list', async () => {
    const { draft } = await read();
    const first = step('x^2-x-6', 'as Person showed me');
    await save(sheet(prose('First.'), first, step(''), step('x(x-1)-6', '', [first.attrs.stepId])), draft.version);
    const { body } = await preview().expect(200);
    expect(body.lines.map(({ tex }: { tex: string }) => tex)).toEqual(['(x+2)(x-3)', 'x^2-x-6', 'x(x-1)-6']);
    expect(body.lines[1]).toMatchObject({ prose: 'First.', reason: 'as Person showed me', uses: null });
    expect(body.lines[2].uses).toEqual([1]);
    expect(body.emptyLines).toBe(1);
    expect(body.names).toContain('Person');
  });

  it('answers 401 signed out, 403 to a teacher, 404 to a stranger', async () => {
    await preview().expect(200);
    const stranger = await openRound();
    await server.visitor().get(`${path()}/preview`).expect(401);
    await (await server.signIn(stranger.teacher)).get(`${path()}/preview`).expect(403);
    await (await server.signIn(stranger.author)).get(`${path()}/preview`).expect(404);
  });
});

describe('POST /rounds/:roundId/sheet/hand-in', () => {
  it('makes an immutable version and queues its check', async () => {
    const view = await writeAndHandIn(['x^2-3x+2x-6', 'x^2-x-6']);
    expect(view).toMatchObject({ canWrite: false, canTakeBack: true, handedIn: { late: false } });
    expect(view.handedIn?.lines.map(({ tex }) => tex)).toEqual(['(x+2)(x-3)', 'x^2-3x+2x-6', 'x^2-x-6']);
    const derivation = await server.dataSource.getRepository(Derivation).findOneByOrFail({ id: view.derivationId });
    expect(derivation.currentVersionId).not.toBeNull();
    expect(await server.runJobs()).toBeGreaterThan(0);
  });

  it('tells the author nothing of a verdict', async () => {
    await writeAndHandIn(['x^2-6']);
    await server.runJobs();
    expect(JSON.stringify(await read())).not.toMatch(/verdict|ruling|outcome|firstFault|witness|faulty/i);
  });

  it('answers 422 without a line, 409 for another version than the one shown', async () => {
    const { draft } = await read();
    await client.post(`${path()}/hand-in`, { draftVersion: draft.version }).expect(422);
    await client.post(`${path()}/hand-in`, { draftVersion: 'x' }).expect(422);
    const { body } = await client.post(`${path()}/hand-in`, { draftVersion: draft.version + 5 }).expect(409);
    expect(body.type).toBe('conflict');
  });

  it('refuses changes and a second handing in until it is taken back', async () => {
    const { draft } = await writeAndHandIn();
    await save(sheet(step('x')), draft.version).expect(409);
    await client.post(`${path()}/hand-in`, { draftVersion: draft.version }).expect(409);
  });

  it('keeps step ids from version to version', async () => {
    const first = await writeAndHandIn();
    await client.post(`${path()}/take-back`).expect(200);
    const second = await client.post(`${path()}/hand-in`, { draftVersion: first.draft.version }).expect(200);
    expect(second.body.handedIn.lines).toEqual(first.handedIn?.lines);
    const versions = await server.dataSource.manager.findBy(DerivationVersion, { derivationId: first.derivationId });
    expect(versions.map(({ number }) => number).sort()).toEqual([1, 2]);
  });

  it('answers 401 signed out, 403 to a teacher, 404 to a stranger', async () => {
    const { draft } = await read();
    const body = { draftVersion: draft.version };
    const stranger = await openRound();
    await server.visitor().post(`${path()}/hand-in`, body).expect(401);
    await (await server.signIn(stranger.teacher)).post(`${path()}/hand-in`, body).expect(403);
    await (await server.signIn(stranger.author)).post(`${path()}/hand-in`, body).expect(404);
    await writeAndHandIn();
  });
});

describe('times', () => {
  const at = (offsetMs: number) => server.clock.set(new Date(round.writingEndsAt.getTime() + offsetMs));
  const minutes = 60_000;
  afterAll(() => server.clock.set('2031-03-03T09:00:00.000Z'));
  beforeEach(() => server.clock.set('2031-03-03T09:00:00.000Z'));

  async function handInAt(offsetMs: number): Promise<number> {
    const { draft } = await read();
    const saved = await save(sheet(step('x^2-x-6')), draft.version).expect(200);
    at(offsetMs);
    return (await client.post(`${path()}/hand-in`, { draftVersion: saved.body.version })).status;
  }

  it('takes work within two minutes of grace, and none after', async () => {
    expect(await handInAt(1.9 * minutes)).toBe(200);
    await client.post(`${path()}/take-back`).expect(200);
    at(2.1 * minutes);
    const { body } = await client.post(`${path()}/take-back`).expect(409);
    expect(body.type).toBe('too-late');
  });

  it('closes at the end where late work is closed', async () => {
    expect(await handInAt(3 * minutes)).toBe(409);
  });

  it('takes late work until reviewing opens', async () => {
    await server.dataSource.manager.update(Round, { id: round.id }, { lateRule: 'until-reviewing' });
    expect(await handInAt(30 * minutes)).toBe(200);
    expect((await read()).handedIn).toMatchObject({ late: true });
    await server.dataSource.manager.update(Round, { id: round.id }, { stage: 'reviewing' });
    await client.post(`${path()}/take-back`).expect(409);
  });

  it('takes late work for the late batch until that is dealt', async () => {
    await server.dataSource.manager.update(Round, { id: round.id }, { lateRule: 'late-batch' });
    const { draft } = await read();
    const saved = await save(sheet(step('x^2-x-6')), draft.version).expect(200);
    await server.dataSource.manager.update(Round, { id: round.id }, { stage: 'reviewing' });
    at(60 * minutes);
    const handIn = () => client.post(`${path()}/hand-in`, { draftVersion: saved.body.version });
    await handIn().expect(200);
    await client.post(`${path()}/take-back`).expect(200);
    await server.dataSource.manager.update(Round, { id: round.id }, { lateDealtAt: server.clock.now() });
    await handIn().expect(409);
  });

  it('gives one person more time, also while others review', async () => {
    await server.dataSource.manager.insert(Extension, {
      roundId: round.id,
      userId: author.id,
      writingEndsAt: new Date(round.writingEndsAt.getTime() + 60 * minutes),
      reviewingEndsAt: null,
      createdById: author.id,
    });
    const { draft } = await read();
    const saved = await save(sheet(step('x^2-x-6')), draft.version).expect(200);
    await server.dataSource.manager.update(Round, { id: round.id }, { stage: 'reviewing' });
    at(59 * minutes);
    await client.post(`${path()}/hand-in`, { draftVersion: saved.body.version }).expect(200);
    expect((await read()).handedIn).toMatchObject({ late: false });
  });
});

describe('POST /rounds/:roundId/sheet/take-back', () => {
  it('gives the sheet back to be written on', async () => {
    await writeAndHandIn();
    const { body } = await client.post(`${path()}/take-back`).expect(200);
    expect(body).toMatchObject({ canWrite: true, handedIn: null });
  });

  it('answers 409 when somebody is already reviewing', async () => {
    const view = await writeAndHandIn();
    const version = await server.dataSource
      .getRepository(DerivationVersion)
      .findOneByOrFail({ derivationId: view.derivationId });
    await server.dataSource.manager.insert(Review, {
      roundId: round.id,
      derivationId: view.derivationId,
      versionId: version.id,
      reviewerId: other.id,
      position: 1,
      draft: null,
    });
    await client.post(`${path()}/take-back`).expect(409);
    expect((await read()).canTakeBack).toBe(false);
  });

  it('answers 401 signed out, 403 to a teacher, 404 to a stranger', async () => {
    await writeAndHandIn();
    const stranger = await openRound();
    await server.visitor().post(`${path()}/take-back`).expect(401);
    await (await server.signIn(stranger.teacher)).post(`${path()}/take-back`).expect(403);
    await (await server.signIn(stranger.author)).post(`${path()}/take-back`).expect(404);
    await client.post(`${path()}/take-back`).expect(200);
  });
});
