import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { createMailService, type MailService } from '../../api/features/mail/mail.service.ts';
import { OutgoingMail } from '../../api/features/mail/mail.entity.ts';
import type { MailOrder } from '../../api/features/mail/queue-mail.ts';
import type { User } from '../../api/features/people/people.entity.ts';
import { startTestServer, type TestServer } from '../support/test-server.ts';

let server: TestServer;
let mail: MailService;
let student: User;

beforeAll(async () => {
  server = await startTestServer();
  const { db, now, queue, mailer, config } = server.platform;
  mail = createMailService({ db, now, queue, mailer, baseUrl: config.baseUrl, secret: config.secret });
});
afterAll(() => server.stop());
beforeEach(async () => {
  student = await server.create.user('student', { name: 'Ines <Rocha>', email: `ines${Math.random()}@school.test` });
  server.mails.length = 0;
});

function writingOpened(user: User, dedupeKey?: string): MailOrder {
  const endsAt = new Date('2031-07-04T15:30:00Z');
  const data = {
    name: user.name,
    className: 'Year 9',
    taskTitle: 'Two brackets',
    roundId: 'r1',
    timeZone: 'Europe/Lisbon',
    endsAt,
  };
  return { kind: 'writing-opened', userId: user.id, data, ...(dedupeKey && { dedupeKey }) };
}

function queueIt(order: MailOrder): Promise<void> {
  return server.dataSource.transaction((manager) => mail.queueMail(manager, order));
}

async function unsubscribePath(): Promise<string> {
  await queueIt(writingOpened(student));
  await server.runJobs();
  const url = /<(.*)>/.exec(server.mails[0]?.headers['List-Unsubscribe'] ?? '')?.[1] ?? '';
  return url.replace('http://slipstone.test/api', '');
}

describe('the outbox', () => {
  it('sends text and HTML in the time zone of the class, with names escaped', async () => {
    await queueIt(writingOpened(student));
    await server.runJobs();
    const [letter] = server.mails;
    expect(letter?.to).toBe(student.email);
    expect(letter?.text).toContain('Dear Ines <Rocha>,');
    expect(letter?.text).toContain('until Friday 4 July, 16:30 WEST');
    expect(letter?.text).toContain('http://slipstone.test/rounds/r1/write');
    expect(letter?.html).toContain('Dear Ines &lt;Rocha&gt;,');
    expect(letter?.html).not.toContain('<table');
  });

  it('sends nothing when the transaction that caused it is rolled back', async () => {
    const failing = server.dataSource.transaction(async (manager) => {
      await mail.queueMail(manager, writingOpened(student));
      throw new Error('changed my mind');
    });
    await expect(failing).rejects.toThrow('changed my mind');
    await server.runJobs();
    expect(server.mails).toEqual([]);
  });

  it('sends one letter for two orders with one key', async () => {
    await queueIt(writingOpened(student, `opened ${student.id}`));
    await queueIt(writingOpened(student, `opened ${student.id}`));
    await server.runJobs();
    expect(server.mails).toHaveLength(1);
  });

  it('tries again after the mail server was away, notes why, and never sends twice', async () => {
    server.mailServer.broken = true;
    await queueIt(writingOpened(student));
    await expect(server.runJobs()).rejects.toThrow('away');
    const waiting = await server.dataSource.getRepository(OutgoingMail).findOneByOrFail({ userId: student.id });
    expect(waiting).toMatchObject({ attempts: 1, sentAt: null, lastError: expect.stringContaining('away') });
    server.mailServer.broken = false;
    await server.runJobs();
    await mail.sendMail(waiting.id);
    expect(server.mails).toHaveLength(1);
    expect(server.mails[0]?.headers['Message-ID']).toBe(`<${waiting.id}@slipstone.test>`);
  });

  it('keeps nothing of a letter that has left', async () => {
    await queueIt({ kind: 'reset', userId: student.id, data: { name: student.name, token: 'secret-token', hours: 2 } });
    await server.runJobs();
    expect(server.mails[0]?.text).toContain('/reset/secret-token');
    const sent = await server.dataSource.getRepository(OutgoingMail).findOneByOrFail({ userId: student.id });
    expect(JSON.stringify(sent)).not.toContain('secret-token');
  });

  it('sends nothing to a person without an address or whose account is closed', async () => {
    const silent = await server.create.user('student', { email: null, userName: `u${Math.random()}` });
    const closed = await server.create.user('student', { disabledAt: server.clock.now() });
    await queueIt(writingOpened(silent));
    await queueIt(writingOpened(closed));
    await server.runJobs();
    expect(server.mails).toEqual([]);
  });

  it('forgets old letters', async () => {
    await queueIt(writingOpened(student));
    await server.runJobs();
    server.clock.advance({ days: 91 });
    await mail.sweepMail();
    expect(await server.dataSource.getRepository(OutgoingMail).countBy({ userId: student.id })).toBe(0);
  });
});

