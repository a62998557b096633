import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Membership } from '../../api/features/classes/classes.entity.ts';
import type { User } from '../../api/features/people/people.entity.ts';
import type { RoundForm } from '../../shared/schemas/round.ts';
import type { ClassWithPeople } from '../support/factories.ts';
import { startTestServer, type Client, type TestServer } from '../support/test-server.ts';

let server: TestServer;
let school: ClassWithPeople;
let desk: Client;
let stranger: Client;
let student: Client;
let assistant: Client;
let taskId: string;

const DAY = 86_400_000;
const inDays = (days: number) => new Date(server.clock.now().getTime() + days * DAY).toISOString();

function plan(values: Partial<RoundForm> = {}): RoundForm {
  return {
    classId: school.class.id,
    taskId,
    opensAt: inDays(1),
    writingEndsAt: inDays(3),
    reviewingEndsAt: inDays(5),
    answeringEndsAt: inDays(6),
    settlesAt: inDays(7),
    reviewsPerDerivation: 2,
    lateRule: 'closed',
    ...values,
  };
}

async function planRound(values: Partial<RoundForm> = {}): Promise<string> {
  return (await desk.post('/rounds', plan(values)).expect(201)).body.id;
}

beforeAll(async () => {
  server = await startTestServer();
  school = await server.create.classWith({ students: 6 });
  desk = await server.signIn(school.teacher);
  student = await server.signIn(school.students[0] as User);
  const { schoolId } = school.teacher;
  stranger = await server.signIn(await server.create.user('teacher', { schoolId }));
  const helper = await server.create.user('student', { schoolId });
  await server.create.membership(school.class, helper, { role: 'assistant', alias: null });
  assistant = await server.signIn(helper);
  taskId = (await server.create.task(school.teacher)).id;
});
afterAll(() => server.stop());

describe('planning', () => {
  it('offers the teacher’s classes and tasks', async () => {
    await server.visitor().get('/round-choices').expect(401);
    await student.get('/round-choices').expect(403);
    const { body } = await desk.get('/round-choices').expect(200);
    expect(body.classes).toEqual([
      { id: school.class.id, name: school.class.name, timeZone: 'Europe/Lisbon', students: 6 },
    ]);
    expect(body.tasks).toMatchObject([{ id: taskId, given: '(x+2)(x-3)' }]);
  });

  it('numbers rounds within the class from 1, also when two are planned at once', async () => {
    await server.visitor().post('/rounds', plan()).expect(401);
    await student.post('/rounds', plan()).expect(403);
    await stranger.post('/rounds', plan()).expect(404);
    const ids = await Promise.all([planRound(), planRound(), planRound()]);
    const numbers = await Promise.all(ids.map(async (id) => (await desk.get(`/rounds/${id}`)).body.number));
    expect(numbers.sort()).toEqual([1, 2, 3]);
  });

  it('names each instant that stands too early, and lets settling follow answering at once', async () => {
    const bad = plan({ writingEndsAt: inDays(1), answeringEndsAt: inDays(4) });
    const { body } = await desk.post('/rounds', bad).expect(422);
    expect(body.errors.map(({ pointer }: { pointer: string }) => pointer)).toEqual([
      '/writingEndsAt',
      '/answeringEndsAt',
    ]);
    await planRound({ answeringEndsAt: inDays(6), settlesAt: inDays(6) });
    await desk.post('/rounds', plan({ settlesAt: inDays(5.5) })).expect(422);
    await desk.post('/rounds', plan({ opensAt: inDays(-3), writingEndsAt: inDays(-1) })).expect(422);
  });

  it('refuses a task that is not the teacher’s', async () => {
    const other = await server.create.task(await server.create.user('teacher'));
    const { body } = await desk.post('/rounds', plan({ taskId: other.id })).expect(422);
    expect(body.errors[0].pointer).toBe('/taskId');
  });

  it('warns when fewer than five people are in the class', async () => {
    const small = await server.create.classWith({ students: 4, teacher: school.teacher });
    const id = await planRound({ classId: small.class.id });
    const { body } = await desk.get(`/rounds/${id}`).expect(200);
    expect(body.warnings).toEqual([{ kind: 'names-guessable', count: 4 }]);
    expect((await desk.get(`/rounds/${id}/board`)).body.alerts).toEqual([{ kind: 'names-guessable', count: 4 }]);
  });
});

