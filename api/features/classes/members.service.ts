import { In, IsNull, type DataSource, type EntityManager } from 'typeorm';
import type { z } from 'zod';
import type {
  conflictPairSchema,
  invitationsSchema,
  PersonLine,
  RosterProblem,
} from '../../../shared/schemas/class.ts';
import { notFound, ProblemError } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import { bind } from '../../lib/bind.ts';
import type { Now } from '../../lib/clock.ts';
import { recordAudit } from '../audit/record.ts';
import type { QueueMail } from '../mail/queue-mail.ts';
import { User } from '../people/people.entity.ts';
import { giveAlias } from './aliases.ts';
import { lockForTeacher } from './classes.service.ts';
import { ConflictPair, Invitation, JoinRequest, Membership, RosterEntry, type Class } from './classes.entity.ts';
import { refuseUnfitRole } from './fitting-role.ts';
import { addMember, createInvitation } from './joining.service.ts';
import { readRosterCsv } from './roster-csv.ts';

const INVITATION_DAYS = 14;

export interface MembersDeps {
  readonly db: DataSource;
  readonly now: Now;
  readonly queueMail: QueueMail;
  /** Makes a one-day sign-in code for a person; the earlier one is void. */
  readonly issueSignInCode: (
    manager: EntityManager,
    userId: string,
    createdById: string,
  ) => Promise<{ code: string; expiresAt: Date }>;
}
export type MembersService = ReturnType<typeof createMembersService>;

/** A link that the teacher hands over, shown once; one that is mailed is known to its reader alone. */
export interface InvitationLink {
  readonly name: string;
  readonly token: string;
}

/** The teacher's acts on the people of a class. */
export function createMembersService(deps: MembersDeps) {
  return bind(deps, {
    decideRequest,
    invite,
    revokeInvitation,
    importRoster,
    changeRole,
    removeMember,
    issueSignInCode,
    addPair,
    removePair,
  });
}

async function decideRequest(
  deps: MembersDeps,
  viewer: Viewer,
  classId: string,
  requestId: string,
  accept: boolean,
): Promise<void> {
  await asTeacher(deps, viewer, classId, async (manager, found) => {
    const request = await manager.findOne(JoinRequest, {
      where: { id: requestId, classId, decidedAt: IsNull() },
      relations: { user: true },
    });
    if (!request?.user) throw notFound();
    await manager.update(
      JoinRequest,
      { id: requestId },
      { decidedAt: deps.now(), accepted: accept, decidedById: viewer.userId },
    );
    await recordAudit(manager, {
      ...trail(deps, viewer, classId),
      action: accept ? 'class.request-accepted' : 'class.request-declined',
      after: { userId: request.userId },
    });
    if (!accept) return;
    await addMember(manager, found, request.user, 'student', deps.now());
    if (request.user.email) {
      await deps.queueMail(manager, {
        kind: 'join-accepted',
        userId: request.userId,
        to: request.user.email,
        data: { name: request.user.name, className: found.name },
      });
    }
  });
}

/** Makes one link a person; those with an address are mailed, the others' links are for the teacher to hand over. */
async function invite(
  deps: MembersDeps,
  viewer: Viewer,
  classId: string,
  form: z.infer<typeof invitationsSchema>,
): Promise<{ links: InvitationLink[] }> {
  return await asTeacher(deps, viewer, classId, async (manager, found) => {
    const links: InvitationLink[] = [];
    const inviter = await manager.findOneByOrFail(User, { id: viewer.userId });
    for (const person of form.people)
      links.push(...(await inviteOne(deps, manager, found, form.role, person, inviter)));
    await recordAudit(manager, {
      ...trail(deps, viewer, classId),
      action: 'class.invited',
      after: { role: form.role, people: form.people.length },
    });
    return { links };
  });
}

async function revokeInvitation(
  deps: MembersDeps,
  viewer: Viewer,
  classId: string,
  invitationId: string,
): Promise<void> {
  await asTeacher(deps, viewer, classId, async (manager) => {
    const { affected } = await manager.update(
      Invitation,
      { id: invitationId, classId, acceptedAt: IsNull(), revokedAt: IsNull() },
      { revokedAt: deps.now() },
    );
    if (affected !== 1) throw notFound();
  });
}

/** Replaces the class list; who asks to join and stands on it by address or user name is in at once. */
async function importRoster(
  deps: MembersDeps,
  viewer: Viewer,
  classId: string,
  csv: string,
): Promise<{ people: PersonLine[]; problems: RosterProblem[] }> {
  const reading = readRosterCsv(csv);
  if (reading.people.length === 0) {
    const detail = reading.problems.map((p) => `Line ${p.line}: ${p.detail}`).join(' ') || 'No people were found.';
    throw new ProblemError('invalid-fields', { errors: [{ pointer: '/csv', detail }] });
  }
  await asTeacher(deps, viewer, classId, async (manager) => {
    await manager.delete(RosterEntry, { classId });
    await manager.insert(
      RosterEntry,
      reading.people.map((p) => ({ classId, name: p.name, email: p.email ?? null, userName: p.userName ?? null })),
    );
    await recordAudit(manager, {
      ...trail(deps, viewer, classId),
      action: 'class.list-imported',
      after: { people: reading.people.length },
    });
  });
  return { people: [...reading.people], problems: [...reading.problems] };
}

