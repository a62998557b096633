import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { AuditEntry } from '../../api/features/audit/audit.entity.ts';
import { Invitation, Membership } from '../../api/features/classes/classes.entity.ts';
import { Dispute } from '../../api/features/disputes/disputes.entity.ts';
import { OutgoingMail } from '../../api/features/mail/mail.entity.ts';
import type { User } from '../../api/features/people/people.entity.ts';
import { Finding, Review } from '../../api/features/reviews/reviews.entity.ts';
import { Round } from '../../api/features/rounds/rounds.entity.ts';
import { VerdictRecord } from '../../api/features/verdicts/verdicts.entity.ts';
import { sha256 } from '../../api/lib/secrets.ts';
import { seededRandom, shuffled } from '../../shared/lib/seeded-random.ts';
import { FAULTY, finding, OPEN, reviewedRound } from '../support/reviewed-round.ts';
import { handIn, listReviews, sheetOf, write } from '../support/round-work.ts';
import { startTestServer, type TestServer } from '../support/test-server.ts';

/** Tricks that people have tried, or might; each of them led somewhere once. */

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(() => server.clock.advance({ hours: 1 }));
afterAll(() => server.stop());

const PASSWORD = 'seven quiet herons';

async function invite(classId: string, schoolId: string, role: Invitation['role']): Promise<string> {
  const token = `a-link-for-${role}-${classId}`;
  const expiresAt = new Date(server.clock.now().getTime() + 86_400_000);
  await server.dataSource
    .getRepository(Invitation)
    .insert({ schoolId, classId, role, tokenHash: sha256(token), name: '', expiresAt });
  return token;
}

async function openReviewing(lateRule: Round['lateRule'], students = 6, writers = students - 1) {
  const school = await server.create.classWith({ students });
  const desk = await server.signIn(school.teacher);
  const round = await server.create.round(school.class, await server.create.task(school.teacher), { lateRule });
  server.clock.set(round.opensAt);
  const move = (to: string) => desk.post(`/rounds/${round.id}/stage`, { to }).expect(200);
  await move('writing');
  for (const { id } of school.students.slice(0, writers)) {
    await handIn(server.dataSource, { roundId: round.id, authorId: id, at: server.clock.now() });
  }
  return { ...school, desk, round, move };
}

describe('places in a class', () => {
  it('are not had twice: who has worked as a student does not come back as an assistant', async () => {
    const { students, desk, class: of, round } = await openReviewing('closed');
    const [student] = students as [User];
    const place = await server.dataSource
      .getRepository(Membership)
      .findOneByOrFail({ classId: of.id, userId: student.id });
    await desk.delete(`/classes/${of.id}/members/${place.id}`).expect(204);
    const token = await invite(of.id, of.schoolId, 'assistant');
    const client = await server.signIn(student);
    await client.post(`/invitations/${token}/accept`).expect(409);
    await client.get(`/rounds/${round.id}/board`).expect(404);
  });

  it('are not had by the wrong account: no student teaches, and no teacher, who can have lines ruled on, is a student', async () => {
    const { class: of } = await server.create.classWith();
    const student = await server.create.user('student', { schoolId: of.schoolId });
    const teacher = await server.create.user('teacher', { schoolId: of.schoolId });
    const asStudent = await server.signIn(student);
    const asTeacher = await server.signIn(teacher);
    await asStudent.post(`/invitations/${await invite(of.id, of.schoolId, 'teacher')}/accept`).expect(409);
    await asTeacher.post(`/invitations/${await invite(of.id, of.schoolId, 'student')}/accept`).expect(409);
    await asTeacher.post('/join-requests', { code: of.joinCode }).expect(409);
    expect(await server.dataSource.getRepository(Membership).countBy({ classId: of.id })).toBe(1);
  });

  it('end the reviews of whoever has left, until the round is settled', async () => {
    const round = await reviewedRound(server, { verdicts: [FAULTY] });
    const { id } = await round.review(0, 1);
    const client = await server.signIn(round.students[1]!);
    await client.get(`/reviews/${id}`).expect(200);
    const place = { classId: round.class.id, userId: round.students[1]!.id };
    await server.dataSource.getRepository(Membership).update(place, { removedAt: server.clock.now() });
    await client.get(`/reviews/${id}`).expect(404);
    await client.post(`/reviews/${id}/finding`, finding()).expect(404);
    expect(await server.dataSource.getRepository(Finding).countBy({ reviewId: id })).toBe(0);
  });
});

