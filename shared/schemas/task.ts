import { z } from 'zod';
import { storableText } from '../lib/storable-text.ts';
import { goalSchema } from './verdict.ts';

/** A line of maths as TeX. */
export const texSchema = z.string().overwrite(storableText).trim().max(4000, 'A line holds at most 4000 characters.');
export const filledTexSchema = texSchema.min(1, 'Write this line.');

export const taskSettingsSchema = z.object({
  numbers: z.enum(['real', 'complex']).default('real'),
  /** Every gain of a solution is a fault where it happens. */
  reversible: z.boolean().default(false),
  /** Presentation faults (a running equals sign, lost brackets) count as faults. */
  presentationCounts: z.boolean().default(false),
  /** A missing constant of integration is a fault. */
  constantNeeded: z.boolean().default(false),
  decimal: z.enum(['point', 'comma']).default('point'),
});
export type TaskSettings = z.infer<typeof taskSettingsSchema>;

export const taskFormSchema = z.object({
  title: z.string().trim().min(1, 'Give the task a title.').max(120, 'A title holds at most 120 characters.'),
  instructions: z.string().trim().max(4000, 'Instructions hold at most 4000 characters.').default(''),
  given: filledTexSchema,
  goal: goalSchema,
  assumptions: z.array(filledTexSchema).max(12, 'At most 12 assumptions.').default([]),
  settings: taskSettingsSchema,
});
export type TaskForm = z.infer<typeof taskFormSchema>;

/** The task as it stood when its round opened; everything after refers to this. */
export interface FrozenTask extends TaskForm {
  readonly taskId: string;
  readonly taskVersion: number;
  /** Which scoring rule applies to the round. */
  readonly pointsRule: 'quadratic-1';
}

/** A form sent to change a task names the version it was made from. */
export const taskChangeSchema = taskFormSchema.extend({ version: z.number().int().min(1) });
export type TaskChange = z.infer<typeof taskChangeSchema>;

export const taskArchiveSchema = z.object({ archived: z.boolean() });

/** A task in its teacher's collection. */
export interface TaskListItem {
  readonly id: string;
  readonly title: string;
  readonly given: string;
  readonly goal: TaskForm['goal'];
  readonly decimal: TaskSettings['decimal'];
  readonly rounds: number;
  readonly archived: boolean;
  readonly updatedAt: string;
}

export interface TaskAnswer extends TaskForm {
  readonly id: string;
  readonly version: number;
  readonly rounds: number;
  readonly archived: boolean;
  readonly updatedAt: string;
}
