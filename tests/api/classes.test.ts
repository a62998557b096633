import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Membership } from '../../api/features/classes/classes.entity.ts';
import { isAlias } from '../../shared/lib/aliases.ts';
import { startTestServer, type Client, type TestServer } from '../support/test-server.ts';
import type { ClassWithPeople } from '../support/factories.ts';

const PASSWORD = 'seven quiet herons';

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(() => server.clock.advance({ hours: 1 }));
afterAll(() => server.stop());

interface Desk extends ClassWithPeople {
  readonly desk: Client;
  readonly stranger: Client;
  readonly pupil: Client;
  readonly path: string;
}

/** A class with two students, its teacher's browser, a student's, and that of a teacher of the same school who has no part in it. */
async function openDesk(values = {}): Promise<Desk> {
  const made = await server.create.classWith({ students: 2, values });
  const other = await server.create.user('teacher', { schoolId: made.class.schoolId });
  const [student] = made.students;
  if (!student) throw new Error('no student');
  return {
    ...made,
    desk: await server.signIn(made.teacher),
    stranger: await server.signIn(other),
    pupil: await server.signIn(student),
    path: `/classes/${made.class.id}`,
  };
}

async function membershipOf(classId: string, userId: string | undefined): Promise<string> {
  const found = await server.dataSource.getRepository(Membership).findOneByOrFail({ classId, userId: userId ?? '' });
  return found.id;
}

function tokenIn(text: string | undefined): string {
  return /\/join\/([\w-]+)/.exec(text ?? '')?.[1] ?? '';
}

async function lettersTo(address: string) {
  await server.runJobs();
  return server.mails.filter((letter) => letter.to === address);
}

describe('a class', () => {
  it('is made by a teacher, who is in it, with a name that the school has once', async () => {
    const { desk, pupil } = await openDesk();
    await server.visitor().post('/classes', { name: '9A', timeZone: 'Europe/Lisbon' }).expect(401);
    await pupil.post('/classes', { name: '9A', timeZone: 'Europe/Lisbon' }).expect(403);
    await desk.post('/classes', { name: '9A', timeZone: 'Nowhere/Atall' }).expect(422);
    const { id } = (await desk.post('/classes', { name: '9A', timeZone: 'Europe/Lisbon' }).expect(201)).body;
    const again = await desk.post('/classes', { name: '9A', timeZone: 'Europe/Lisbon' }).expect(422);
    expect(again.body.errors[0].pointer).toBe('/name');
    const list = (await desk.get('/classes').expect(200)).body as { id: string }[];
    expect(list.map((each) => each.id)).toContain(id);
    await server.visitor().get('/classes').expect(401);
  });

  it('is shown whole to its teacher and to nobody else', async () => {
    const { desk, stranger, pupil, path, students } = await openDesk();
    const { body } = await desk.get(path).expect(200);
    expect(body.members).toHaveLength(3);
    expect(body.members.map((member: { userId: string }) => member.userId)).toContain(students[0]?.id);
    await stranger.get(path).expect(404);
    await pupil.get(path).expect(403);
    await server.visitor().get(path).expect(401);
  });

  it('has settings, a code that can be renewed, terms, and can be put away and brought back', async () => {
    const { desk, stranger, pupil, path, class: of } = await openDesk();
    for (const [method, suffix, body] of [
      ['patch', '', { standingsOn: false }],
      ['post', '/code', undefined],
      ['post', '/term', undefined],
      ['delete', '/archive', undefined],
      ['post', '/archive', undefined],
    ] as const) {
      await server
        .visitor()
        [method](path + suffix, body)
        .expect(401);
      await pupil[method](path + suffix, body).expect(403);
      await stranger[method](path + suffix, body).expect(404);
      expect((await desk[method](path + suffix, body)).status).toBeLessThan(300);
    }
    await desk.patch(path, { name: '' }).expect(422);
    await desk.delete(`${path}/archive`).expect(204);
    const after = (await desk.get(path)).body;
    expect(after.standingsOn).toBe(false);
    expect(after.joinCode).not.toBe(of.joinCode);
  });
});

it('is not put away while a round of it is not settled', async () => {
  const { desk, path, class: of, teacher } = await openDesk();
  await server.create.round(of, await server.create.task(teacher));
  const { body } = await desk.post(`${path}/archive`).expect(409);
  expect(body.detail).toContain('not settled yet');
});

