import type { EntityManager } from 'typeorm';
import { GRACE_MS } from '../../../shared/lib/round-times.ts';
import type { Stage } from '../../../shared/schemas/round.ts';
import type { Round } from './rounds.entity.ts';

export type LaterStage = Exclude<Stage, 'planned'>;

const AFTER: Record<Stage, LaterStage | null> = {
  planned: 'writing',
  writing: 'reviewing',
  reviewing: 'answering',
  answering: 'settled',
  settled: null,
};

/** The stage that follows; null after the last. */
export function nextStage(stage: Stage): LaterStage | null {
  return AFTER[stage];
}

/**
 * When the running stage ends by itself, with two minutes of grace for what people hand in. Answering opens for
 * everyone after the last person's longer time to review, so that no finding comes to an author alone.
 */
export async function findStageEnd(manager: EntityManager, round: Round): Promise<Date | null> {
  if (round.stage === 'planned') return round.opensAt;
  // Where both are one instant, answers still have their grace.
  if (round.stage === 'answering')
    return new Date(Math.max(round.settlesAt.getTime(), round.answeringEndsAt.getTime() + GRACE_MS));
  if (round.stage === 'writing') return new Date(round.writingEndsAt.getTime() + GRACE_MS);
  if (round.stage === 'settled') return null;
  const [own]: { longest: Date | null }[] = await manager.query(
    'select max(reviewing_ends_at) as longest from extension where round_id = $1',
    [round.id],
  );
  const ends = Math.max(round.reviewingEndsAt.getTime(), own?.longest?.getTime() ?? 0);
  return new Date(ends + GRACE_MS);
}
