import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestServer, type Client, type TestServer } from '../support/test-server.ts';
import type { User } from '../../api/features/people/people.entity.ts';

let server: TestServer;
let admin: User;
let office: Client;
let staffRoom: Client;
beforeAll(async () => {
  server = await startTestServer();
  admin = await server.create.user('admin');
  office = await server.signIn(admin);
  staffRoom = await server.signIn(await server.create.user('teacher', { schoolId: admin.schoolId }));
});
afterAll(() => server.stop());

async function refusesOthers(method: 'get' | 'put' | 'post', path: string, body?: object): Promise<void> {
  await server.visitor()[method](path, body).expect(401);
  await staffRoom[method](path, body).expect(403);
}

describe('the school', () => {
  it('is read and set by an admin only, and the change is in the trail', async () => {
    const form = { name: 'Westmark School', timeZone: 'Europe/Oslo', standingsAllowed: false };
    await refusesOthers('get', '/admin/school');
    await refusesOthers('put', '/admin/school', form);
    await office.put('/admin/school', { ...form, name: '' }).expect(422);
    await office.put('/admin/school', form).expect(204);
    expect((await office.get('/admin/school').expect(200)).body).toEqual(form);
    await refusesOthers('get', '/admin/trail');
    const { entries } = (await office.get('/admin/trail?search=school').expect(200)).body;
    expect(entries[0]).toMatchObject({ action: 'school.settings-changed', actor: admin.name, after: form });
  });

  it('keeps its people apart from those of another school', async () => {
    const stranger = await server.create.user('student', { name: 'Ylva Farkas' });
    await refusesOthers('get', '/admin/people');
    const { body } = await office.get('/admin/people?search=Farkas').expect(200);
    expect(body).toEqual([]);
    await office.put(`/admin/people/${stranger.id}/state`, { disabled: true, reason: 'test' }).expect(404);
  });

  it('disables an account at once and enables it again, with a reason', async () => {
    const person = await server.create.user('student', { schoolId: admin.schoolId, name: 'Odd Viken' });
    const path = `/admin/people/${person.id}/state`;
    await refusesOthers('put', path, { disabled: true, reason: 'left' });
    const elsewhere = await server.signIn(await server.create.user('admin'));
    await elsewhere.put(path, { disabled: true, reason: 'left' }).expect(404);
    await office.put(path, { disabled: true }).expect(422);
    await office.put(path, { disabled: true, reason: 'left the school' }).expect(204);
    expect((await office.get('/admin/people?search=Odd')).body[0].disabled).toBe(true);
    await office.put(path, { disabled: false, reason: 'came back' }).expect(204);
    await office.put(`/admin/people/${admin.id}/state`, { disabled: true, reason: 'oops' }).expect(409);
  });

  it('invites staff by mail', async () => {
    const form = { name: 'Petra Sund', email: 'petra.sund@school.test', role: 'teacher' };
    await refusesOthers('post', '/admin/invitations', form);
    await office.post('/admin/invitations', { ...form, email: 'no' }).expect(422);
    await office.post('/admin/invitations', form).expect(201);
    await server.runJobs();
    const token = /\/join\/([\w-]+)/.exec(server.mails.at(-1)?.text ?? '')?.[1] ?? '';
    const petra = server.visitor();
    await petra
      .post(`/invitations/${token}/account`, { name: 'Petra Sund', password: 'seven quiet herons' })
      .expect(201);
    expect((await petra.get('/me')).body.user.role).toBe('teacher');
  });

  it('shows how the mail fares', async () => {
    await refusesOthers('get', '/admin/mail');
    expect((await office.get('/admin/mail').expect(200)).body).toEqual({ waiting: 0, failed: [] });
  });
});
