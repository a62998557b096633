import { IsNull, type DataSource, type EntityManager } from 'typeorm';
import type { InvitationAnswer } from '../../../shared/schemas/people.ts';
import { notFound, ProblemError } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import { bind } from '../../lib/bind.ts';
import type { Now } from '../../lib/clock.ts';
import { inEvenTime } from '../../lib/even-time.ts';
import type { RateLimiter } from '../../lib/rate-limit.ts';
import { createToken, sha256 } from '../../lib/secrets.ts';
import { recordAudit } from '../audit/record.ts';
import type { QueueMail } from '../mail/queue-mail.ts';
import { User } from '../people/people.entity.ts';
import { giveAlias } from './aliases.ts';
import { Class, Invitation, JoinRequest, Membership, RosterEntry } from './classes.entity.ts';
import { refuseUnfitRole } from './fitting-role.ts';

export interface JoiningDeps {
  readonly db: DataSource;
  readonly now: Now;
  readonly rateLimiter: RateLimiter;
  readonly queueMail: QueueMail;
  readonly beginSession: (userId: string, userAgent: string) => Promise<string>;
  readonly hashPassword: (password: string) => Promise<string>;
  readonly refuseCommonPassword: (password: string, own: readonly (string | null)[]) => void;
}

export interface NewPerson {
  readonly name: string;
  readonly userName?: string | undefined;
  readonly password: string;
}

const SIGN_UP_DAYS = 3;
export type JoiningService = ReturnType<typeof createJoiningService>;

/** The ways into a class: its code, or an invitation. */
export function createJoiningService(deps: JoiningDeps) {
  return bind(deps, {
    findClassOfCode,
    signUpByMail,
    signUpByName,
    joinByCode,
    findInvitation,
    acceptInvitation,
    acceptSignedIn,
  });
}

/** What the holder of a code may know of its class. */
async function findClassOfCode(deps: JoiningDeps, code: string): Promise<{ className: string; hasEmail: boolean }> {
  const found = await findClassByCode(deps.db.manager, code);
  return { className: found.name, hasEmail: found.hasEmail };
}

/** Mails a link that makes the account, or tells an account's owner to sign in; the answer is the same. */
async function signUpByMail(deps: JoiningDeps, code: string, email: string): Promise<void> {
  await deps.rateLimiter.count(`sign-up of ${email}`, 4, 3600);
  await inEvenTime(deps.db.transaction((manager) => mailSignUp(deps, manager, code, email)));
}

async function mailSignUp(deps: JoiningDeps, manager: EntityManager, code: string, email: string): Promise<void> {
  const target = await findClassByCode(manager, code);
  if (await manager.existsBy(User, { email })) {
    await deps.queueMail(manager, {
      kind: 'already-here',
      userId: null,
      to: email,
      data: { className: target.name },
    });
    return;
  }
  const token = await createInvitation(manager, {
    schoolId: target.schoolId,
    classId: target.id,
    role: 'student',
    name: '',
    email,
    createdById: null,
    asksToJoin: true,
    expiresAt: daysFrom(deps.now(), SIGN_UP_DAYS),
  });
  await deps.queueMail(manager, {
    kind: 'sign-up',
    userId: null,
    to: email,
    data: { className: target.name, token },
  });
}

/** Makes the account at once, for a class without e-mail; the teacher still accepts. */
async function signUpByName(deps: JoiningDeps, code: string, person: NewPerson, userAgent: string): Promise<string> {
  const userId = await deps.db.transaction(async (manager) => {
    const target = await findClassByCode(manager, code);
    if (target.hasEmail) throw fieldError('/userName', 'This class signs up by e-mail.');
    const user = await createStudent(deps, manager, target.schoolId, 'student', person, null);
    await askToJoin(manager, target, user, deps.now(), deps.queueMail);
    return user.id;
  });
  return await deps.beginSession(userId, userAgent);
}