describe('somebody who leaves while others review', () => {
  it('leaves no derivation behind with a review less', async () => {
    const { students, class: of, desk, round, move } = await openReviewing('closed', 7, 7);
    await move('reviewing');
    const gone = students[3]!;
    const place = { classId: of.id, userId: gone.id };
    const { id } = await server.dataSource.getRepository(Membership).findOneByOrFail(place);
    await desk.delete(`/classes/${of.id}/members/${id}`).expect(204);
    await server.platform.queue.enqueueInTransaction(server.dataSource.manager, 'rounds-sweep', {});
    await server.runJobs();
    const reviews = await listReviews(server.dataSource, round.id);
    expect(reviews.filter(({ reviewerId }) => reviewerId === gone.id)).toEqual([]);
    for (const { id: author } of students.filter((student) => student !== gone)) {
      expect(reviews.filter(({ derivation }) => derivation.authorId === author)).toHaveLength(2);
    }
    for (const { reviewerId, derivation } of reviews) expect(reviewerId).not.toBe(derivation.authorId);
  });
});

describe('the letter about somebody who asks to join', () => {
  it('names who asks', async () => {
    const { class: of, teacher } = await server.create.classWith();
    const asker = await server.create.user('student', { schoolId: of.schoolId, name: 'Ilse Maroon' });
    await (await server.signIn(asker)).post('/join-requests', { code: of.joinCode }).expect(201);
    await server.runJobs();
    const letter = server.mails.findLast(({ to }) => to === teacher.email);
    expect(letter?.subject).toContain('Ilse Maroon');
    expect(letter?.text).toContain(`Dear ${teacher.name}`);
  });
});

describe('a first name on one’s own sheet', () => {
  it('does not tell whose surname it is', async () => {
    const { students, class: of, round } = await openReviewing('closed', 2, 0);
    const classmate = await server.create.user('student', { schoolId: of.schoolId, name: 'Wilhelmina Oakhurst' });
    await server.create.membership(of, classmate);
    const client = await server.signIn(students[0]!);
    const { draft } = (await client.get(`/rounds/${round.id}/sheet`).expect(200)).body;
    const document = {
      type: 'doc',
      content: [{ type: 'paragraph', content: [{ type: 'text', text: 'Wilhelmina showed me this' }] }],
    };
    await client.put(`/rounds/${round.id}/sheet`, { document, baseVersion: draft.version }).expect(200);
    const preview = await client.get(`/rounds/${round.id}/sheet/preview`).expect(200);
    expect(preview.body.names).toEqual(['Wilhelmina']);
    expect(preview.text).not.toContain('Oakhurst');
  });
});

describe('what a sheet may hold', () => {
  it('is kept but for signs that no database keeps, and a name within a line is noticed', async () => {
    const { students, class: of, round } = await openReviewing('closed', 1, 0);
    const classmate = await server.create.user('student', { schoolId: of.schoolId, name: 'Perpetua Lane' });
    await server.create.membership(of, classmate);
    const client = await server.signIn(students[0]!);
    const { draft } = (await client.get(`/rounds/${round.id}/sheet`).expect(200)).body;
    const document = {
      type: 'doc',
      content: [
        {
          type: 'paragraph',
          content: [
            { type: 'text', text: 'half \ud83d of it\u0000' },
            { type: 'text', text: '\ud83d' },
          ],
        },
        ...sheetOf(['x\u0000+1 \\text{ for Perpetua}']).content,
      ],
    };
    await client.put(`/rounds/${round.id}/sheet`, { document, baseVersion: draft.version }).expect(200);
    const { body } = await client.get(`/rounds/${round.id}/sheet/preview`).expect(200);
    expect(body.lines[1]).toMatchObject({ tex: 'x+1 \\text{ for Perpetua}', prose: 'half  of it' });
    expect(body.names).toEqual(['Perpetua']);
  });
});

