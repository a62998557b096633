import type { DataSource, EntityManager } from 'typeorm';
import type { Reading, ReadSettings } from '../../../shared/maths/expression.ts';
import { wordReadError } from '../../../shared/maths/reads-as.ts';
import { explainRefusal } from '../../../shared/maths/refusals.ts';
import type { FieldError } from '../../../shared/schemas/problem.ts';
import type { TaskAnswer, TaskChange, TaskForm, TaskListItem } from '../../../shared/schemas/task.ts';
import { notFound, ProblemError } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import type { Now } from '../../lib/clock.ts';
import { Task } from './tasks.entity.ts';

export interface TasksDeps {
  readonly db: DataSource;
  readonly now: Now;
  readonly readLine: (tex: string, settings: ReadSettings) => Reading;
}
export type TasksService = ReturnType<typeof createTasksService>;

/** A teacher's own collection of tasks; nobody else's are found. */
export function createTasksService({ db, now, readLine }: TasksDeps) {
  return {
    async listTasks(viewer: Viewer): Promise<TaskListItem[]> {
      const rows: ListRow[] = await db.query(LIST_SQL, [viewer.userId]);
      return rows.map((row) => ({
        id: row.id,
        title: row.title,
        given: row.given,
        goal: row.goal,
        decimal: row.settings.decimal ?? 'point',
        rounds: row.rounds,
        archived: row.archived_at !== null,
        updatedAt: row.updated_at.toISOString(),
      }));
    },

    async getTask(viewer: Viewer, taskId: string): Promise<TaskAnswer> {
      return await toAnswer(db.manager, await getOwn(db.manager, viewer, taskId));
    },

    async createTask(viewer: Viewer, form: TaskForm): Promise<{ id: string }> {
      refuseUnread(form, readLine);
      const at = now();
      const task = db.manager.create(Task, { ...form, schoolId: viewer.schoolId, ownerId: viewer.userId });
      const made = await db.manager.save(Object.assign(task, { createdAt: at, updatedAt: at }));
      return { id: made.id };
    },

    /** @throws {ProblemError} conflict, with the current task, when it was changed since `version`. */
    async changeTask(viewer: Viewer, taskId: string, { version, ...form }: TaskChange): Promise<TaskAnswer> {
      refuseUnread(form, readLine);
      return await db.transaction(async (manager) => {
        const task = await getOwn(manager, viewer, taskId, true);
        if (task.version !== version) {
          throw new ProblemError('conflict', {
            detail: 'This task was changed in another window. Look at it again before you save.',
            extra: { current: await toAnswer(manager, task) },
          });
        }
        const saved = await manager.save(Object.assign(task, form, { version: version + 1, updatedAt: now() }));
        return await toAnswer(manager, saved);
      });
    },

    async copyTask(viewer: Viewer, taskId: string): Promise<{ id: string }> {
      const { title, instructions, given, goal, assumptions, settings } = await getOwn(db.manager, viewer, taskId);
      const at = now();
      const copy = db.manager.create(Task, {
        schoolId: viewer.schoolId,
        ownerId: viewer.userId,
        title: `${title.slice(0, 110)}, copy`,
        instructions,
        given,
        goal,
        assumptions,
        settings,
      });
      const made = await db.manager.save(Object.assign(copy, { createdAt: at, updatedAt: at }));
      return { id: made.id };
    },

    /** An archived task keeps its rounds and can be taken out again. */
    async archiveTask(viewer: Viewer, taskId: string, archived: boolean): Promise<void> {
      const task = await getOwn(db.manager, viewer, taskId);
      await db.manager.update(Task, { id: task.id }, { archivedAt: archived ? (task.archivedAt ?? now()) : null });
    },
  };
}

interface ListRow {
  readonly id: string;
  readonly title: string;
  readonly given: string;
  readonly goal: TaskForm['goal'];
  readonly settings: Partial<TaskForm['settings']>;
  readonly archived_at: Date | null;
  readonly updated_at: Date;
  readonly rounds: number;
}

const LIST_SQL = `
  select t.id, t.title, t.given, t.goal, t.settings, t.archived_at, t.updated_at,
         (select count(*)::int from round r where r.task_id = t.id) as rounds
  from task t where t.owner_id = $1 order by t.archived_at nulls first, t.updated_at desc, t.id`;

async function getOwn(manager: EntityManager, viewer: Viewer, taskId: string, lock = false): Promise<Task> {
  const task = await manager.findOne(Task, {
    where: { id: taskId, ownerId: viewer.userId },
    ...(lock && { lock: { mode: 'pessimistic_write' as const } }),
  });
  if (!task) throw notFound();
  return task;
}

async function toAnswer(manager: EntityManager, task: Task): Promise<TaskAnswer> {
  const [row]: { rounds: number }[] = await manager.query(
    'select count(*)::int as rounds from round where task_id = $1',
    [task.id],
  );
  return {
    id: task.id,
    version: task.version,
    title: task.title,
    instructions: task.instructions,
    given: task.given,
    goal: task.goal,
    assumptions: task.assumptions,
    settings: {
      numbers: task.settings.numbers ?? 'real',
      reversible: task.settings.reversible ?? false,
      presentationCounts: task.settings.presentationCounts ?? false,
      constantNeeded: task.settings.constantNeeded ?? false,
      decimal: task.settings.decimal ?? 'point',
    },
    rounds: row?.rounds ?? 0,
    archived: task.archivedAt !== null,
    updatedAt: task.updatedAt.toISOString(),
  };
}

/** @throws {ProblemError} invalid-fields, naming every line of the task that cannot be read, with its place. */
function refuseUnread(form: TaskForm, readLine: TasksDeps['readLine']): void {
  const settings = { numbers: form.settings.numbers, decimal: form.settings.decimal, functions: [] };
  const lines = [
    { pointer: '/given', tex: form.given },
    ...form.assumptions.map((tex, i) => ({ pointer: `/assumptions/${i}`, tex })),
    ...(form.goal.kind === 'target' ? [{ pointer: '/goal/target', tex: form.goal.target }] : []),
  ];
  const errors = lines.flatMap(({ pointer, tex }): FieldError[] => {
    const reading = readLine(tex, settings);
    if (!reading.ok) return [{ pointer, detail: wordReadError(explainRefusal(reading.refusal)) }];
    if (pointer.startsWith('/assumptions') && reading.line.kind === 'expression') {
      return [{ pointer, detail: 'An assumption says something, such as x > 0.' }];
    }
    return [];
  });
  if (errors.length > 0) throw new ProblemError('invalid-fields', { errors });
}
