import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { User } from '../../api/features/people/people.entity.ts';
import type { TaskForm } from '../../shared/schemas/task.ts';
import { startTestServer, type Client, type TestServer } from '../support/test-server.ts';

let server: TestServer;
let teacher: User;
let desk: Client;
let stranger: Client;
let student: Client;

const form: TaskForm = {
  title: 'A product of brackets',
  instructions: 'One operation a line.',
  given: '(x+2)(x-3)',
  goal: { kind: 'expanded' },
  assumptions: ['x>0'],
  settings: {
    numbers: 'real',
    reversible: false,
    presentationCounts: false,
    constantNeeded: false,
    decimal: 'point',
  },
};

beforeAll(async () => {
  server = await startTestServer();
  teacher = await server.create.user('teacher');
  desk = await server.signIn(teacher);
  stranger = await server.signIn(await server.create.user('teacher', { schoolId: teacher.schoolId }));
  student = await server.signIn(await server.create.user('student', { schoolId: teacher.schoolId }));
});
afterAll(() => server.stop());

async function makeTask(values: Partial<TaskForm> = {}): Promise<string> {
  const { body } = await desk.post('/tasks', { ...form, ...values }).expect(201);
  return body.id;
}

describe('the collection', () => {
  it('lists one’s own tasks only, the latest change first', async () => {
    const older = await makeTask({ title: 'Older' });
    server.clock.advance({ minutes: 1 });
    const newer = await makeTask({ title: 'Newer' });
    await server.visitor().get('/tasks').expect(401);
    await student.get('/tasks').expect(403);
    expect((await stranger.get('/tasks').expect(200)).body).toEqual([]);
    const { body } = await desk.get('/tasks').expect(200);
    expect(body.map(({ id }: { id: string }) => id).slice(0, 2)).toEqual([newer, older]);
    expect(body[0]).toMatchObject({ title: 'Newer', given: '(x+2)(x-3)', rounds: 0, archived: false });
  });

  it('keeps a new task as it was written', async () => {
    await server.visitor().post('/tasks', form).expect(401);
    await student.post('/tasks', form).expect(403);
    const id = await makeTask();
    await server.visitor().get(`/tasks/${id}`).expect(401);
    await student.get(`/tasks/${id}`).expect(403);
    await stranger.get(`/tasks/${id}`).expect(404);
    expect((await desk.get(`/tasks/${id}`).expect(200)).body).toMatchObject({ ...form, version: 1, rounds: 0 });
  });

  it('answers with every field that is missing, at once', async () => {
    const { body } = await desk.post('/tasks', { ...form, title: ' ', given: '' }).expect(422);
    expect(body.errors).toEqual([
      { pointer: '/title', detail: 'Give the task a title.' },
      { pointer: '/given', detail: 'Write this line.' },
    ]);
  });

  it('refuses lines that cannot be read, with the place', async () => {
    const goal = { kind: 'target', target: '2x+' } as const;
    const { body } = await desk.post('/tasks', { ...form, given: '(x+2', assumptions: ['x+1'], goal }).expect(422);
    const said = new Map(
      body.errors.map((error: { pointer: string; detail: string }) => [error.pointer, error.detail]),
    );
    expect([...said.keys()]).toEqual(['/given', '/assumptions/0', '/goal/target']);
    expect(said.get('/given')).toContain('A bracket is missing at the end of the line');
    expect(said.get('/assumptions/0')).toContain('such as x > 0');
  });

  it('reads decimals as the task’s setting says', async () => {
    const id = await makeTask({ given: '1,5x', settings: { ...form.settings, decimal: 'comma' } });
    expect((await desk.get(`/tasks/${id}`)).body.settings.decimal).toBe('comma');
  });
});

describe('changing a task', () => {
  it('takes a change made from the current version', async () => {
    const id = await makeTask();
    const change = { ...form, title: 'Brackets, again', version: 1 };
    await server.visitor().put(`/tasks/${id}`, change).expect(401);
    await student.put(`/tasks/${id}`, change).expect(403);
    await stranger.put(`/tasks/${id}`, change).expect(404);
    await desk.put(`/tasks/${id}`, { ...change, version: undefined }).expect(422);
    expect((await desk.put(`/tasks/${id}`, change).expect(200)).body).toMatchObject({
      title: change.title,
      version: 2,
    });
  });

  it('answers 409 with what is there when it changed in another window', async () => {
    const id = await makeTask();
    await desk.put(`/tasks/${id}`, { ...form, title: 'First', version: 1 }).expect(200);
    const { body } = await desk.put(`/tasks/${id}`, { ...form, title: 'Second', version: 1 }).expect(409);
    expect(body.extra.current).toMatchObject({ title: 'First', version: 2 });
  });

  it('copies a task', async () => {
    const id = await makeTask({ title: 'Original' });
    await server.visitor().post(`/tasks/${id}/copy`).expect(401);
    await student.post(`/tasks/${id}/copy`).expect(403);
    await stranger.post(`/tasks/${id}/copy`).expect(404);
    const { body } = await desk.post(`/tasks/${id}/copy`).expect(201);
    expect((await desk.get(`/tasks/${body.id}`)).body).toMatchObject({ ...form, title: 'Original, copy', version: 1 });
  });

  it('puts a task away and takes it out again', async () => {
    const id = await makeTask();
    const path = `/tasks/${id}/archived`;
    await server.visitor().put(path, { archived: true }).expect(401);
    await student.put(path, { archived: true }).expect(403);
    await stranger.put(path, { archived: true }).expect(404);
    await desk.put(path, {}).expect(422);
    await desk.put(path, { archived: true }).expect(204);
    expect((await desk.get(`/tasks/${id}`)).body.archived).toBe(true);
    await desk.put(path, { archived: false }).expect(204);
    expect((await desk.get(`/tasks/${id}`)).body.archived).toBe(false);
  });
});