describe('one-click unsubscribe', () => {
  it('is offered only for kinds that the account does not need', async () => {
    await queueIt({ kind: 'reset', userId: student.id, data: { name: 'N', token: 't', hours: 2 } });
    await queueIt(writingOpened(student));
    await server.runJobs();
    const [reset, opened] = server.mails;
    expect(reset?.headers).not.toHaveProperty('List-Unsubscribe');
    expect(opened?.headers['List-Unsubscribe-Post']).toBe('List-Unsubscribe=One-Click');
  });

  it('shows a page on GET and changes nothing', async () => {
    const path = await unsubscribePath();
    const response = await server.visitor().get(path).expect(200);
    expect(response.text).toContain('Stop these letters?');
    expect(await mail.listPreferences(toViewer(student))).toContainEqual(
      expect.objectContaining({ kind: 'writing-opened', wanted: true }),
    );
  });

  it('unsubscribes on POST without cookies or Origin, twice as well as once', async () => {
    const path = await unsubscribePath();
    const post = () =>
      server.visitor().post(path).unset('Origin').type('form').send({ 'List-Unsubscribe': 'One-Click' });
    await post().expect(200);
    await post().expect(200);
    server.mails.length = 0;
    await queueIt(writingOpened(student));
    await queueIt({ kind: 'reset', userId: student.id, data: { name: 'N', token: 't', hours: 2 } });
    await server.runJobs();
    expect(server.mails.map(({ subject }) => subject)).toEqual(['Choose a new password']);
  });

  it('answers 404 for a link that we did not sign', async () => {
    const path = await unsubscribePath();
    await server
      .visitor()
      .post(`${path.slice(0, -4)}AAAA`)
      .expect(404);
    await server.visitor().get('/unsubscribe/nonsense').expect(404);
  });
});

describe('mail preferences', () => {
  it('can be read and set by oneself', async () => {
    const client = await server.signIn(student);
    await client.put('/mail-preferences', { kind: 'review-due', wanted: false }).expect(204);
    const off = await client.get('/mail-preferences').expect(200);
    expect(off.body.preferences).toContainEqual({ kind: 'review-due', words: 'A review is due', wanted: false });
    await client.put('/mail-preferences', { kind: 'review-due', wanted: true }).expect(204);
    const on = await client.get('/mail-preferences').expect(200);
    expect(on.body.preferences).toContainEqual({ kind: 'review-due', words: 'A review is due', wanted: true });
  });

  it('answer 401 when signed out and 422 for an unknown kind', async () => {
    await server.visitor().get('/mail-preferences').expect(401);
    await server.visitor().put('/mail-preferences', { kind: 'review-due', wanted: false }).expect(401);
    const client = await server.signIn(student);
    const response = await client.put('/mail-preferences', { kind: 'reset', wanted: 'no' }).expect(422);
    expect(response.body.errors.map(({ pointer }: { pointer: string }) => pointer)).toEqual(['/kind', '/wanted']);
  });
});

function toViewer(user: User) {
  return { userId: user.id, schoolId: user.schoolId, role: user.role, sessionId: '' };
}
