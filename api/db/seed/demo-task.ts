import type { SlipKind } from '../../../shared/schemas/finding.ts';
import type { TaskForm } from '../../../shared/schemas/task.ts';

/** A task of the demo with the derivations that its students write. */
export interface DemoTask {
  readonly form: TaskForm;
  readonly sheets: readonly DemoSheet[];
}

/** One derivation as a student of the demo writes it. */
export interface DemoSheet {
  /** TeX, and after a bar the reason; line 1 is the first one below the given. */
  readonly lines: readonly string[];
  /** Still being written: nobody hands it in. */
  readonly unfinished?: true;
  /** What a reviewer who sees it says; absent: there is nothing to find. */
  readonly slip?: DemoSlip;
  /** What the teacher decides where the checker leaves a step open, step by step. */
  readonly rulings?: readonly DemoRuling[];
}

export interface DemoSlip {
  readonly step: number;
  readonly kind: SlipKind;
  /** The part of the line that is marked; absent: none is. */
  readonly mark?: string;
  readonly shouldBe: string;
  /** Two ways to say it. */
  readonly why: readonly [string, string];
}

export interface DemoRuling {
  readonly step: number;
  readonly decision: 'holds' | 'fails';
  readonly reason: string;
}

/** A line of a sheet taken apart. */
export function toLine(line: string): { tex: string; reason: string } {
  const [tex = '', reason = ''] = line.split(' | ');
  return { tex, reason };
}

/** A task's form with the usual settings. */
export function taskForm(
  form: Pick<TaskForm, 'title' | 'instructions' | 'given' | 'goal'> & Partial<TaskForm>,
): TaskForm {
  return {
    assumptions: [],
    settings: {
      numbers: 'real',
      reversible: false,
      presentationCounts: false,
      constantNeeded: false,
      decimal: 'point',
    },
    ...form,
  };
}
