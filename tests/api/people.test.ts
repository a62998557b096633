import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { hashPassword } from '../../api/features/people/passwords.ts';
import { Session, User } from '../../api/features/people/people.entity.ts';
import { sha256 } from '../../api/lib/secrets.ts';
import { startTestServer, type TestServer } from '../support/test-server.ts';

const PASSWORD = 'seven quiet herons';
const OTHER = 'a lamp above the weir';

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
// Each test has the tries of a new hour.
beforeEach(() => server.clock.advance({ hours: 1 }));
afterAll(() => server.stop());

async function person(values: Partial<User> = {}): Promise<User> {
  return await server.create.user('student', { passwordHash: await hashPassword(PASSWORD), ...values });
}

function linkIn(text: string, prefix: string): string {
  return new RegExp(`${prefix}([\\w-]+)`).exec(text)?.[1] ?? '';
}

async function lastLetterTo(address: string) {
  await server.runJobs();
  return server.mails.filter((letter) => letter.to === address).at(-1);
}

describe('signing in', () => {
  it('sets a cookie whose hash alone is stored, and tells who one is', async () => {
    const user = await person();
    const client = server.visitor();
    const response = await client.post('/session', { name: user.email, password: PASSWORD }).expect(204);
    expect(response.headers['set-cookie']?.[0]).toMatch(/HttpOnly; SameSite=Lax/i);
    const token = client.cookie?.split('=')[1] ?? '';
    expect(await server.dataSource.getRepository(Session).existsBy({ id: sha256(token), userId: user.id })).toBe(true);
    expect(await server.dataSource.getRepository(Session).existsBy({ id: token })).toBe(false);
    const me = await client.get('/me').expect(200);
    expect(me.body.user).toEqual({ id: user.id, name: user.name, role: 'student', email: user.email, userName: null });
  });

  it('gives another id at every sign-in', async () => {
    const user = await person();
    const [one, two] = [server.visitor(), server.visitor()];
    await one.post('/session', { name: user.email, password: PASSWORD }).expect(204);
    await two.post('/session', { name: user.email, password: PASSWORD }).expect(204);
    expect(one.cookie).not.toBe(two.cookie);
  });

  it('answers a wrong password, an unknown address and a disabled account alike', async () => {
    const user = await person();
    const disabled = await person({ disabledAt: new Date() });
    const answers = [];
    for (const body of [
      { name: user.email, password: 'not this one' },
      { name: 'nobody@school.test', password: PASSWORD },
      { name: disabled.email, password: PASSWORD },
    ]) {
      const { status, body: problem } = await server.visitor().post('/session', body);
      answers.push({ status, type: problem.type, detail: problem.detail });
    }
    expect(answers[0]?.status).toBe(401);
    expect(answers[1]).toEqual(answers[0]);
    expect(answers[2]).toEqual(answers[0]);
  });

  it('finds a user name in two schools by the password', async () => {
    const one = await person({ email: null, userName: 'lena.k' });
    await person({ email: null, userName: 'lena.k', passwordHash: await hashPassword(OTHER) });
    const client = server.visitor();
    await client.post('/session', { name: 'Lena.K', password: PASSWORD }).expect(204);
    expect((await client.get('/me')).body.user.id).toBe(one.id);
  });

  it('names the missing field', async () => {
    const { body } = await server.visitor().post('/session', { name: '' }).expect(422);
    expect(body.errors.map((error: { pointer: string }) => error.pointer)).toEqual(['/name', '/password']);
  });

  it('slows down guessing at one account', async () => {
    const user = await person();
    const statuses = [];
    for (let i = 0; i < 14; i += 1) {
      statuses.push((await server.visitor().post('/session', { name: user.email, password: `guess ${i}` })).status);
    }
    expect(statuses.at(-1)).toBe(429);
  });

  it('ends one session, or all of a person', async () => {
    const user = await person();
    const [one, two, three] = [server.visitor(), server.visitor(), server.visitor()];
    for (const client of [one, two, three])
      await client.post('/session', { name: user.email, password: PASSWORD }).expect(204);
    const stolen = one.cookie;
    await one.delete('/session').expect(204);
    one.cookie = stolen;
    await one.get('/me').expect(401);
    await two.delete('/sessions').expect(204);
    await three.get('/me').expect(401);
    await server.visitor().delete('/session').expect(401);
    await server.visitor().delete('/sessions').expect(401);
  });

  it('refuses a request that another site sent', async () => {
    const user = await person();
    const client = server.visitor();
    await client
      .post('/session', { name: user.email, password: PASSWORD })
      .set('Origin', 'https://elsewhere.test')
      .expect(403);
  });
});