/** Somebody with an account asks to join a further class of the same school. */
async function joinByCode(
  deps: JoiningDeps,
  viewer: Viewer,
  code: string,
): Promise<{ accepted: boolean; className: string }> {
  await deps.rateLimiter.count(`class codes of ${viewer.userId}`, 10, 600);
  return await deps.db.transaction(async (manager) => {
    const target = await findClassByCode(manager, code);
    if (target.schoolId !== viewer.schoolId)
      throw new ProblemError('gone', { detail: 'This code belongs to another school.' });
    if (await manager.existsBy(Membership, { classId: target.id, userId: viewer.userId, removedAt: IsNull() })) {
      throw new ProblemError('conflict', { detail: `You are in ${target.name} already.` });
    }
    const user = await manager.findOneByOrFail(User, { id: viewer.userId });
    return { accepted: await askToJoin(manager, target, user, deps.now(), deps.queueMail), className: target.name };
  });
}

async function findInvitation(deps: JoiningDeps, token: string): Promise<InvitationAnswer> {
  const found = await findOpenInvitation(deps.db.manager, token, deps.now());
  const hasAccount = found.email !== null && (await deps.db.getRepository(User).existsBy({ email: found.email }));
  return {
    schoolName: found.school?.name ?? '',
    className: found.class?.name ?? null,
    role: found.role,
    name: found.name,
    email: found.email,
    asksToJoin: found.asksToJoin,
    hasAccount,
  };
}

/** Makes the account that an invitation is for, and signs in. */
async function acceptInvitation(
  deps: JoiningDeps,
  token: string,
  person: NewPerson,
  userAgent: string,
): Promise<string> {
  const userId = await deps.db.transaction(async (manager) => {
    const found = await takeInvitation(manager, token, deps.now());
    if (found.email && (await manager.existsBy(User, { email: found.email }))) {
      throw new ProblemError('conflict', { detail: 'There is an account with this address. Sign in to accept.' });
    }
    const role = found.role === 'admin' || found.role === 'teacher' ? found.role : 'student';
    const user = await createStudent(deps, manager, found.schoolId, role, person, found.email);
    await enter(manager, found, user, deps.now(), deps.queueMail);
    return user.id;
  });
  return await deps.beginSession(userId, userAgent);
}

/** Somebody who is signed in accepts with the account they have. */
async function acceptSignedIn(deps: JoiningDeps, viewer: Viewer, token: string): Promise<void> {
  await deps.db.transaction(async (manager) => {
    const found = await takeInvitation(manager, token, deps.now());
    const user = await manager.findOneByOrFail(User, { id: viewer.userId });
    if (found.schoolId !== user.schoolId || (found.email !== null && found.email !== user.email)) {
      throw new ProblemError('not-found', {
        detail: 'This invitation is for another person. Sign out and open the link again.',
      });
    }
    await enter(manager, found, user, deps.now(), deps.queueMail);
  });
}

async function findClassByCode(manager: EntityManager, code: string): Promise<Class> {
  const found = await manager.findOneBy(Class, { joinCode: code, joinOpen: true, archivedAt: IsNull() });
  if (!found)
    throw new ProblemError('gone', {
      detail: 'No class takes this code now. Ask your teacher for the current one.',
    });
  return found;
}

async function createStudent(
  deps: JoiningDeps,
  manager: EntityManager,
  schoolId: string,
  role: User['role'],
  person: NewPerson,
  email: string | null,
) {
  const userName = email === null ? (person.userName ?? null) : null;
  if (email === null && userName === null) throw fieldError('/userName', 'Choose a user name.');
  deps.refuseCommonPassword(person.password, [person.name, email, userName]);
  if (userName !== null && (await manager.existsBy(User, { schoolId, userName }))) {
    throw fieldError('/userName', 'This user name is taken in your school. Choose another.');
  }
  const row = manager.create(User, {
    schoolId,
    role,
    name: person.name,
    email,
    userName,
    passwordHash: await deps.hashPassword(person.password),
  });
  return await manager.save(row);
}

export interface InvitationOrder {
  readonly schoolId: string;
  readonly classId: string | null;
  readonly role: Invitation['role'];
  readonly name: string;
  readonly email: string | null;
  readonly createdById: string | null;
  readonly asksToJoin: boolean;
  readonly expiresAt: Date;
}

/** Returns the link's secret; only its hash is kept. */
export async function createInvitation(manager: EntityManager, order: InvitationOrder): Promise<string> {
  const token = createToken();
  await manager.insert(Invitation, { ...order, tokenHash: sha256(token) });
  return token;
}

