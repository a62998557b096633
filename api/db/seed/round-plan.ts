import type { RoundForm } from '../../../shared/schemas/round.ts';
import type { DemoTask } from './demo-task.ts';
import type { DayTime } from './seed-times.ts';

/** What is to happen in one round of the demo. */
export interface RoundPlan {
  readonly task: DemoTask;
  /** Opens, writing ends, reviewing ends, answering ends, settles. */
  readonly times: readonly [DayTime, DayTime, DayTime, DayTime, DayTime];
  readonly lateRule?: RoundForm['lateRule'];
  /** Which of the task's derivations a person writes; the others choose by their care. */
  readonly writes?: Readonly<Record<string, number>>;
  /** Hand in nothing, whatever the stage. */
  readonly absent?: readonly string[];
  readonly excused?: readonly string[];
  /** Have until this time to write, and nothing handed in yet. */
  readonly extended?: { readonly name: string; readonly until: DayTime; readonly reason: string };
  /** How far people are while writing is open: absent people have not begun. */
  readonly atWork?: readonly AtWork[];
  /** Have begun or done no review while reviewing is open; the others are further. */
  readonly idle?: readonly string[];
  /** Have not answered. */
  readonly silent?: readonly string[];
  /** Contest a finding that is right, which brings it to the desk. */
  readonly stubborn?: Readonly<Record<string, string>>;
  /** true: the teacher has ruled on what came to the desk before the round settled. */
  readonly ruled?: boolean;
  /** After settling: contest the verdict. */
  readonly contestsVerdict?: { readonly name: string; readonly words: string };
  /** Write no mend after settling; the others with a first fault mostly do. */
  readonly noMend?: readonly string[];
}

export interface AtWork {
  readonly name: string;
  readonly sheet: number;
  /** Minutes ago: when the last line was added, and the last save. Absent: handed in some hours ago. */
  readonly lineAgo?: number;
  readonly savedAgo?: number;
}

export function day(day: number, hour: number): DayTime {
  return { day, hour };
}
