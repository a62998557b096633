import type { DataSource, EntityManager } from 'typeorm';
import type { ViewerAnswer } from '../../../shared/schemas/people.ts';
import { notFound, ProblemError } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import { bind } from '../../lib/bind.ts';
import type { Now } from '../../lib/clock.ts';
import { inEvenTime } from '../../lib/even-time.ts';
import type { RateLimiter } from '../../lib/rate-limit.ts';
import { recordAudit } from '../audit/record.ts';
import { Membership } from '../classes/classes.entity.ts';
import type { QueueMail } from '../mail/queue-mail.ts';
import { hashPassword, passwordMatches, refuseCommonPassword } from './passwords.ts';
import { User } from './people.entity.ts';
import type { Sessions } from './sessions.ts';
import { issueToken, takeToken, voidTokens } from './tokens.ts';

export interface PeopleDeps {
  readonly db: DataSource;
  readonly now: Now;
  readonly sessions: Sessions;
  readonly rateLimiter: RateLimiter;
  readonly queueMail: QueueMail;
}

const RESET_HOURS = 2;
const EMAIL_CHANGE_HOURS = 24;
const TRIES_PER_QUARTER_HOUR = 12;

export type PeopleService = ReturnType<typeof createPeopleService>;

/** Signing in and out, passwords and addresses. Nothing here tells whether an address is known. */
export function createPeopleService(deps: PeopleDeps) {
  return bind(deps, {
    signIn,
    signOut,
    signOutEverywhere,
    findViewer,
    askForReset,
    resetPassword,
    signInByCode,
    changePassword,
    askForEmailChange,
    changeEmail,
    changeName,
  });
}

/** @throws {ProblemError} wrong-sign-in; the same, and as late, for an unknown name. */
async function signIn(
  deps: PeopleDeps,
  { name, password, ip, userAgent }: { name: string; password: string; ip: string; userAgent: string },
): Promise<string> {
  await deps.rateLimiter.count(`sign-in of ${name} from ${ip}`, TRIES_PER_QUARTER_HOUR, 900);
  // From wherever: wide enough that a stranger elsewhere does not lock somebody out at once.
  await deps.rateLimiter.count(`sign-in of ${name}`, 5 * TRIES_PER_QUARTER_HOUR, 900);
  const matching = await findByName(deps.db.manager, name);
  for (const user of matching.length > 0 ? matching : [null]) {
    if ((await passwordMatches(user?.passwordHash ?? null, password)) && user && !user.disabledAt) {
      return await deps.sessions.begin(user.id, userAgent);
    }
  }
  throw new ProblemError('wrong-sign-in', {
    detail: 'The name or the password does not fit. Check both, or choose “I cannot sign in”.',
  });
}

function signOut(deps: PeopleDeps, viewer: Viewer) {
  return deps.sessions.end(viewer.sessionId);
}

function signOutEverywhere(deps: PeopleDeps, viewer: Viewer) {
  return deps.sessions.endAll(viewer.userId);
}

function findViewer(deps: PeopleDeps, viewer: Viewer) {
  return toViewerAnswer(deps.db.manager, viewer.userId);
}

/** Mails a link when the address is known; answers alike when it is not. */
async function askForReset(deps: PeopleDeps, email: string): Promise<void> {
  await deps.rateLimiter.count(`reset of ${email}`, 4, 3600);
  await inEvenTime(deps.db.transaction((manager) => mailReset(deps, manager, email)));
}

async function mailReset(deps: PeopleDeps, manager: EntityManager, email: string): Promise<void> {
  const user = await manager.findOneBy(User, { email });
  if (!user || user.disabledAt) return;
  const token = await issueToken(manager, {
    userId: user.id,
    kind: 'reset',
    expiresAt: hoursFrom(deps.now(), RESET_HOURS),
  });
  await deps.queueMail(manager, {
    kind: 'reset',
    userId: user.id,
    to: email,
    data: { name: user.name, token, hours: RESET_HOURS },
  });
}

/** Sets a new password by the mailed link, ends every session and signs in. */
async function resetPassword(deps: PeopleDeps, token: string, password: string, userAgent: string): Promise<string> {
  const userId = await deps.db.transaction(async (manager) => {
    const taken = await takeToken(manager, 'reset', token, deps.now());
    await setPassword(manager, taken.userId, password, deps.now());
    return taken.userId;
  });
  await deps.sessions.endAll(userId);
  return await deps.sessions.begin(userId, userAgent);
}

/** Signs in by the code that a teacher handed over and sets the person's own password. */
async function signInByCode(
  deps: PeopleDeps,
  name: string,
  code: string,
  password: string,
  userAgent: string,
): Promise<string> {
  await deps.rateLimiter.count(`sign-in code of ${name}`, 8, 900);
  const userId = await deps.db.transaction(async (manager) => {
    for (const user of await findByName(manager, name)) {
      const taken = await takeToken(manager, 'one-day-code', `${user.id}:${code}`, deps.now()).catch(() => null);
      if (!taken) continue;
      await setPassword(manager, user.id, password, deps.now());
      return user.id;
    }
    throw new ProblemError('wrong-sign-in', {
      detail: 'The name and the code do not match, or the code is older than a day.',
    });
  });
  await deps.sessions.endAll(userId);
  return await deps.sessions.begin(userId, userAgent);
}