describe('the class code', () => {
  it('tells its holder the class, and nobody else anything', async () => {
    const { class: of } = await openDesk();
    const { body } = await server.visitor().post('/class-code', { code: of.joinCode }).expect(200);
    expect(body).toEqual({ className: of.name, hasEmail: true });
    await server.visitor().post('/class-code', { code: 'AAAAAAAAAA' }).expect(410);
    await server.visitor().post('/class-code', { code: 'short' }).expect(422);
  });

  it('lets a person sign up by a mailed link and ask; the teacher lets them in', async () => {
    const { class: of, desk, stranger, pupil, path, teacher } = await openDesk();
    const email = 'noor.petrova@school.test';
    await server.visitor().post('/sign-up/by-mail', { code: of.joinCode, email }).expect(202);
    await server.visitor().post('/sign-up/by-mail', { code: of.joinCode, email: 'no' }).expect(422);
    const token = tokenIn((await lettersTo(email)).at(-1)?.text);
    const person = server.visitor();
    expect((await person.get(`/invitations/${token}`).expect(200)).body).toMatchObject({
      className: of.name,
      asksToJoin: true,
      email,
    });
    await person.post(`/invitations/${token}/account`, { name: 'Noor Petrova', password: 'password12' }).expect(422);
    await person.post(`/invitations/${token}/account`, { name: 'Noor Petrova', password: PASSWORD }).expect(201);
    expect((await person.get('/me')).body.classes).toEqual([]);
    expect((await lettersTo(teacher.email ?? '')).at(-1)?.text).toContain(of.name);
    const [request] = (await desk.get(path)).body.requests as { id: string; name: string }[];
    expect(request?.name).toBe('Noor Petrova');
    const decide = `${path}/requests/${request?.id}`;
    await server.visitor().post(decide, { accept: true }).expect(401);
    await pupil.post(decide, { accept: true }).expect(403);
    await stranger.post(decide, { accept: true }).expect(404);
    await desk.post(decide, { accept: 'perhaps' }).expect(422);
    await desk.post(decide, { accept: true }).expect(204);
    const [joined] = (await person.get('/me')).body.classes as { id: string; alias: string }[];
    expect(joined?.id).toBe(of.id);
    expect(isAlias(joined?.alias ?? '')).toBe(true);
  });

  it('answers alike for an address that has an account, whose owner is told to sign in', async () => {
    const { class: of, students } = await openDesk();
    const known = await server
      .visitor()
      .post('/sign-up/by-mail', { code: of.joinCode, email: students[0]?.email })
      .expect(202);
    const free = await server
      .visitor()
      .post('/sign-up/by-mail', { code: of.joinCode, email: 'free.person@school.test' })
      .expect(202);
    expect(known.body).toEqual(free.body);
    expect(tokenIn((await lettersTo(students[0]?.email ?? '')).at(-1)?.text)).toBe('');
  });

  it('lets a person of a class without e-mail sign up by a user name', async () => {
    const { class: of, desk, path } = await openDesk({ hasEmail: false });
    const person = server.visitor();
    const form = { code: of.joinCode, name: 'Tove Lindqvist', userName: 'tove.l', password: PASSWORD };
    await person.post('/sign-up/by-name', { ...form, userName: 'x' }).expect(422);
    await person.post('/sign-up/by-name', form).expect(201);
    expect((await desk.get(path)).body.requests).toHaveLength(1);
    const twin = await server.visitor().post('/sign-up/by-name', form).expect(422);
    expect(twin.body.errors[0].pointer).toBe('/userName');
  });

  it('lets somebody with an account ask, and lets in at once whom the class list names by address', async () => {
    const { class: of, desk, path, students } = await openDesk();
    const listed = await server.create.user('student', { schoolId: of.schoolId });
    const sameName = await server.create.user('student', { schoolId: of.schoolId, name: listed.name });
    await desk.put(`${path}/roster`, { csv: `name,e-mail\n${listed.name},${listed.email}` }).expect(200);
    const asks = async (user: { id: string }) =>
      (await server.signIn(user)).post('/join-requests', { code: of.joinCode });
    expect((await asks(listed)).body.accepted).toBe(true);
    expect((await asks(sameName)).body.accepted).toBe(false);
    expect((await asks(students[0] ?? listed)).status).toBe(409);
    expect((await asks(await server.create.user('student'))).status).toBe(410);
    await (await server.signIn(listed)).post('/join-requests', { code: '' }).expect(422);
    await server.visitor().post('/join-requests', { code: of.joinCode }).expect(401);
  });
});