describe('an assistant who may not see names', () => {
  it('cannot reckon them back from the class list and the round', async () => {
    const { students, class: of, round } = await openReviewing('closed', 9, 9);
    const assistant = await server.create.user('student', { schoolId: of.schoolId });
    await server.create.membership(of, assistant, { role: 'assistant', alias: null });
    for (const [i, { id }] of students.entries()) {
      // Something of each person that shows on the board.
      await server.dataSource.query('update derivation set handed_in_at = $1 where round_id = $2 and author_id = $3', [
        new Date(server.clock.now().getTime() + i * 60_000),
        round.id,
        id,
      ]);
    }
    const { people } = (await (await server.signIn(assistant)).get(`/rounds/${round.id}/board`).expect(200)).body;
    const shown = (people as { handedInAt: string }[]).map(({ handedInAt }) => handedInAt);
    const ofClass = (await (await server.signIn({ id: round.createdById })).get(`/rounds/${round.id}/board`)).body;
    const byName = (ofClass.people as { handedInAt: string }[]).map(({ handedInAt }) => handedInAt);
    expect(shown.toSorted()).toEqual(byName.toSorted());
    expect(shown).not.toEqual(shuffled(byName, seededRandom(`board ${round.id}`)));
  });
});

describe('somebody who has read a classmate’s derivation', () => {
  it('hands in nothing any more, neither in the grace after a stage moved by hand', async () => {
    const { students, round, move } = await openReviewing('closed');
    const idle = students.at(-1)!;
    await write(server.dataSource, {
      roundId: round.id,
      authorId: idle.id,
      at: server.clock.now(),
      lines: ['x^2-3x+2x-6', 'x^2-x-6'],
    });
    await move('reviewing');
    const client = await server.signIn(idle);
    const [review] = await server.dataSource.getRepository(Review).findBy({ roundId: round.id, reviewerId: idle.id });
    await client.get(`/reviews/${review!.id}`).expect(200);
    const sheet = (await client.get(`/rounds/${round.id}/sheet`).expect(200)).body;
    expect(sheet.canWrite).toBe(false);
    const form = { document: sheetOf(['x']), baseVersion: sheet.draft.version };
    await client.put(`/rounds/${round.id}/sheet`, form).expect(409);
    await client.post(`/rounds/${round.id}/sheet/hand-in`, { draftVersion: sheet.draft.version }).expect(409);
  });

  it('nor when a classmate is given longer after the late batch', async () => {
    const { students, desk, round, move } = await openReviewing('late-batch', 7);
    const [idle, ill] = [students[5]!, students[6]!];
    await server.dataSource.query('update derivation set current_version_id = null where author_id = $1', [idle.id]);
    await move('reviewing');
    await desk.post(`/rounds/${round.id}/late-batch`).expect(200);
    const client = await server.signIn(idle);
    const [review] = (await listReviews(server.dataSource, round.id)).filter(
      ({ reviewerId }) => reviewerId === idle.id,
    );
    await client.get(`/reviews/${review!.id}`).expect(200);
    const { reviewingEndsAt } = await server.dataSource.getRepository(Round).findOneByOrFail({ id: round.id });
    const writingEndsAt = new Date(reviewingEndsAt.getTime() - 3_600_000).toISOString();
    await desk.put(`/rounds/${round.id}/people/${ill.id}/extension`, { writingEndsAt, reason: 'ill' }).expect(204);
    expect((await client.get(`/rounds/${round.id}/sheet`).expect(200)).body.canWrite).toBe(false);
    const { things } = (await client.get('/today').expect(200)).body;
    expect((things as { kind: string }[]).map(({ kind }) => kind)).toEqual(['review']);
  });
});

describe('setting reviews aside', () => {
  it('brings others to do, but not the whole class, and stands in the trail', async () => {
    const { students, round, move } = await openReviewing('closed', 10, 10);
    await move('reviewing');
    const leafing = students[0]!;
    const client = await server.signIn(leafing);
    const open = async () =>
      (await server.dataSource.getRepository(Review).findBy({ roundId: round.id, reviewerId: leafing.id })).filter(
        ({ setAside }) => setAside === null,
      );
    for (let turn = 0; turn < 5; turn += 1) {
      for (const { id } of await open()) {
        await client.post(`/reviews/${id}/set-aside`, { reason: 'know-the-author' }).expect(200);
      }
      server.clock.advance({ minutes: 2 });
      await server.platform.queue.enqueueInTransaction(server.dataSource.manager, 'rounds-sweep', {});
      await server.runJobs();
    }
    const seen = await server.dataSource.getRepository(Review).countBy({ roundId: round.id, reviewerId: leafing.id });
    expect(seen).toBe(4);
    expect(
      await server.dataSource.getRepository(AuditEntry).countBy({ actorId: leafing.id, action: 'review.set-aside' }),
    ).toBe(4);
  });
});

