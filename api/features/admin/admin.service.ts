import { IsNull, MoreThan, Not, type DataSource } from 'typeorm';
import type { z } from 'zod';
import type {
  MailStateAnswer,
  personStateSchema,
  PersonAnswer,
  SchoolSettings,
  staffInvitationSchema,
  TrailAnswer,
} from '../../../shared/schemas/admin.ts';
import { notFound, ProblemError } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import { bind } from '../../lib/bind.ts';
import type { Now } from '../../lib/clock.ts';
import { recordAudit } from '../audit/record.ts';
import type { QueueMail } from '../mail/queue-mail.ts';
import { OutgoingMail } from '../mail/mail.entity.ts';
import { School, User } from '../people/people.entity.ts';

const PAGE = 50;
const INVITATION_DAYS = 14;

export interface AdminDeps {
  readonly db: DataSource;
  readonly now: Now;
  readonly queueMail: QueueMail;
  readonly endSessions: (userId: string) => Promise<void>;
  readonly inviteStaff: (
    manager: DataSource['manager'],
    order: {
      schoolId: string;
      name: string;
      email: string;
      role: 'teacher' | 'admin';
      createdById: string;
      expiresAt: Date;
    },
  ) => Promise<string>;
}
export type AdminService = ReturnType<typeof createAdminService>;

/** People, school settings, mail and the trail of one school; the routes let admins in only. */
export function createAdminService(deps: AdminDeps) {
  return bind(deps, { getSchool, changeSchool, listPeople, setDisabled, inviteStaff, listTrail, getMailState });
}

async function getSchool(deps: AdminDeps, viewer: Viewer): Promise<SchoolSettings> {
  const { name, timeZone, standingsAllowed } = await deps.db
    .getRepository(School)
    .findOneByOrFail({ id: viewer.schoolId });
  return { name, timeZone, standingsAllowed };
}

async function changeSchool(deps: AdminDeps, viewer: Viewer, form: SchoolSettings): Promise<void> {
  await deps.db.transaction(async (manager) => {
    const { name, timeZone, standingsAllowed } = await manager.findOneByOrFail(School, { id: viewer.schoolId });
    if (await manager.existsBy(School, { name: form.name, id: Not(viewer.schoolId) })) {
      throw new ProblemError('invalid-fields', {
        errors: [{ pointer: '/name', detail: 'Another school has this name.' }],
      });
    }
    await manager.update(School, { id: viewer.schoolId }, form);
    await recordAudit(manager, {
      ...trail(deps, viewer, 'school', viewer.schoolId),
      action: 'school.settings-changed',
      before: { name, timeZone, standingsAllowed },
      after: form,
    });
  });
}

async function listPeople(deps: AdminDeps, viewer: Viewer, search: string): Promise<PersonAnswer[]> {
  const rows: PersonRow[] = await deps.db.query(PEOPLE_SQL, [
    viewer.schoolId,
    `%${search.replace(/[\\%_]/g, '\\$&')}%`,
    300,
  ]);
  return rows.map((row) => ({
    id: row.id,
    name: row.name,
    role: row.role,
    email: row.email,
    userName: row.user_name,
    disabled: row.disabled_at !== null,
    classes: row.classes,
  }));
}

/** Disabling ends every session at once; nothing that the person made is deleted. */
async function setDisabled(
  deps: AdminDeps,
  viewer: Viewer,
  userId: string,
  form: z.infer<typeof personStateSchema>,
): Promise<void> {
  if (userId === viewer.userId) throw new ProblemError('conflict', { detail: 'You cannot disable your own account.' });
  await deps.db.transaction(async (manager) => {
    const { affected } = await manager.update(
      User,
      { id: userId, schoolId: viewer.schoolId },
      { disabledAt: form.disabled ? deps.now() : null },
    );
    if (affected !== 1) throw notFound();
    await recordAudit(manager, {
      ...trail(deps, viewer, 'person', userId),
      action: form.disabled ? 'person.disabled' : 'person.enabled',
      reason: form.reason,
    });
  });
  if (form.disabled) await deps.endSessions(userId);
}