describe('an invitation', () => {
  it('is mailed to an address, shown as a link without one, and works once', async () => {
    const { desk, stranger, pupil, path, class: of } = await openDesk();
    const body = {
      role: 'student',
      people: [{ name: 'Ida Brandt', email: 'ida.brandt@school.test' }, { name: 'Omar Said' }],
    };
    await server.visitor().post(`${path}/invitations`, body).expect(401);
    await pupil.post(`${path}/invitations`, body).expect(403);
    await stranger.post(`${path}/invitations`, body).expect(404);
    await desk.post(`${path}/invitations`, { role: 'student', people: [] }).expect(422);
    const { links } = (await desk.post(`${path}/invitations`, body).expect(201)).body;
    // The mailed one is for its reader alone: who holds it can make the account, and learns whether there is one.
    expect(links).toEqual([{ name: 'Omar Said', token: expect.any(String) }]);
    const mailed = tokenIn((await lettersTo('ida.brandt@school.test')).at(-1)?.text);
    expect((await server.visitor().get(`/invitations/${mailed}`).expect(200)).body.name).toBe('Ida Brandt');
    const omar = server.visitor();
    await omar.post(`/invitations/${links[0].token}/account`, { name: 'Omar Said', password: PASSWORD }).expect(422);
    await omar
      .post(`/invitations/${links[0].token}/account`, { name: 'Omar Said', userName: 'omar.said', password: PASSWORD })
      .expect(201);
    expect((await omar.get('/me')).body.classes[0].id).toBe(of.id);
    await server.visitor().get(`/invitations/${links[0].token}`).expect(410);
  });

  it('is accepted with the account that one has, by nobody else', async () => {
    const { desk, path, class: of } = await openDesk();
    const invited = await server.create.user('teacher', { schoolId: of.schoolId });
    const other = await server.create.user('teacher', { schoolId: of.schoolId });
    await desk
      .post(`${path}/invitations`, { role: 'teacher', people: [{ name: invited.name, email: invited.email }] })
      .expect(201);
    const token = tokenIn((await lettersTo(invited.email ?? '')).at(-1)?.text);
    const accept = `/invitations/${token}/accept`;
    expect((await server.visitor().get(`/invitations/${token}`)).body.hasAccount).toBe(true);
    await server.visitor().post(accept).expect(401);
    await (await server.signIn(other)).post(accept).expect(404);
    await (await server.signIn(invited)).post(accept).expect(204);
    await (await server.signIn(invited)).get(path).expect(200);
  });

  it('can be withdrawn', async () => {
    const { desk, stranger, pupil, path } = await openDesk();
    const { links } = (await desk.post(`${path}/invitations`, { role: 'student', people: [{ name: 'Ada Lund' }] }))
      .body;
    const [open] = (await desk.get(path)).body.invitations as { id: string }[];
    const one = `${path}/invitations/${open?.id}`;
    await server.visitor().delete(one).expect(401);
    await pupil.delete(one).expect(403);
    await stranger.delete(one).expect(404);
    await desk.delete(one).expect(204);
    await server.visitor().get(`/invitations/${links[0].token}`).expect(410);
  });
});

describe('the class list', () => {
  it('is read from CSV; lines that cannot be read are named and the others kept', async () => {
    const { desk, stranger, pupil, path } = await openDesk();
    const csv =
      '\uFEFFName;E-Mail\nJon Aune;jon.aune@school.test\nMia Holt;no address\nJon Aune;x@school.test\n"Ruiz, Eva";';
    await server.visitor().put(`${path}/roster`, { csv }).expect(401);
    await pupil.put(`${path}/roster`, { csv }).expect(403);
    await stranger.put(`${path}/roster`, { csv }).expect(404);
    const { body } = await desk.put(`${path}/roster`, { csv }).expect(200);
    expect(body.people.map((person: { name: string }) => person.name)).toEqual(['Jon Aune', 'Ruiz, Eva']);
    expect(body.problems.map((problem: { line: number }) => problem.line)).toEqual([3, 4]);
    const refused = await desk.put(`${path}/roster`, { csv: 'who,where\nx,y' }).expect(422);
    expect(refused.body.errors[0].detail).toContain('first line names the columns');
  });
});