describe('a verdict that comes after a forced settling', () => {
  it('changes nothing of the settled round', async () => {
    const round = await reviewedRound(server, { verdicts: [null] });
    const reviewer = await server.signIn(round.students[1]!);
    const { id } = await round.review(0, 1);
    await reviewer.post(`/reviews/${id}/finding`, finding()).expect(200);
    const versionId = round.derivations[0]!.version.id;
    await server.platform.queue.enqueueInTransaction(server.dataSource.manager, 'check-derivation', { versionId });
    await round.move('answering');
    await round.move('settled');
    await server.runJobs();
    expect(await server.dataSource.getRepository(VerdictRecord).countBy({ versionId })).toBe(0);
    const { result } = (await reviewer.get(`/reviews/${id}`).expect(200)).body;
    expect(result).toMatchObject({ outcome: 'void', verdict: { outcome: 'undecided' } });
  });
});

describe('contesting again what a teacher has ruled on', () => {
  it('is answered alike, and does not come back to the desk', async () => {
    const round = await reviewedRound(server, { verdicts: [OPEN] });
    const reviewer = await server.signIn(round.students[1]!);
    await reviewer.post(`/reviews/${(await round.review(0, 1)).id}/finding`, finding()).expect(200);
    await round.move('answering');
    const author = await server.signIn(round.students[0]!);
    const path = `/derivations/${round.derivations[0]!.derivation.id}`;
    const { key } = (await author.get(path).expect(200)).body.findings[0];
    const first = await author.put(`/findings/${key}/answer`, { kind: 'contest', reason: 'It follows.' }).expect(204);
    const disputes = server.dataSource.getRepository(Dispute);
    const contested = await disputes.findOneByOrFail({ roundId: round.round.id, kind: 'contested-finding' });
    const desk = await server.signIn(round.teacher);
    await desk
      .post(`/disputes/${contested.id}/ruling`, { decision: 'fails', reason: 'A product is lost.' })
      .expect(204);
    const again = await author.put(`/findings/${key}/answer`, { kind: 'contest', reason: 'It does.' }).expect(204);
    expect(again.text).toBe(first.text);
    expect((await disputes.findBy({ roundId: round.round.id })).every(({ closedAt }) => closedAt !== null)).toBe(true);
  });
});

describe('a link to a new address', () => {
  it('is worth nothing once the password has been changed', async () => {
    const school = await server.create.school();
    const { class: of } = await server.create.classWith({ values: { schoolId: school.id } });
    const token = await invite(of.id, of.schoolId, 'student');
    const client = server.visitor();
    const form = { name: 'Renske Vos', userName: 'renske.vos', password: PASSWORD };
    await client.post(`/invitations/${token}/account`, form).expect(201);
    const email = 'somebody.else@school.test';
    await client.post('/account/email', { email, password: PASSWORD }).expect(202);
    await server.runJobs();
    const link = /\/account\/email\/([\w-]+)/.exec(server.mails.findLast(({ to }) => to === email)?.text ?? '')?.[1];
    await client.post('/account/password', { current: PASSWORD, password: 'nine loud geese' }).expect(204);
    await server.visitor().post(`/email-changes/${link}`).expect(410);
  });
});

describe('an admin', () => {
  it('sees the letters of the own school only', async () => {
    const own = await server.create.user('admin');
    const other = await server.create.user('student');
    const letter = { kind: 'reset', subject: '', text: '', html: '', headers: {}, attempts: 3 };
    await server.dataSource.getRepository(OutgoingMail).insert([
      { ...letter, recipient: own.email ?? '', userId: own.id, lastError: `no mailbox ${own.email}` },
      { ...letter, recipient: other.email ?? '', userId: other.id, lastError: `no mailbox ${other.email}` },
      { ...letter, recipient: other.email ?? '', userId: null, lastError: `no mailbox ${other.email}` },
    ]);
    const { body, text } = await (await server.signIn(own)).get('/admin/mail').expect(200);
    expect(body).toMatchObject({ waiting: 1 });
    expect(body.failed).toHaveLength(1);
    expect(text).not.toContain(other.email);
  });

  it('can leaf through the whole trail, also where many entries are of one instant', async () => {
    const admin = await server.create.user('admin');
    const entry = { schoolId: admin.schoolId, actorId: admin.id, objectKind: 'school', objectId: admin.schoolId };
    await server.dataSource.getRepository(AuditEntry).insert(
      Array.from({ length: 90 }, (_, i) => ({
        ...entry,
        action: `tried.${i}`,
        // Sixty of one instant, which lies across the end of the first page.
        at: new Date(server.clock.now().getTime() - (i < 30 ? i : 30) * 1000),
      })),
    );
    const client = await server.signIn(admin);
    const seen = new Set<string>();
    let before = '';
    for (let more = true; more;) {
      const page = (await client.get(`/admin/trail?${before && `before=${before}`}`).expect(200)).body;
      for (const { action } of page.entries as { action: string }[]) seen.add(action);
      before = page.entries.at(-1).at;
      more = page.more;
    }
    expect(seen.size).toBe(90);
    expect((await client.get('/admin/trail?search=%25').expect(200)).body.entries).toEqual([]);
  });
});