async function changePassword(
  deps: PeopleDeps,
  viewer: Viewer,
  current: string,
  password: string,
  userAgent: string,
): Promise<string> {
  await checkOwnPassword(deps, viewer, current, '/current');
  await deps.db.transaction((manager) => setPassword(manager, viewer.userId, password, deps.now()));
  await deps.sessions.endAll(viewer.userId);
  return await deps.sessions.begin(viewer.userId, userAgent);
}

/** Mails the new address; nothing changes before its link is followed. */
async function askForEmailChange(deps: PeopleDeps, viewer: Viewer, email: string, password: string): Promise<void> {
  const user = await checkOwnPassword(deps, viewer, password, '/password');
  await deps.rateLimiter.count(`e-mail change of ${viewer.userId}`, 5, 3600);
  await inEvenTime(deps.db.transaction((manager) => mailEmailChange(deps, manager, user, email)));
}

async function mailEmailChange(deps: PeopleDeps, manager: EntityManager, user: User, email: string): Promise<void> {
  if (await manager.existsBy(User, { email })) {
    await deps.queueMail(manager, { kind: 'email-in-use', userId: null, to: email, data: {} });
    return;
  }
  const expiresAt = hoursFrom(deps.now(), EMAIL_CHANGE_HOURS);
  const token = await issueToken(manager, { userId: user.id, kind: 'email-change', expiresAt, email });
  await deps.queueMail(manager, {
    kind: 'email-change',
    userId: user.id,
    to: email,
    data: { name: user.name, token },
  });
}

/** Follows the mailed link; the old address is told. */
async function changeEmail(deps: PeopleDeps, token: string): Promise<void> {
  await deps.db.transaction(async (manager) => {
    const { userId, email } = await takeToken(manager, 'email-change', token, deps.now());
    const user = await manager.findOneByOrFail(User, { id: userId });
    if (!email || (await manager.existsBy(User, { email }))) throw new ProblemError('gone');
    await manager.update(User, { id: userId }, { email });
    await voidTokens(manager, userId);
    await recordAudit(manager, {
      schoolId: user.schoolId,
      actorId: userId,
      at: deps.now(),
      action: 'person.email-changed',
      objectKind: 'person',
      objectId: userId,
    });
    if (user.email)
      await deps.queueMail(manager, { kind: 'email-changed', userId, to: user.email, data: { name: user.name } });
  });
}

async function changeName(deps: PeopleDeps, viewer: Viewer, name: string): Promise<void> {
  await deps.db.transaction(async (manager) => {
    const user = await manager.findOneByOrFail(User, { id: viewer.userId });
    if (user.name === name) return;
    await manager.update(User, { id: viewer.userId }, { name });
    await recordAudit(manager, {
      schoolId: user.schoolId,
      actorId: user.id,
      at: deps.now(),
      action: 'person.name-changed',
      objectKind: 'person',
      objectId: user.id,
      before: { name: user.name },
      after: { name },
    });
  });
}

async function checkOwnPassword(deps: PeopleDeps, viewer: Viewer, password: string, pointer: string): Promise<User> {
  await deps.rateLimiter.count(`password of ${viewer.userId}`, TRIES_PER_QUARTER_HOUR, 900);
  const user = await deps.db.getRepository(User).findOneByOrFail({ id: viewer.userId });
  if (!(await passwordMatches(user.passwordHash, password))) {
    throw new ProblemError('invalid-fields', { errors: [{ pointer, detail: 'This is not your password.' }] });
  }
  return user;
}

/** An address is one person; a user name may occur once in each school. */
async function findByName(manager: EntityManager, name: string): Promise<User[]> {
  return await manager.find(User, { where: name.includes('@') ? { email: name } : { userName: name }, take: 20 });
}

async function setPassword(manager: EntityManager, userId: string, password: string, at: Date): Promise<void> {
  const user = await manager.findOneBy(User, { id: userId });
  if (!user || user.disabledAt) throw new ProblemError('gone');
  refuseCommonPassword(password, [user.name, user.email, user.userName]);
  await manager.update(User, { id: userId }, { passwordHash: await hashPassword(password) });
  // Whoever knew the old one may have links under way, such as one to an address of their own.
  await voidTokens(manager, userId);
  await recordAudit(manager, {
    schoolId: user.schoolId,
    actorId: userId,
    at,
    action: 'person.password-changed',
    objectKind: 'person',
    objectId: userId,
  });
}

async function toViewerAnswer(manager: EntityManager, userId: string): Promise<ViewerAnswer> {
  const user = await manager.findOne(User, { where: { id: userId }, relations: { school: true } });
  if (!user?.school) throw notFound();
  const memberships = await manager
    .createQueryBuilder(Membership, 'm')
    .innerJoinAndSelect('m.class', 'c', 'c.archivedAt IS NULL')
    .where('m.userId = :userId AND m.removedAt IS NULL', { userId })
    .orderBy('c.name')
    .getMany();
  return {
    user: { id: user.id, name: user.name, role: user.role, email: user.email, userName: user.userName },
    school: { id: user.school.id, name: user.school.name },
    classes: memberships.flatMap((m) =>
      m.class ? [{ id: m.classId, name: m.class.name, timeZone: m.class.timeZone, role: m.role, alias: m.alias }] : [],
    ),
  };
}

function hoursFrom(at: Date, hours: number): Date {
  return new Date(at.getTime() + hours * 3_600_000);
}