describe('a member', () => {
  it('can be made an assistant before they work, and removed', async () => {
    const { desk, stranger, pupil, path, class: of, students } = await openDesk();
    const one = `${path}/members/${await membershipOf(of.id, students[1]?.id)}`;
    await server.visitor().patch(one, { role: 'assistant' }).expect(401);
    await pupil.patch(one, { role: 'assistant' }).expect(403);
    await stranger.patch(one, { role: 'assistant' }).expect(404);
    await desk.patch(one, { role: 'owner' }).expect(422);
    await desk.patch(one, { role: 'teacher' }).expect(409);
    await desk.patch(one, { role: 'assistant' }).expect(204);
    await server.visitor().delete(one).expect(401);
    await pupil.delete(one).expect(403);
    await stranger.delete(one).expect(404);
    await desk.delete(one).expect(204);
    expect((await desk.get(path)).body.members).toHaveLength(2);
  });

  it('who wrote as a student never assists the class, and the last teacher stays', async () => {
    const { desk, path, class: of, students, teacher } = await openDesk();
    const round = await server.create.round(of, await server.create.task(teacher));
    await server.dataSource.query('insert into derivation (round_id, author_id) values ($1, $2)', [
      round.id,
      students[0]?.id,
    ]);
    const refused = await desk
      .patch(`${path}/members/${await membershipOf(of.id, students[0]?.id)}`, { role: 'assistant' })
      .expect(409);
    expect(refused.body.detail).toContain('Nobody assists');
    await desk.delete(`${path}/members/${await membershipOf(of.id, teacher.id)}`).expect(409);
  });

  it('gets a sign-in code from their own teacher only', async () => {
    const { desk, stranger, pupil, path, class: of, students } = await openDesk();
    const one = `${path}/members/${await membershipOf(of.id, students[0]?.id)}/sign-in-code`;
    await server.visitor().post(one).expect(401);
    await pupil.post(one).expect(403);
    await stranger.post(one).expect(404);
    expect((await desk.post(one).expect(200)).body.code).toMatch(/^[A-Z2-9]{10}$/);
  });
});

describe('a pair that is kept apart', () => {
  it('is listed once, by the teacher, of people of the class', async () => {
    const { desk, stranger, pupil, path, students } = await openDesk();
    const body = { firstId: students[0]?.id, secondId: students[1]?.id, note: 'cousins' };
    await server.visitor().post(`${path}/pairs`, body).expect(401);
    await pupil.post(`${path}/pairs`, body).expect(403);
    await stranger.post(`${path}/pairs`, body).expect(404);
    await desk.post(`${path}/pairs`, { ...body, secondId: body.firstId }).expect(422);
    const { id } = (await desk.post(`${path}/pairs`, body).expect(201)).body;
    await desk.post(`${path}/pairs`, { firstId: body.secondId, secondId: body.firstId }).expect(409);
    await server.visitor().delete(`${path}/pairs/${id}`).expect(401);
    await pupil.delete(`${path}/pairs/${id}`).expect(403);
    await stranger.delete(`${path}/pairs/${id}`).expect(404);
    await desk.delete(`${path}/pairs/${id}`).expect(204);
  });
});

describe('one’s own place', () => {
  it('shows nobody else, and an alias that is changed once a term', async () => {
    const { desk, pupil, path, class: of } = await openDesk();
    const outsider = await server.signIn(await server.create.user('student', { schoolId: of.schoolId }));
    for (const suffix of ['/me', '/aliases']) {
      await server
        .visitor()
        .get(path + suffix)
        .expect(401);
      await desk.get(path + suffix).expect(403);
      await outsider.get(path + suffix).expect(404);
    }
    expect((await pupil.get(`${path}/me`).expect(200)).body).toMatchObject({ role: 'student', aliasChangeable: true });
    const [alias] = (await pupil.get(`${path}/aliases`).expect(200)).body.aliases as string[];
    await server.visitor().put(`${path}/alias`, { alias }).expect(401);
    await desk.put(`${path}/alias`, { alias }).expect(403);
    await outsider.put(`${path}/alias`, { alias }).expect(404);
    await pupil.put(`${path}/alias`, { alias: '' }).expect(422);
    await pupil.put(`${path}/alias`, { alias: 'Best of All' }).expect(422);
    await pupil.put(`${path}/alias`, { alias }).expect(204);
    await pupil.put(`${path}/alias`, { alias: 'Amber Anvil' }).expect(409);
    server.clock.advance({ days: 1 });
    await desk.post(`${path}/term`).expect(204);
    expect((await pupil.get(`${path}/me`)).body).toMatchObject({ alias, aliasChangeable: true });
  });
});
