import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createApp } from '../../api/app.ts';
import { seedDemo } from '../../api/db/seed.ts';
import { DEMO_PASSWORD, DEMO_SCHOOL } from '../../api/db/seed/cast.ts';
import type { DemoAccount } from '../../api/features/demo/demo.service.ts';
import { serveBuiltClient } from '../../api/http/client-files.ts';
import { composeServices, type Platform } from '../../api/services.ts';
import type { TodayAnswer } from '../../shared/schemas/today.ts';
import { startTestServer, type Client, type TestServer } from '../support/test-server.ts';

let server: TestServer;
let platform: Platform;
let accounts: readonly DemoAccount[];
let wasSeeded: boolean;

beforeAll(async () => {
  server = await startTestServer();
  platform = { ...server.platform, config: { ...server.platform.config, demo: true } };
  // What a seeding leaves that was broken off.
  await server.create.school(DEMO_SCHOOL);
  wasSeeded = await seedDemo(platform);
  const app = await createDemoApp();
  const answer = await request(app).get('/api/demo/accounts').expect(200);
  accounts = answer.body as readonly DemoAccount[];
}, 180_000);
afterAll(() => server.stop());

async function createDemoApp(serveClient?: Parameters<typeof createApp>[0]['serveClient']) {
  const composed = composeServices(platform);
  return await createApp({ ...platform, ...composed, ...(serveClient && { serveClient }) });
}

async function enter(signInName: string): Promise<Client> {
  const client = server.visitor();
  await client.post('/session', { name: signInName, password: DEMO_PASSWORD });
  return client;
}

async function todayOf(client: Client): Promise<TodayAnswer> {
  return (await client.get('/today').expect(200)).body as TodayAnswer;
}

describe('the demo', () => {
  it('is made once', async () => {
    expect(wasSeeded).toBe(true);
    expect(await seedDemo(platform)).toBe(false);
    const schools: { name: string }[] = await server.dataSource.query('select name from school');
    expect(schools).toEqual([{ name: DEMO_SCHOOL.name }]);
  });

  it('has 24 students in two classes, one of them without e-mail', async () => {
    const rows: object[] = await server.dataSource.query(
      `select c.name, c.has_email, count(*)::int as students, count(p.email)::int as addresses
         from class c join membership m on m.class_id = c.id and m.role = 'student' join person p on p.id = m.user_id
        group by c.id order by c.name`,
    );
    expect(rows).toEqual([
      { name: '10C', has_email: true, students: 14, addresses: 14 },
      { name: '9A', has_email: false, students: 10, addresses: 0 },
    ]);
  });

  it('has a round in every stage, and one that waits for rulings', async () => {
    const rows: { stage: string; waiting: boolean }[] = await server.dataSource.query(
      `select r.stage, r.waiting_for_rulings as waiting from round r join class c on c.id = r.class_id
        where c.name = '10C' order by r.number`,
    );
    const stages = rows.map(({ stage, waiting }) => (waiting ? 'waiting' : stage));
    expect(new Set(stages)).toEqual(new Set(['settled', 'waiting', 'answering', 'reviewing', 'writing', 'planned']));
    expect(stages.filter((stage) => stage === 'settled').length).toBeGreaterThanOrEqual(3);
  });

  it('shows a ruling on a step that the checker left open', async () => {
    const rows: { decision: string }[] = await server.dataSource.query(
      `select g.decision from ruling g join dispute d on d.id = g.dispute_id join round r on r.id = g.round_id
        where d.kind = 'undecided' and r.stage = 'settled' order by g.created_at`,
    );
    expect(rows.map(({ decision }) => decision)).toEqual(['holds', 'fails']);
  });

  it('has derivations with many kinds of slips, findings of every fate, mends and standings', async () => {
    const one = async (sql: string) => ((await server.dataSource.query(sql)) as { n: number }[])[0]?.n ?? 0;
    expect(await one(`select count(distinct outcome)::int as n from score`)).toBeGreaterThanOrEqual(6);
    expect(await one(`select count(distinct slip_kind)::int as n from finding`)).toBeGreaterThanOrEqual(6);
    expect(await one(`select count(*)::int as n from derivation_version where purpose = 'mend'`)).toBeGreaterThan(5);
    expect(await one(`select count(*)::int as n from standings_sheet where body->>'withheld' is null`)).toBeGreaterThan(
      0,
    );
  });

  it('tells nobody of a time that has not come', async () => {
    const late: object[] = await server.dataSource.query(
      `select 'version' from derivation_version where handed_in_at > $1 union all
       select 'finding' from finding where handed_in_at > $1 union all
       select 'answer' from answer where updated_at > $1 union all
       select 'trail' from audit_entry where at > $1`,
      [server.clock.now()],
    );
    expect(late).toEqual([]);
  });

  it('posts only the latest letters, and only to those who can be tried', async () => {
    const waiting: { recipient: string }[] = await server.dataSource.query(
      'select distinct recipient from outgoing_mail where sent_at is null',
    );
    expect(waiting.length).toBeGreaterThan(0);
    const known = new Set(accounts.map(({ signInName }) => signInName));
    expect(waiting.filter(({ recipient }) => !known.has(recipient))).toEqual([]);
    expect(
      await server.dataSource.query(`select 1 from outgoing_mail where sent_at is not null and text <> ''`),
    ).toEqual([]);
  });

  it('leaves jobs that carry the rounds on', async () => {
    const jobs: { name: string }[] = await server.dataSource.query(
      `select distinct name from pgboss.job where state = 'created' and start_after > $1 order by name`,
      [server.clock.now()],
    );
    expect(jobs.map(({ name }) => name)).toContain('round-due');
  });
});

