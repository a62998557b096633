import { Not, type DataSource } from 'typeorm';
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
  const rows: PersonRow[] = await deps.db.query(PEOPLE_SQL, [viewer.schoolId, toPattern(search), 300]);
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
    toPattern(query.search ?? ''),
    PAGE,
  ]);
  return {
    entries: rows.map((row) => ({
      id: row.id,
      at: row.at.toISOString(),
      actor: row.actor,
      action: row.action,
      objectKind: row.object_kind,
      before: row.before,
      after: row.after,
      reason: row.reason,
    })),
    more: Number(rows[0]?.total ?? 0) > rows.length,
  };
}

/** Letters of this school that wait or failed; those to people who have no account yet are known by their invitation. */
async function getMailState(deps: AdminDeps, viewer: Viewer): Promise<MailStateAnswer> {
  const [{ count }]: [{ count: string }] = await deps.db.query(
    `select count(*) from outgoing_mail m where m.sent_at is null and ${OF_SCHOOL}`,
    [viewer.schoolId],
  );
  const failed: FailedRow[] = await deps.db.query(
    `select m.id, m.kind, m.created_at, m.attempts, m.last_error from outgoing_mail m
      where m.sent_at is null and m.attempts > 0 and ${OF_SCHOOL} order by m.created_at desc, m.id limit 20`,
    [viewer.schoolId],
  );
  return {
    waiting: Number(count),
    failed: failed.map((m) => ({
      id: m.id,
      kind: m.kind,
      createdAt: m.created_at.toISOString(),
      attempts: m.attempts,
      lastError: m.last_error ?? '',
    })),
  };
}

const OF_SCHOOL = `(
  exists (select 1 from person p where p.school_id = $1 and (p.id = m.user_id or (m.user_id is null and p.email = m.recipient)))
  or (m.user_id is null and exists (select 1 from invitation i where i.school_id = $1 and i.email = m.recipient)))`;

interface FailedRow {
  readonly id: string;
  readonly kind: string;
  readonly created_at: Date;
  readonly attempts: number;
  readonly last_error: string | null;
}

/** For `ilike`: the text anywhere, taken as it stands. */
function toPattern(search: string): string {
  return `%${search.replace(/[\\%_]/g, '\\$&')}%`;
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
  readonly total: string;
}

/** Entries of one instant come on one page, because the next page begins before it. */
const TRAIL_SQL = `
  select a.id, a.at, p.name as actor, a.action, a.object_kind, a.before, a.after, a.reason, count(*) over () as total
  from audit_entry a left join person p on p.id = a.actor_id
  where a.school_id = $1 and ($2::timestamptz is null or a.at < $2) and (a.action ilike $3 or p.name ilike $3 or a.reason ilike $3)
  order by a.at desc fetch first $4 rows with ties`;
