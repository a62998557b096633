import type { ReadStep, ReadVerdict, ReviewResult } from '../../../shared/schemas/review.ts';
import type { FindingDraft } from '../../../shared/schemas/finding.ts';

/** The verdict in one sentence. */
export function headline({ outcome, firstFault, steps }: ReadVerdict): string {
  if (outcome === 'faulty') return `The first fault is step ${firstFault}.`;
  if (outcome === 'sound') return 'Every step follows.';
  const open = stepsIn(steps, 'undecided');
  return open.length === 1 ? `Step ${open[0]} stays undecided.` : 'This derivation stays undecided.';
}

/** What the other steps do, in a sentence or two. */
export function leadOf({ outcome, firstFault, steps }: ReadVerdict): string {
  if (outcome === 'sound') return 'From the given to the last line nothing is lost and nothing slips in.';
  if (outcome === 'undecided')
    return 'It could be shown neither to follow nor to fail, so what was found on it counts neither for nor against anybody.';
  const before = holdWords((firstFault ?? 1) - 1);
  const carried = stepsIn(steps, 'carried');
  const also = stepsIn(steps, 'also-fails');
  return [
    before,
    carriedWords(carried),
    also.length > 0
      ? `${named(also)} ${also.length === 1 ? 'fails' : 'fail'} by ${also.length === 1 ? 'itself' : 'themselves'}, too.`
      : '',
  ]
    .filter(Boolean)
    .join(' ');
}

/** The reviewer's own pick against the verdict. */
export function resultHeadline({ outcome, verdict }: ReviewResult, pick: FindingDraft['pick']): string {
  const { firstFault } = verdict;
  const truth = firstFault === null ? 'there is no fault' : `the first fault is step ${firstFault}`;
  switch (outcome) {
    case 'right':
      return firstFault === null
        ? 'You saw that every step follows.'
        : `You found the first fault: step ${firstFault}.`;
    case 'carried':
      return `You marked a carried step; ${truth}.`;
    case 'not-first':
    case 'false-alarm':
      return `You marked step ${pick}; ${truth}.`;
    case 'missed':
      return `You said there is no fault; ${truth}.`;
    case 'no-pick':
      return `You could not tell; ${truth}.`;
    case 'void':
      return 'This finding counts neither for nor against you.';
    case 'not-handed-in':
      return `You handed in nothing; ${truth}.`;
    case 'excused':
      return `You were excused; ${truth}.`;
  }
}

/** What is to be said about the picked step itself. */
export function resultLead({ outcome, verdict }: ReviewResult, pick: FindingDraft['pick']): string | null {
  switch (outcome) {
    case 'carried':
      return `Step ${pick} is right for the line it was given.`;
    case 'not-first':
      return typeof pick === 'number' && verdict.firstFault !== null && pick < verdict.firstFault
        ? `Step ${pick} follows from the line above it.`
        : `Step ${pick} fails as well, but something went wrong before it.`;
    case 'false-alarm':
      return 'Every step of this one follows.';
    case 'void':
      return verdict.outcome === 'undecided'
        ? 'The derivation was still undecided when the round settled.'
        : 'What you marked is worth a note, and no fault.';
    default:
      return null;
  }
}

function stepsIn(steps: readonly ReadStep[], state: ReadStep['state']): number[] {
  return steps.filter((step) => step.state === state).map(({ step }) => step);
}

function holdWords(count: number): string {
  if (count === 0) return '';
  if (count === 1) return 'Step 1 holds.';
  return count === 2 ? 'Steps 1 and 2 hold.' : `Steps 1 to ${count} hold.`;
}

function carriedWords(carried: readonly number[]): string {
  if (carried.length === 0) return '';
  return carried.length === 1
    ? `${named(carried)} is right for the line it was given, so it carries the slip and adds none.`
    : `${named(carried)} are right for the line they were given, so they carry the slip and add none.`;
}

/** `Step 4`, `Steps 3 to 5`, `Steps 3, 5 and 6`. */
function named(steps: readonly number[]): string {
  const [first = 0] = steps;
  const last = steps.at(-1) ?? first;
  if (steps.length === 1) return `Step ${first}`;
  if (last - first === steps.length - 1 && steps.length > 2) return `Steps ${first} to ${last}`;
  return `Steps ${steps.slice(0, -1).join(', ')} and ${last}`;
}
