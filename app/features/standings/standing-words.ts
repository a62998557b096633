import type { OwnStanding } from '../../../shared/schemas/standings.ts';

const STEADY = 5;

/** Where the own line goes, said kindly and truly. */
export function standingHeadline({ rounds }: Pick<OwnStanding, 'rounds'>): string {
  const last = rounds.at(-1);
  const first = rounds[0];
  if (!last || !first) return 'Your first findings are still to come.';
  if (rounds.length === 1) return 'Your first round is scored.';
  if (last.mean - first.mean > STEADY) return `Your eye is sharper than in round ${first.number}.`;
  if (first.mean - last.mean > STEADY) return `Round ${last.number} was a harder one for you.`;
  return 'Your eye is steady.';
}

export function counted(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? '' : 's'}`;
}