async function findOpenInvitation(manager: EntityManager, token: string, at: Date): Promise<Invitation> {
  const found = await manager.findOne(Invitation, {
    where: { tokenHash: sha256(token), acceptedAt: IsNull(), revokedAt: IsNull() },
    relations: { school: true, class: true },
  });
  if (!found || found.expiresAt <= at) {
    throw new ProblemError('gone', { detail: 'This link was used already or is too old. Ask for a new one.' });
  }
  return found;
}

async function takeInvitation(manager: EntityManager, token: string, at: Date): Promise<Invitation> {
  const found = await findOpenInvitation(manager, token, at);
  const { affected } = await manager.update(Invitation, { id: found.id, acceptedAt: IsNull() }, { acceptedAt: at });
  if (affected !== 1) throw new ProblemError('gone');
  return found;
}

async function enter(
  manager: EntityManager,
  found: Invitation,
  user: User,
  at: Date,
  queueMail: QueueMail,
): Promise<void> {
  await manager.update(Invitation, { id: found.id }, { acceptedById: user.id });
  if (!found.class || found.role === 'admin') return;
  if (found.asksToJoin) await askToJoin(manager, found.class, user, at, queueMail);
  else await addMember(manager, found.class, user, found.role, at);
}

/** True when the class list knows the person, who is then in at once. */
async function askToJoin(
  manager: EntityManager,
  target: Class,
  user: User,
  at: Date,
  queueMail: QueueMail,
): Promise<boolean> {
  await refuseUnfitRole(manager, target.id, user, 'student');
  const roster = await manager.findBy(RosterEntry, { classId: target.id });
  // Anyone can claim a name; only an address or user name that the teacher listed lets a person in unseen.
  const listed = roster.some(
    (entry) =>
      (user.email !== null && entry.email === user.email) ||
      (user.userName !== null && entry.userName === user.userName),
  );
  if (listed) {
    await addMember(manager, target, user, 'student', at);
    return true;
  }
  await manager
    .createQueryBuilder()
    .insert()
    .into(JoinRequest)
    .values({ classId: target.id, userId: user.id, createdAt: at })
    .orIgnore()
    .execute();
  const teachers = await manager.find(Membership, {
    where: { classId: target.id, role: 'teacher', removedAt: IsNull() },
    relations: { user: true },
    order: { userId: 'ASC' },
  });
  for (const { user: teacher } of teachers) {
    if (!teacher?.email) continue;
    await queueMail(manager, {
      kind: 'join-request',
      userId: teacher.id,
      to: teacher.email,
      data: { name: teacher.name, asker: user.name, className: target.name, classId: target.id },
      dedupeKey: `join-request ${target.id} ${at.toISOString().slice(0, 13)} ${teacher.id}`,
    });
  }
  return false;
}

/** Adds or re-admits a person. @throws {ProblemError} not-found where somebody of another school is meant. */
export async function addMember(
  manager: EntityManager,
  target: Class,
  user: User,
  role: Membership['role'],
  at: Date,
): Promise<void> {
  if (user.schoolId !== target.schoolId) throw notFound();
  // No stronger than this: rows that refer to the class share it, and two people who join at once would wait for each other.
  await manager.findOne(Class, { where: { id: target.id }, select: { id: true }, lock: { mode: 'for_no_key_update' } });
  const before = await manager.findOneBy(Membership, { classId: target.id, userId: user.id });
  if (before && before.removedAt === null) return;
  await refuseUnfitRole(manager, target.id, user, role);
  if (before) await manager.update(Membership, { id: before.id }, { removedAt: null, role });
  else await manager.insert(Membership, { classId: target.id, userId: user.id, role, joinedAt: at });
  if (role === 'student') await giveAlias(manager, target.id, user.id);
  await recordAudit(manager, {
    schoolId: target.schoolId,
    actorId: user.id,
    at,
    action: 'class.joined',
    objectKind: 'class',
    objectId: target.id,
    after: { userId: user.id, role },
  });
}

function fieldError(pointer: string, detail: string): ProblemError {
  return new ProblemError('invalid-fields', { errors: [{ pointer, detail }] });
}

function daysFrom(at: Date, days: number): Date {
  return new Date(at.getTime() + days * 86_400_000);
}