async function changeRole(
  deps: MembersDeps,
  viewer: Viewer,
  classId: string,
  membershipId: string,
  role: Membership['role'],
): Promise<void> {
  await asTeacher(deps, viewer, classId, async (manager, found) => {
    const member = await getMember(manager, classId, membershipId);
    if (role === member.role) return;
    await refuseUnfitRole(manager, classId, member.user, role);
    if (member.role === 'teacher') await refuseLastTeacher(manager, found.id);
    await manager.update(Membership, { id: membershipId }, { role });
    if (role === 'student') await giveAlias(manager, classId, member.userId);
    await recordAudit(manager, {
      ...trail(deps, viewer, classId),
      action: 'class.role-changed',
      before: { userId: member.userId, role: member.role },
      after: { role },
    });
  });
}

async function removeMember(deps: MembersDeps, viewer: Viewer, classId: string, membershipId: string): Promise<void> {
  await asTeacher(deps, viewer, classId, async (manager) => {
    const member = await getMember(manager, classId, membershipId);
    if (member.role === 'teacher') await refuseLastTeacher(manager, classId);
    await manager.update(Membership, { id: membershipId }, { removedAt: deps.now() });
    await recordAudit(manager, {
      ...trail(deps, viewer, classId),
      action: 'class.member-removed',
      before: { userId: member.userId, role: member.role },
    });
  });
}

/** For a student who cannot sign in and has no e-mail; shown to the teacher once, good for a day. */
async function issueSignInCode(
  deps: MembersDeps,
  viewer: Viewer,
  classId: string,
  membershipId: string,
): Promise<{ code: string; expiresAt: string }> {
  return await asTeacher(deps, viewer, classId, async (manager) => {
    const member = await getMember(manager, classId, membershipId);
    if (member.user.role !== 'student')
      throw new ProblemError('conflict', { detail: 'Sign-in codes are for students. Ask the admin.' });
    const { code, expiresAt } = await deps.issueSignInCode(manager, member.userId, viewer.userId);
    await recordAudit(manager, {
      ...trail(deps, viewer, classId),
      action: 'person.code-issued',
      objectKind: 'person',
      objectId: member.userId,
    });
    return { code, expiresAt: expiresAt.toISOString() };
  });
}

async function addPair(
  deps: MembersDeps,
  viewer: Viewer,
  classId: string,
  form: z.infer<typeof conflictPairSchema>,
): Promise<{ id: string }> {
  return await asTeacher(deps, viewer, classId, async (manager) => {
    const [firstId = '', secondId = ''] = [form.firstId, form.secondId].toSorted();
    const members = await manager.countBy(Membership, {
      classId,
      userId: In([firstId, secondId]),
      removedAt: IsNull(),
    });
    if (firstId === secondId || members !== 2) {
      throw new ProblemError('invalid-fields', {
        errors: [{ pointer: '/secondId', detail: 'Choose two different people of this class.' }],
      });
    }
    if (await manager.existsBy(ConflictPair, { classId, firstId, secondId }))
      throw new ProblemError('conflict', { detail: 'This pair is listed already.' });
    const { id } = await manager.save(manager.create(ConflictPair, { classId, firstId, secondId, note: form.note }));
    await recordAudit(manager, {
      ...trail(deps, viewer, classId),
      action: 'class.pair-added',
      after: { firstId, secondId },
      reason: form.note,
    });
    return { id };
  });
}

async function removePair(deps: MembersDeps, viewer: Viewer, classId: string, pairId: string): Promise<void> {
  await asTeacher(deps, viewer, classId, async (manager) => {
    const pair = await manager.findOneBy(ConflictPair, { id: pairId, classId });
    if (!pair) throw notFound();
    await manager.delete(ConflictPair, { id: pairId });
    const { firstId, secondId } = pair;
    await recordAudit(manager, {
      ...trail(deps, viewer, classId),
      action: 'class.pair-removed',
      before: { firstId, secondId },
    });
  });
}

async function asTeacher<T>(
  deps: MembersDeps,
  viewer: Viewer,
  classId: string,
  act: (manager: EntityManager, found: Class) => Promise<T>,
): Promise<T> {
  return await deps.db.transaction(async (manager) => act(manager, await lockForTeacher(manager, classId, viewer)));
}

function trail(deps: MembersDeps, viewer: Viewer, classId: string) {
  return { schoolId: viewer.schoolId, actorId: viewer.userId, at: deps.now(), objectKind: 'class', objectId: classId };
}

async function getMember(
  manager: EntityManager,
  classId: string,
  membershipId: string,
): Promise<Membership & { user: User }> {
  const found = await manager.findOne(Membership, {
    where: { id: membershipId, classId, removedAt: IsNull() },
    relations: { user: true },
  });
  if (!found?.user) throw notFound();
  return found as Membership & { user: User };
}

async function inviteOne(
  deps: MembersDeps,
  manager: EntityManager,
  found: Class,
  role: Invitation['role'],
  person: PersonLine,
  inviter: User,
): Promise<InvitationLink[]> {
  const email = person.email ?? null;
  const token = await createInvitation(manager, {
    schoolId: found.schoolId,
    classId: found.id,
    role,
    name: person.name,
    email,
    createdById: inviter.id,
    asksToJoin: false,
    expiresAt: new Date(deps.now().getTime() + INVITATION_DAYS * 86_400_000),
  });
  if (email === null) return [{ name: person.name, token }];
  await deps.queueMail(manager, {
    kind: 'invitation',
    userId: null,
    to: email,
    data: {
      name: person.name,
      invitedBy: inviter.name,
      schoolName: found.school?.name ?? '',
      className: found.name,
      token,
    },
  });
  return [];
}

async function refuseLastTeacher(manager: EntityManager, classId: string): Promise<void> {
  if ((await manager.countBy(Membership, { classId, role: 'teacher', removedAt: IsNull() })) <= 1) {
    throw new ProblemError('conflict', { detail: 'A class keeps at least one teacher.' });
  }
}
