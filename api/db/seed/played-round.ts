import type { DemoSheet } from './demo-task.ts';
import type { RoundPlan } from './round-plan.ts';
import type { SeededClass } from './seed-class.ts';
import type { SeedWorld } from './seed-world.ts';

/** A round while it is played: who wrote what is kept here, because reviewers of the demo say what fits it. */
export interface PlayedRound {
  readonly world: SeedWorld;
  readonly of: SeededClass;
  readonly plan: RoundPlan;
  readonly id: string;
  readonly opensAt: Date;
  readonly writingEndsAt: Date;
  readonly reviewingEndsAt: Date;
  readonly answeringEndsAt: Date;
  readonly settlesAt: Date;
  /** By the author's user id. */
  readonly sheets: Map<string, DemoSheet>;
}

export function minutesAfter(instant: Date, minutes: number): Date {
  return new Date(instant.getTime() + minutes * 60_000);
}