describe('GET /api/demo/accounts', () => {
  it('offers each role, with what waits for them', () => {
    const what = accounts.map((account) => account.what).join('\n');
    for (const words of [
      'teacher of 10C: ',
      'disputes to settle',
      'rounds running',
      'assistant of 10C',
      'admin of the school',
      'a derivation to write',
      'reviews to do',
      'to answer',
      'a verdict to read',
      'a mend to write',
      'student in 9A',
    ])
      expect(what).toContain(words);
  });

  it('names only people who can sign in', async () => {
    for (const { signInName, name } of accounts) {
      const client = await enter(signInName);
      expect((await client.get('/me').expect(200)).body.user.name).toBe(name);
    }
  });

  it('does not exist outside the demo', async () => {
    await server.visitor().get('/demo/accounts').expect(404);
  });

  it('is empty where another school is', async () => {
    await server.dataSource.query('update school set name = $1', ['Another School']);
    try {
      const { body } = await request(await createDemoApp())
        .get('/api/demo/accounts')
        .expect(200);
      expect(body).toEqual([]);
      expect(await seedDemo(platform)).toBe(false);
    } finally {
      await server.dataSource.query('update school set name = $1', [DEMO_SCHOOL.name]);
    }
  });
});

describe('people of the demo', () => {
  it('a student has something to write, to review, to answer and to look at', async () => {
    const noor = await todayOf(await enter('noor.haddadin@brackenfell.example'));
    expect(noor.things.map(({ kind }) => kind)).toEqual(expect.arrayContaining(['write', 'review', 'look']));
    const tomasz = await todayOf(await enter('tomasz.wierzba@brackenfell.example'));
    expect(tomasz.things.map(({ kind }) => kind)).toContain('answer');
  });

  it('the teacher finds people stuck, writing, done and not begun on the board', async () => {
    const mira = await enter('mira.castellan@brackenfell.example');
    const { rounds } = await todayOf(mira);
    const round = rounds.find(({ stage }) => stage === 'writing');
    const { body } = await mira.get(`/rounds/${round?.id ?? ''}/board`).expect(200);
    const { people, alerts } = body as { people: { state: string }[]; alerts: { kind: string }[] };
    expect(new Set(people.map(({ state }) => state))).toEqual(new Set(['stuck', 'not-begun', 'writing', 'handed-in']));
    expect(alerts.map(({ kind }) => kind)).toContain('line-stops');
  });
});

describe('the mark on the document', () => {
  async function pageOf(demo: boolean): Promise<string> {
    const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'slipstone-client-'));
    try {
      fs.writeFileSync(path.join(folder, 'index.html'), '<!doctype html><html lang="en-GB"><body></body></html>');
      const app = await createDemoApp((express) => serveBuiltClient(express, folder, demo));
      return (await request(app).get('/any/page').expect(200).expect('content-type', /html/)).text;
    } finally {
      fs.rmSync(folder, { recursive: true });
    }
  }

  it('is there in the demo and nowhere else', async () => {
    expect(await pageOf(true)).toContain('<html data-demo lang="en-GB">');
    expect(await pageOf(false)).toContain('<html lang="en-GB">');
  });
});
