import { IsNull, type DataSource, type EntityManager } from 'typeorm';
import type { z } from 'zod';
import type {
  classSettingsSchema,
  ClassAnswer,
  ClassListItem,
  newClassSchema,
  OwnPlaceAnswer,
} from '../../../shared/schemas/class.ts';
import { notFound, ProblemError } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import { bind } from '../../lib/bind.ts';
import type { Now } from '../../lib/clock.ts';
import { createCode } from '../../lib/secrets.ts';
import { recordAudit } from '../audit/record.ts';
import { School } from '../people/people.entity.ts';
import { getAccess } from './access.ts';
import { drawAliases, takeAlias } from './aliases.ts';
import { Class, Membership } from './classes.entity.ts';
import { toClassAnswer } from './classes.presenter.ts';

export const CLASS_CODE_LENGTH = 10;

export interface ClassesDeps {
  readonly db: DataSource;
  readonly now: Now;
}
export type ClassesService = ReturnType<typeof createClassesService>;

/** Classes and their settings; people in them are in members.service. */
export function createClassesService(deps: ClassesDeps) {
  return bind(deps, {
    listClasses,
    createClass,
    getClass,
    changeSettings,
    renewCode,
    startTerm,
    setArchived,
    getOwnPlace,
    offerAliases,
    changeAlias,
  });
}

async function listClasses(deps: ClassesDeps, viewer: Viewer): Promise<ClassListItem[]> {
  const rows: ListRow[] = await deps.db.query(LIST_SQL, [viewer.userId]);
  return rows.map((row) => ({
    id: row.id,
    name: row.name,
    timeZone: row.time_zone,
    role: row.role,
    archived: row.archived_at !== null,
    students: row.role === 'student' ? null : Number(row.students),
    waiting: row.role === 'teacher' ? Number(row.waiting) : null,
  }));
}

async function createClass(
  deps: ClassesDeps,
  viewer: Viewer,
  form: z.infer<typeof newClassSchema>,
): Promise<{ id: string }> {
  return await deps.db.transaction(async (manager) => {
    await refuseTakenName(manager, viewer.schoolId, form.name, null);
    const made = await manager.save(
      manager.create(Class, {
        ...form,
        schoolId: viewer.schoolId,
        joinCode: createCode(CLASS_CODE_LENGTH),
        aliasTermStartsAt: deps.now(),
        createdAt: deps.now(),
      }),
    );
    await manager.insert(Membership, {
      classId: made.id,
      userId: viewer.userId,
      role: 'teacher',
      joinedAt: deps.now(),
    });
    await recordAudit(manager, {
      ...trail(deps, viewer, made.id),
      action: 'class.created',
      after: { name: form.name },
    });
    return { id: made.id };
  });
}

async function getClass(deps: ClassesDeps, viewer: Viewer, classId: string): Promise<ClassAnswer> {
  const access = await getAccess(deps.db.manager, classId, viewer, ['teacher']);
  return await toClassAnswer(deps.db.manager, access.class);
}

async function changeSettings(
  deps: ClassesDeps,
  viewer: Viewer,
  classId: string,
  form: z.infer<typeof classSettingsSchema>,
): Promise<void> {
  await deps.db.transaction(async (manager) => {
    const { class: before } = await getAccess(manager, classId, viewer, ['teacher']);
    if (form.name !== undefined) await refuseTakenName(manager, before.schoolId, form.name, classId);
    if (Object.keys(form).length === 0) return;
    await manager.update(Class, { id: classId }, form);
    const old = Object.fromEntries(Object.keys(form).map((key) => [key, before[key as keyof typeof form]]));
    await recordAudit(manager, {
      ...trail(deps, viewer, classId),
      action: 'class.settings-changed',
      before: old,
      after: form,
    });
  });
}

async function renewCode(deps: ClassesDeps, viewer: Viewer, classId: string): Promise<{ joinCode: string }> {
  return await deps.db.transaction(async (manager) => {
    await getAccess(manager, classId, viewer, ['teacher']);
    const joinCode = createCode(CLASS_CODE_LENGTH);
    await manager.update(Class, { id: classId }, { joinCode });
    await recordAudit(manager, { ...trail(deps, viewer, classId), action: 'class.code-renewed' });
    return { joinCode };
  });
}

/** Lets every student choose a new alias once; done when a term begins. */
async function startTerm(deps: ClassesDeps, viewer: Viewer, classId: string): Promise<void> {
  await deps.db.transaction(async (manager) => {
    await getAccess(manager, classId, viewer, ['teacher']);
    await manager.update(Class, { id: classId }, { aliasTermStartsAt: deps.now() });
    await recordAudit(manager, { ...trail(deps, viewer, classId), action: 'class.term-started' });
  });
}