describe('an answer in the last minute', () => {
  it('has its two minutes also where the round settles the moment answering ends', async () => {
    const { round, students, move } = await openReviewing('closed', 3, 3);
    await server.dataSource.getRepository(Round).update(round.id, { settlesAt: round.answeringEndsAt });
    await move('reviewing');
    const [review] = await listReviews(server.dataSource, round.id);
    const reviewer = await server.signIn({ id: review!.reviewerId });
    await reviewer.post(`/reviews/${review!.id}/finding`, finding()).expect(200);
    await move('answering');
    const author = await server.signIn(students.find(({ id }) => id === review!.derivation.authorId)!);
    const { key } = (await author.get(`/derivations/${review!.derivation.id}`).expect(200)).body.findings[0];
    server.clock.set(round.answeringEndsAt);
    server.clock.advance({ minutes: 1 });
    await server.runJobs();
    await author.put(`/findings/${key}/answer`, { kind: 'accept' }).expect(204);
    server.clock.advance({ minutes: 2 });
    await server.platform.queue.enqueueInTransaction(server.dataSource.manager, 'rounds-sweep', {});
    await server.runJobs();
    await author.put(`/findings/${key}/answer`, { kind: 'accept' }).expect(409);
  });
});

describe('what touches marks in a round’s plan', () => {
  it('stands in the trail with before and after', async () => {
    const { class: of, teacher } = await server.create.classWith();
    const desk = await server.signIn(teacher);
    const task = await server.create.task(teacher);
    const at = (days: number) => new Date(server.clock.now().getTime() + days * 86_400_000).toISOString();
    const form = {
      classId: of.id,
      taskId: task.id,
      opensAt: at(1),
      writingEndsAt: at(2),
      reviewingEndsAt: at(3),
      answeringEndsAt: at(4),
      settlesAt: at(5),
      reviewsPerDerivation: 2,
      lateRule: 'closed',
    };
    const { id } = (await desk.post('/rounds', form).expect(201)).body;
    await desk.put(`/rounds/${id}`, { ...form, lateRule: 'late-batch', version: 1 }).expect(200);
    await desk.delete(`/rounds/${id}`).expect(204);
    const trail = await server.dataSource
      .getRepository(AuditEntry)
      .find({ where: { objectId: id }, order: { action: 'ASC' } });
    expect(trail.map(({ action }) => action)).toEqual(['round.changed', 'round.deleted', 'round.planned']);
    expect(trail[0]).toMatchObject({
      actorId: teacher.id,
      before: { lateRule: 'closed' },
      after: { lateRule: 'late-batch' },
    });
  });
});

describe('a name', () => {
  it.each([
    ['a second line', 'Ida\nhttp://elsewhere.test'],
    ['a turn of the direction of writing', 'Ida \u202eoimaS'],
    ['a sign that no text holds', 'Ida\u0000'],
  ])('holds no %s', async (_what, name) => {
    const user = await server.create.user('student');
    const answer = await (await server.signIn(user)).patch('/account', { name }).expect(422);
    expect(answer.body.errors[0].pointer).toBe('/name');
  });
});

describe('a class behind one address', () => {
  it('does not share one person’s tries where people are signed in', async () => {
    const { students } = await server.create.classWith({ students: 2 });
    const [one, other] = await Promise.all(students.map((student) => server.signIn(student)));
    const path = '/derivations/0b8f5c1e-4c1d-4f0e-9a57-3f1f6c0d2b11/mend/hand-in';
    for (let i = 0; i < 20; i += 1) await one!.post(path, { draftVersion: 1 }).expect(404);
    await one!.post(path, { draftVersion: 1 }).expect(429);
    await other!.post(path, { draftVersion: 1 }).expect(404);
  });
});
