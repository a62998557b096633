import type { RoundListItem } from '../../../shared/schemas/round.ts';
import type { TodayAnswer, TodayThing } from '../../../shared/schemas/today.ts';
import type { Membership } from '../classes/classes.entity.ts';
import type { User } from '../people/people.entity.ts';

/** Role, class and what waits for this person now, in one line. */
export function sayWhat(role: User['role'], places: readonly Membership[], today: TodayAnswer): string {
  if (role === 'admin') return 'admin of the school: people, mail and the trail';
  const [place] = places;
  const inClass = place?.class ? ` ${place.role === 'student' ? 'in' : 'of'} ${place.class.name}` : '';
  const who = `${place?.role ?? role}${inClass}`;
  const waits = place?.role === 'student' ? today.things.flatMap(sayThing) : sayRounds(today.rounds);
  return waits.length === 0 ? `${who}: nothing waits just now` : `${who}: ${joined(waits)}`;
}

function sayThing(thing: TodayThing): string[] {
  if (thing.kind === 'write') return [thing.begun ? 'a derivation to finish' : 'a derivation to write'];
  if (thing.kind === 'answer') return [`${counted(thing.count, 'finding')} to answer`];
  if (thing.kind === 'review') {
    const open = thing.reviews.filter(({ state }) => state === 'begun' || state === 'not-begun');
    return [`${counted(open.length, 'review')} to do`];
  }
  const mends = thing.own?.firstFault != null && thing.own.mend !== 'handed-in';
  return ['a verdict to read', ...(mends ? ['a mend to write'] : [])];
}

function sayRounds(rounds: readonly RoundListItem[]): string[] {
  const disputes = rounds.reduce((sum, { disputesOpen }) => sum + disputesOpen, 0);
  const running = rounds.filter(({ stage }) => stage !== 'planned' && stage !== 'settled');
  return [
    ...(disputes > 0 ? [`${counted(disputes, 'dispute')} to settle`] : []),
    ...(running.length > 0 ? [`${counted(running.length, 'round')} running`] : []),
  ];
}

const NUMBERS = ['no', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine'] as const;

function counted(count: number, noun: string): string {
  return `${NUMBERS[count] ?? count} ${noun}${count === 1 ? '' : 's'}`;
}

function joined(parts: readonly string[]): string {
  const last = parts.at(-1) ?? '';
  return parts.length < 2 ? last : `${parts.slice(0, -1).join(', ')} and ${last}`;
}
