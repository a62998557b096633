import { IsNull, MoreThan, type EntityManager } from 'typeorm';
import type { ClassAnswer } from '../../../shared/schemas/class.ts';
import { School } from '../people/people.entity.ts';
import { Class, ConflictPair, Invitation, JoinRequest, Membership, RosterEntry } from './classes.entity.ts';

/** The whole class, for its teacher. */
export async function toClassAnswer(manager: EntityManager, found: Class): Promise<ClassAnswer> {
  const classId = found.id;
  const school = await manager.findOneByOrFail(School, { id: found.schoolId });
  const members = await manager.find(Membership, {
    where: { classId, removedAt: IsNull() },
    relations: { user: true },
  });
  const requests = await manager.find(JoinRequest, {
    where: { classId, decidedAt: IsNull() },
    relations: { user: true },
    order: { createdAt: 'ASC' },
  });
  const invitations = await manager.find(Invitation, {
    where: { classId, acceptedAt: IsNull(), revokedAt: IsNull(), expiresAt: MoreThan(new Date()), asksToJoin: false },
    order: { createdAt: 'ASC' },
  });
  const pairs = await manager.findBy(ConflictPair, { classId });
  const roster = await manager.find(RosterEntry, { where: { classId }, order: { name: 'ASC' } });
  return {
    id: classId,
    name: found.name,
    timeZone: found.timeZone,
    joinCode: found.joinCode,
    joinOpen: found.joinOpen,
    hasEmail: found.hasEmail,
    standingsOn: found.standingsOn,
    standingsAllowed: school.standingsAllowed,
    assistantsSeeNames: found.assistantsSeeNames,
    members: members
      .map((m) => ({
        membershipId: m.id,
        userId: m.userId,
        name: m.user?.name ?? '',
        email: m.user?.email ?? null,
        userName: m.user?.userName ?? null,
        role: m.role,
        alias: m.alias,
        joinedAt: m.joinedAt.toISOString(),
      }))
      .toSorted((a, b) => a.name.localeCompare(b.name)),
    requests: requests.map((r) => ({ id: r.id, name: r.user?.name ?? '', createdAt: r.createdAt.toISOString() })),
    invitations: invitations.map((i) => ({
      id: i.id,
      name: i.name,
      email: i.email,
      role: i.role,
      expiresAt: i.expiresAt.toISOString(),
    })),
    pairs: pairs.map(({ id, firstId, secondId, note }) => ({ id, firstId, secondId, note })),
    roster: roster.map(({ id, name, email, userName }) => ({ id, name, email, userName })),
  };
}