async function setArchived(deps: ClassesDeps, viewer: Viewer, classId: string, archived: boolean): Promise<void> {
  await deps.db.transaction(async (manager) => {
    await getAccess(manager, classId, viewer, ['teacher']);
    if (archived) await refuseWhileRunning(manager, classId);
    await manager.update(Class, { id: classId }, { archivedAt: archived ? deps.now() : null });
    await recordAudit(manager, {
      ...trail(deps, viewer, classId),
      action: archived ? 'class.archived' : 'class.brought-back',
    });
  });
}

/** A class that is put away is not seen; its rounds would go on, deal and mail all the same. */
async function refuseWhileRunning(manager: EntityManager, classId: string): Promise<void> {
  const rows: { number: number }[] = await manager.query(
    `select number from round where class_id = $1 and stage <> 'settled' order by number limit 1`,
    [classId],
  );
  if (rows[0]) {
    throw new ProblemError('conflict', {
      detail: `Round ${rows[0].number} is not settled yet. Settle it, or delete it while it is planned, and then put the class away.`,
    });
  }
}

/** One's own place in a class, for students and assistants. */
async function getOwnPlace(deps: ClassesDeps, viewer: Viewer, classId: string): Promise<OwnPlaceAnswer> {
  const { class: found, membership } = await getAccess(deps.db.manager, classId, viewer, ['student', 'assistant']);
  const school = await deps.db.getRepository(School).findOneByOrFail({ id: found.schoolId });
  return {
    id: found.id,
    name: found.name,
    timeZone: found.timeZone,
    role: membership.role === 'student' ? 'student' : 'assistant',
    alias: membership.alias,
    aliasChangeable: isAliasChangeable(found, membership),
    standingsOn: found.standingsOn && school.standingsAllowed,
    standingsOptOut: membership.standingsOptOut,
  };
}

async function offerAliases(deps: ClassesDeps, viewer: Viewer, classId: string): Promise<{ aliases: string[] }> {
  await getAccess(deps.db.manager, classId, viewer, ['student']);
  return { aliases: await drawAliases(deps.db.manager, classId, 6) };
}

async function changeAlias(deps: ClassesDeps, viewer: Viewer, classId: string, alias: string): Promise<void> {
  await deps.db.transaction(async (manager) => {
    const { class: found, membership } = await getAccess(manager, classId, viewer, ['student']);
    if (!isAliasChangeable(found, membership)) {
      throw new ProblemError('conflict', {
        detail: 'An alias can be changed once a term. Your teacher starts a new term.',
      });
    }
    await takeAlias(manager, membership, alias, deps.now());
  });
}

function trail(deps: ClassesDeps, viewer: Viewer, classId: string) {
  return { schoolId: viewer.schoolId, actorId: viewer.userId, at: deps.now(), objectKind: 'class', objectId: classId };
}

function isAliasChangeable(found: Class, membership: Membership): boolean {
  return membership.aliasChangedAt === null || membership.aliasChangedAt < found.aliasTermStartsAt;
}

async function refuseTakenName(
  manager: EntityManager,
  schoolId: string,
  name: string,
  except: string | null,
): Promise<void> {
  const other = await manager.findOneBy(Class, { schoolId, name });
  if (other && other.id !== except) {
    throw new ProblemError('invalid-fields', {
      errors: [{ pointer: '/name', detail: 'Your school has a class of this name. Choose another.' }],
    });
  }
}

interface ListRow {
  readonly id: string;
  readonly name: string;
  readonly time_zone: string;
  readonly role: Membership['role'];
  readonly archived_at: Date | null;
  readonly students: string;
  readonly waiting: string;
}

const LIST_SQL = `
  select c.id, c.name, c.time_zone, m.role, c.archived_at,
    (select count(*) from membership s where s.class_id = c.id and s.role = 'student' and s.removed_at is null) as students,
    (select count(*) from join_request r where r.class_id = c.id and r.decided_at is null) as waiting
  from membership m join class c on c.id = m.class_id
  where m.user_id = $1 and m.removed_at is null
  order by c.archived_at is not null, c.name`;

/** The class, locked against changes of its people, for its teacher. */
export async function lockForTeacher(manager: EntityManager, classId: string, viewer: Viewer): Promise<Class> {
  await getAccess(manager, classId, viewer, ['teacher']);
  const locked = await manager.findOne(Class, {
    where: { id: classId, archivedAt: IsNull() },
    lock: { mode: 'for_no_key_update' },
  });
  if (!locked) throw notFound();
  locked.school = await manager.findOneByOrFail(School, { id: locked.schoolId });
  return locked;
}