describe('a forgotten password', () => {
  it('answers alike for a known and an unknown address, and mails only the known one', async () => {
    const user = await person();
    const known = await server.visitor().post('/resets', { email: user.email }).expect(202);
    const unknown = await server.visitor().post('/resets', { email: 'nobody.here@school.test' }).expect(202);
    expect(unknown.body).toEqual(known.body);
    expect(await lastLetterTo('nobody.here@school.test')).toBeUndefined();
    expect((await lastLetterTo(user.email ?? ''))?.text).toContain('/reset/');
    await server.visitor().post('/resets', { email: 'no address' }).expect(422);
  });

  it('is replaced by the mailed link, once, and ends every session', async () => {
    const user = await person();
    const before = server.visitor();
    await before.post('/session', { name: user.email, password: PASSWORD }).expect(204);
    await server.visitor().post('/resets', { email: user.email }).expect(202);
    const token = linkIn((await lastLetterTo(user.email ?? ''))?.text ?? '', '/reset/');
    await server.visitor().post(`/resets/${token}`, { password: 'short' }).expect(422);
    const after = server.visitor();
    await after.post(`/resets/${token}`, { password: OTHER }).expect(204);
    await after.get('/me').expect(200);
    await before.get('/me').expect(401);
    await server.visitor().post(`/resets/${token}`, { password: OTHER }).expect(410);
  });

  it('cannot be replaced after two hours', async () => {
    const user = await person();
    await server.visitor().post('/resets', { email: user.email }).expect(202);
    const token = linkIn((await lastLetterTo(user.email ?? ''))?.text ?? '', '/reset/');
    server.clock.advance({ hours: 3 });
    await server.visitor().post(`/resets/${token}`, { password: OTHER }).expect(410);
  });
});

describe('a password', () => {
  it.each([
    ['password1234', 'guessed first'],
    ['abababababab', 'repeats'],
  ])('that is common (%s) is refused with the reason', async (password, reason) => {
    const user = await person();
    const client = server.visitor();
    await client.post('/session', { name: user.email, password: PASSWORD }).expect(204);
    const { body } = await client.post('/account/password', { current: PASSWORD, password }).expect(422);
    expect(body.errors[0]).toMatchObject({ pointer: '/password' });
    expect(body.errors[0].detail).toContain(reason);
  });

  it('may be long, with blanks and any letters, and is changed with the old one', async () => {
    const user = await person();
    const client = server.visitor();
    await client.post('/session', { name: user.email, password: PASSWORD }).expect(204);
    const long = `ein Wehr über dem Fluß — ${'x y'.repeat(40)}`;
    await client.post('/account/password', { current: 'wrong one', password: long }).expect(422);
    await client.post('/account/password', { current: PASSWORD, password: long }).expect(204);
    await client.get('/me').expect(200);
    await server
      .visitor()
      .post('/session', { name: user.email, password: long.normalize('NFD') })
      .expect(204);
    await server.visitor().post('/account/password', { current: long, password: OTHER }).expect(401);
  });
});

describe('an account', () => {
  it('changes its name', async () => {
    const user = await person();
    const client = await server.signIn(user);
    await client.patch('/account', { name: ' ' }).expect(422);
    await client.patch('/account', { name: 'Nives Kolar' }).expect(204);
    expect((await client.get('/me')).body.user.name).toBe('Nives Kolar');
    await server.visitor().patch('/account', { name: 'X' }).expect(401);
  });

  it('changes its address by the link mailed there, and the old address is told', async () => {
    const user = await person();
    const client = await server.signIn(user);
    await server.visitor().post('/account/email', { email: 'x@school.test', password: PASSWORD }).expect(401);
    await client.post('/account/email', { email: 'no', password: PASSWORD }).expect(422);
    await client.post('/account/email', { email: 'new.place@school.test', password: PASSWORD }).expect(202);
    const token = linkIn((await lastLetterTo('new.place@school.test'))?.text ?? '', '/account/email/');
    expect((await client.get('/me')).body.user.email).toBe(user.email);
    await server.visitor().post(`/email-changes/${token}`).expect(204);
    expect((await client.get('/me')).body.user.email).toBe('new.place@school.test');
    expect(await lastLetterTo(user.email ?? '')).toBeDefined();
    await server.visitor().post(`/email-changes/${token}`).expect(410);
  });

  it('does not tell that an address is taken, except to its owner', async () => {
    const owner = await person();
    const client = await server.signIn(await person());
    const taken = await client.post('/account/email', { email: owner.email, password: PASSWORD }).expect(202);
    const free = await client.post('/account/email', { email: 'free.one@school.test', password: PASSWORD }).expect(202);
    expect(taken.body).toEqual(free.body);
    expect((await lastLetterTo(owner.email ?? ''))?.text).not.toContain('/account/email/');
  });

  it('is not told to somebody who is signed out', async () => {
    await server.visitor().get('/me').expect(401);
  });
});

describe('a sign-in code of the teacher', () => {
  it('signs in once, within a day, and sets the person’s own password', async () => {
    const { class: of, teacher, students } = await server.create.classWith({ students: 1 });
    const [student] = students;
    const desk = await server.signIn(teacher);
    const members = (await desk.get(`/classes/${of.id}`)).body.members as { membershipId: string; userId: string }[];
    const membershipId = members.find((member) => member.userId === student?.id)?.membershipId;
    const { code } = (await desk.post(`/classes/${of.id}/members/${membershipId}/sign-in-code`).expect(200)).body;
    const body = { name: student?.email, code, password: OTHER };
    await server
      .visitor()
      .post('/session/by-code', { ...body, code: 'AAAAAAAAAA' })
      .expect(401);
    await server
      .visitor()
      .post('/session/by-code', { ...body, code: 'no' })
      .expect(422);
    const client = server.visitor();
    await client.post('/session/by-code', body).expect(204);
    expect((await client.get('/me')).body.user.id).toBe(student?.id);
    await server.visitor().post('/session/by-code', body).expect(401);
    await server.visitor().post('/session', { name: student?.email, password: OTHER }).expect(204);
  });
});