async function inviteStaff(
  deps: AdminDeps,
  viewer: Viewer,
  form: z.infer<typeof staffInvitationSchema>,
): Promise<void> {
  await deps.db.transaction(async (manager) => {
    const inviter = await manager.findOneOrFail(User, {
      where: { id: viewer.userId },
      relations: { school: true },
    });
    const expiresAt = new Date(deps.now().getTime() + INVITATION_DAYS * 86_400_000);
    const token = await deps.inviteStaff(manager, {
      ...form,
      schoolId: viewer.schoolId,
      createdById: viewer.userId,
      expiresAt,
    });
    await deps.queueMail(manager, {
      kind: 'invitation',
      userId: null,
      to: form.email,
      data: {
        name: form.name,
        invitedBy: inviter.name,
        schoolName: inviter.school?.name ?? '',
        className: null,
        token,
      },
    });
    await recordAudit(manager, {
      ...trail(deps, viewer, 'school', viewer.schoolId),
      action: 'school.staff-invited',
      after: { role: form.role },
    });
  });
}

/** Newest first, a page at a time; `before` is the instant of the last entry seen. */
async function listTrail(
  deps: AdminDeps,
  viewer: Viewer,
  query: { before?: string | undefined; search?: string | undefined },
): Promise<TrailAnswer> {
  const rows: TrailRow[] = await deps.db.query(TRAIL_SQL, [
    viewer.schoolId,
    query.before ?? null,
    `%${query.search ?? ''}%`,
    PAGE + 1,
  ]);
  return {
    entries: rows.slice(0, PAGE).map((row) => ({
      id: row.id,
      at: row.at.toISOString(),
      actor: row.actor,
      action: row.action,
      objectKind: row.object_kind,
      before: row.before,
      after: row.after,
      reason: row.reason,
    })),
    more: rows.length > PAGE,
  };
}

/** Letters that wait or failed, for the whole installation's mail of this school's people. */
async function getMailState(deps: AdminDeps, viewer: Viewer): Promise<MailStateAnswer> {
  const ofSchool = (query: string) =>
    `${query} and (user_id is null or user_id in (select id from person where school_id = $1))`;
  const [{ count }]: [{ count: string }] = await deps.db.query(
    ofSchool('select count(*) from outgoing_mail where sent_at is null'),
    [viewer.schoolId],
  );
  const failed = await deps.db.getRepository(OutgoingMail).find({
    where: { sentAt: IsNull(), attempts: MoreThan(0) },
    order: { createdAt: 'DESC' },
    take: 20,
  });
  return {
    waiting: Number(count),
    failed: failed.map((m) => ({
      id: m.id,
      kind: m.kind,
      createdAt: m.createdAt.toISOString(),
      attempts: m.attempts,
      lastError: m.lastError ?? '',
    })),
  };
}

function trail(deps: AdminDeps, viewer: Viewer, objectKind: string, objectId: string) {
  return { schoolId: viewer.schoolId, actorId: viewer.userId, at: deps.now(), objectKind, objectId };
}

interface PersonRow {
  readonly id: string;
  readonly name: string;
  readonly role: User['role'];
  readonly email: string | null;
  readonly user_name: string | null;
  readonly disabled_at: Date | null;
  readonly classes: string[];
}

const PEOPLE_SQL = `
  select p.id, p.name, p.role, p.email, p.user_name, p.disabled_at,
    coalesce((select array_agg(c.name order by c.name) from membership m join class c on c.id = m.class_id
              where m.user_id = p.id and m.removed_at is null), '{}') as classes
  from person p
  where p.school_id = $1 and (p.name ilike $2 or p.email ilike $2 or p.user_name ilike $2)
  order by p.name limit $3`;

interface TrailRow {
  readonly id: string;
  readonly at: Date;
  readonly actor: string | null;
  readonly action: string;
  readonly object_kind: string;
  readonly before: unknown;
  readonly after: unknown;
  readonly reason: string;
}

const TRAIL_SQL = `
  select a.id, a.at, p.name as actor, a.action, a.object_kind, a.before, a.after, a.reason
  from audit_entry a left join person p on p.id = a.actor_id
  where a.school_id = $1 and ($2::timestamptz is null or a.at < $2) and (a.action ilike $3 or p.name ilike $3 or a.reason ilike $3)
  order by a.at desc, a.id limit $4`;
