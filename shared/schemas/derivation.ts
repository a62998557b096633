import { z } from 'zod';
import { sheetDocumentSchema, type HandedInLine, type SheetDocument } from './sheet.ts';
import { filledTexSchema, taskSettingsSchema, type TaskForm } from './task.ts';
import { goalSchema, type StepRuling, type Verdict } from './verdict.ts';

/** What a sheet answers and takes. */

export const saveSheetSchema = z.object({
  document: sheetDocumentSchema,
  /** The draft's version that this one was made from. */
  baseVersion: z.number().int().min(1),
});
export type SaveSheet = z.infer<typeof saveSheetSchema>;

export const handInSchema = z.object({
  /** The draft's version that the author was shown. */
  draftVersion: z.number().int().min(1),
});

export interface SavedDraft {
  readonly document: SheetDocument;
  readonly version: number;
  readonly savedAt: string;
}

/** A conflict answers what the server has, under `extra.draft`. */
export type SaveAnswer = Pick<SavedDraft, 'version' | 'savedAt'>;

export type SheetTask = Pick<TaskForm, 'title' | 'instructions' | 'given' | 'goal' | 'assumptions' | 'settings'>;

/** The author's own sheet in a round. Nothing in it depends on a verdict. */
export interface SheetView {
  readonly derivationId: string;
  readonly roundId: string;
  readonly roundNumber: number;
  readonly className: string;
  readonly timeZone: string;
  readonly stage: 'writing' | 'reviewing' | 'answering' | 'settled';
  readonly task: SheetTask;
  readonly reviewers: number;
  /** When writing ends for this person. */
  readonly writingEndsAt: string;
  /** Past that instant, but still taken, as late work. */
  readonly lateNow: boolean;
  readonly canWrite: boolean;
  readonly canTakeBack: boolean;
  readonly handedIn: { readonly at: string; readonly late: boolean; readonly lines: readonly HandedInLine[] } | null;
  readonly draft: SavedDraft;
  /** The server's time, against which the time left is counted. */
  readonly now: string;
}

/** What handing in would post, as the server takes it. */
export interface HandInPreview {
  readonly draftVersion: number;
  readonly lines: readonly HandedInLine[];
  /** Lines without maths; they are left out. */
  readonly emptyLines: number;
  /** Names from the class list that stand in the words or reasons. */
  readonly names: readonly string[];
}

/** A mend as its author meets it, after settling. */
export interface MendView {
  readonly derivationId: string;
  readonly timeZone: string;
  readonly task: SheetTask;
  readonly firstFault: number;
  /** The given and the lines before the fault; they stay as they are. */
  readonly fixed: readonly HandedInLine[];
  /** What was written from the fault on. */
  readonly written: readonly HandedInLine[];
  readonly draft: SavedDraft;
  readonly handedIn: MendHandedIn | null;
}

export interface MendHandedIn {
  readonly number: number;
  readonly at: string;
  readonly lines: readonly HandedInLine[];
  /** null while it is being checked. */
  readonly verdict: (Pick<Verdict, 'outcome' | 'firstFault'> & { readonly steps: readonly StepRuling[] }) | null;
}

/** A model derivation that a teacher tries on a task; nothing of it is kept. */
export const tryTaskSchema = z.object({
  given: filledTexSchema,
  goal: goalSchema,
  assumptions: z.array(filledTexSchema).max(12, 'At most 12 assumptions.'),
  settings: taskSettingsSchema,
  lines: z.array(filledTexSchema).min(1, 'Write at least one line.').max(60, 'Try at most 60 lines.'),
});
export type TryTask = z.infer<typeof tryTaskSchema>;
