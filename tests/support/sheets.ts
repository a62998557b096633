import { randomUUID } from 'node:crypto';
import type { Task } from '../../api/features/tasks/tasks.entity.ts';
import type { SheetDocument, SheetNode, StepAttributes } from '../../shared/schemas/sheet.ts';
import { taskSettingsSchema, type FrozenTask } from '../../shared/schemas/task.ts';

export function step(tex: string, reason = '', uses: string[] | null = null): SheetNode & { attrs: StepAttributes } {
  return { type: 'step', attrs: { stepId: randomUUID(), tex, reason, uses } };
}

export function prose(text: string): SheetNode {
  return { type: 'paragraph', content: [{ type: 'text', text }] };
}

export function sheet(...content: SheetNode[]): SheetDocument {
  return { type: 'doc', content };
}

/** The task as an opened round keeps it. */
export function frozenTask(task: Task): FrozenTask {
  const { title, instructions, given, goal, assumptions } = task;
  return {
    title,
    instructions: instructions ?? '',
    given,
    goal,
    assumptions,
    settings: taskSettingsSchema.parse(task.settings),
    taskId: task.id,
    taskVersion: task.version ?? 1,
    pointsRule: 'quadratic-1',
  };
}
