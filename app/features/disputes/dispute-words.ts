import type { DisputeKind, RulingEffect } from '../../../shared/schemas/dispute.ts';

export const KIND_WORDS: Record<DisputeKind, string> = {
  undecided: 'undecided',
  'contested-finding': 'contested finding',
  'contested-verdict': 'contested verdict',
  'contested-points': 'contested points',
};

/** `9 people: 3 verdicts become sound; 6 findings are scored again.` without its first words. */
export function effectWords(effect: RulingEffect): string {
  const { becomes, unchanged, findings, settled } = effect;
  const parts = (['sound', 'faulty', 'undecided'] as const)
    .filter((outcome) => becomes[outcome] > 0)
    .map(
      (outcome) =>
        `${counted(becomes[outcome], 'verdict')} ${becomes[outcome] === 1 ? 'becomes' : 'become'} ${outcome}`,
    );
  if (unchanged > 0)
    parts.push(
      `${counted(unchanged, 'verdict')} ${unchanged === 1 ? 'stays' : 'stay'} as ${unchanged === 1 ? 'it is' : 'they are'}`,
    );
  const scored = settled
    ? `${counted(findings, 'finding')} ${findings === 1 ? 'is' : 'are'} scored again. Nothing old is deleted.`
    : `${counted(findings, 'finding')} ${findings === 1 ? 'is' : 'are'} scored by it when the round settles.`;
  return `${parts.join(', ')}; ${scored}`;
}

export function counted(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? '' : 's'}`;
}