describe('a planned round', () => {
  it('is seen by the class’s staff only', async () => {
    const id = await planRound();
    await server.visitor().get(`/rounds/${id}`).expect(401);
    await student.get(`/rounds/${id}`).expect(404);
    await stranger.get(`/rounds/${id}`).expect(404);
    expect((await assistant.get(`/rounds/${id}`).expect(200)).body.role).toBe('assistant');
    expect((await desk.get(`/rounds/${id}`).expect(200)).body).toMatchObject({ role: 'teacher', stage: 'planned' });
  });

  it('is listed for staff, for one class or all, and never for students', async () => {
    const id = await planRound();
    await server.visitor().get('/rounds').expect(401);
    expect((await student.get('/rounds').expect(200)).body).toEqual([]);
    const listed = (await desk.get(`/rounds?classId=${school.class.id}`).expect(200)).body;
    expect(listed.map((round: { id: string }) => round.id)).toContain(id);
    expect((await stranger.get(`/rounds?classId=${school.class.id}`)).body).toEqual([]);
    await desk.get('/rounds?classId=x').expect(422);
  });

  it('changes from its current version', async () => {
    const id = await planRound();
    const change = { ...plan({ lateRule: 'late-batch', reviewsPerDerivation: 3 }), version: 1 };
    await server.visitor().put(`/rounds/${id}`, change).expect(401);
    await student.put(`/rounds/${id}`, change).expect(403);
    await stranger.put(`/rounds/${id}`, change).expect(404);
    await desk.put(`/rounds/${id}`, { ...change, reviewsPerDerivation: 5 }).expect(422);
    const { body } = await desk.put(`/rounds/${id}`, change).expect(200);
    expect(body).toMatchObject({ lateRule: 'late-batch', reviewsPerDerivation: 3, version: 2 });
    const again = await desk.put(`/rounds/${id}`, change).expect(409);
    expect(again.body.extra.current.version).toBe(2);
  });

  it('can be deleted until it opens', async () => {
    const id = await planRound();
    await server.visitor().delete(`/rounds/${id}`).expect(401);
    await student.delete(`/rounds/${id}`).expect(403);
    await stranger.delete(`/rounds/${id}`).expect(404);
    await desk.delete(`/rounds/${id}`).expect(204);
    await desk.get(`/rounds/${id}`).expect(404);
    const opened = await planRound();
    await desk.post(`/rounds/${opened}/stage`, { to: 'writing' }).expect(200);
    await desk.delete(`/rounds/${opened}`).expect(409);
  });
});

describe('a running round', () => {
  it('lets later instants change and keeps what has happened', async () => {
    const id = await planRound();
    const { body: round } = await desk.post(`/rounds/${id}/stage`, { to: 'writing' }).expect(200);
    const other = await server.create.task(school.teacher);
    const change = {
      ...round.instants,
      taskId,
      reviewsPerDerivation: 2,
      lateRule: 'closed',
      version: round.version,
      writingEndsAt: inDays(4),
    };
    const { body } = await desk.put(`/rounds/${id}`, { ...change, taskId: other.id, opensAt: inDays(2) }).expect(422);
    expect(body.errors.map(({ pointer }: { pointer: string }) => pointer)).toEqual(['/opensAt', '/taskId']);
    await desk.put(`/rounds/${id}`, { ...change, writingEndsAt: inDays(-0.1) }).expect(422);
    expect((await desk.put(`/rounds/${id}`, change).expect(200)).body.instants.writingEndsAt).toBe(inDays(4));
  });

  it('keeps the task as it was when it opened', async () => {
    const task = await server.create.task(school.teacher, { title: 'Before' });
    const id = await planRound({ taskId: task.id });
    await desk.post(`/rounds/${id}/stage`, { to: 'writing' }).expect(200);
    const { body: form } = await desk.get(`/tasks/${task.id}`);
    await desk.put(`/tasks/${task.id}`, { ...form, title: 'After' }).expect(200);
    expect((await desk.get(`/rounds/${id}`)).body.title).toBe('Before');
  });

  it('moves everything later by the time that is given', async () => {
    const id = await planRound();
    const path = `/rounds/${id}/more-time`;
    await desk.post(`/rounds/${id}/stage`, { to: 'writing' }).expect(200);
    await server.visitor().post(path, { minutes: 60 }).expect(401);
    await student.post(path, { minutes: 60 }).expect(403);
    await stranger.post(path, { minutes: 60 }).expect(404);
    await desk.post(path, { minutes: 1 }).expect(422);
    const before = (await desk.get(`/rounds/${id}`)).body.instants;
    await desk.post(path, { minutes: 90, reason: 'the network was down' }).expect(204);
    const after = (await desk.get(`/rounds/${id}`)).body.instants;
    expect(after.opensAt).toBe(before.opensAt);
    for (const name of ['writingEndsAt', 'reviewingEndsAt', 'answeringEndsAt', 'settlesAt']) {
      expect(Date.parse(after[name]) - Date.parse(before[name])).toBe(90 * 60_000);
    }
  });
});

describe('the board', () => {
  it('shows names to teachers, and to assistants where the class’s teacher allows it', async () => {
    const id = await planRound();
    await server.visitor().get(`/rounds/${id}/board`).expect(401);
    await student.get(`/rounds/${id}/board`).expect(404);
    await stranger.get(`/rounds/${id}/board`).expect(404);
    const full = (await desk.get(`/rounds/${id}/board`).expect(200)).body;
    expect(full.people.map(({ name }: { name: string }) => name)).toEqual(
      school.students.map(({ name }) => name).sort(),
    );
    const hidden = (await assistant.get(`/rounds/${id}/board`).expect(200)).body;
    expect(hidden.seesNames).toBe(false);
    for (const { id: userId, name } of school.students) {
      expect(JSON.stringify(hidden)).not.toContain(userId);
      expect(JSON.stringify(hidden)).not.toContain(`"${name}"`);
    }
    await server.dataSource.query('update class set assistants_see_names = true where id = $1', [school.class.id]);
    expect((await assistant.get(`/rounds/${id}/board`)).body.people).toEqual(full.people);
    await server.dataSource.query('update class set assistants_see_names = false where id = $1', [school.class.id]);
  });

  it('leaves out people who have left the class', async () => {
    const leaver = await server.create.user('student', { schoolId: school.teacher.schoolId });
    const membership = await server.create.membership(school.class, leaver);
    const id = await planRound();
    expect((await desk.get(`/rounds/${id}/board`)).body.people).toHaveLength(7);
    await server.dataSource.getRepository(Membership).update({ id: membership.id }, { removedAt: server.clock.now() });
    expect((await desk.get(`/rounds/${id}/board`)).body.people).toHaveLength(6);
  });
});
