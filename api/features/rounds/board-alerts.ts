import type { BoardAlert, BoardPerson } from '../../../shared/schemas/round.ts';
import type { WorkRow } from './board-work.ts';
import type { RoundPerson } from './round-people.ts';
import { FEWEST_PEOPLE } from './round-preview.ts';
import type { Round } from './rounds.entity.ts';

export interface AlertFacts {
  readonly round: Round;
  readonly people: readonly RoundPerson[];
  readonly board: readonly BoardPerson[];
  readonly work: ReadonlyMap<string, WorkRow>;
  readonly disputesOpen: number;
  readonly now: Date;
}

/** So many people stuck at one line are no accident. */
const SAME_LINE = 3;

/** What waits for the teacher, most pressing first; each of these has an act. */
export function findAlerts(facts: AlertFacts): BoardAlert[] {
  const { round, board, disputesOpen } = facts;
  if (round.stage === 'planned')
    return board.length < FEWEST_PEOPLE ? [{ kind: 'names-guessable', count: board.length }] : [];
  if (round.stage === 'writing') return findWritingAlerts(facts);
  if (round.stage === 'reviewing') return findReviewingAlerts(facts);
  if (round.waitingForRulings) return [{ kind: 'waiting-for-rulings', count: disputesOpen }];
  return disputesOpen > 0 ? [{ kind: 'disputes-open', count: disputesOpen }] : [];
}

function findWritingAlerts(facts: AlertFacts): BoardAlert[] {
  const { round, board, now } = facts;
  const isLate = isNearEnd(round.opensAt, round.writingEndsAt, now);
  const notBegun = board.filter(({ state }) => state === 'not-begun').length;
  const handedIn = board.filter(({ state, tooShort }) => state === 'handed-in' && !tooShort).length;
  const tooShort = board.filter((person) => person.tooShort).length;
  return [
    ...findStops(facts),
    ...(isLate && notBegun > 0 ? [{ kind: 'not-begun', count: notBegun } as const] : []),
    ...(tooShort > 0 ? [{ kind: 'too-short', count: tooShort } as const] : []),
    ...(isLate && handedIn < FEWEST_PEOPLE ? [{ kind: 'few-derivations', count: handedIn } as const] : []),
  ];
}

/** Lines at which several people stopped, with what they wrote there. */
function findStops({ people, board, work }: AlertFacts): BoardAlert[] {
  const stops = new Map<number, string[]>();
  board.forEach((person, i) => {
    const last = work.get(people[i]?.userId ?? '')?.last_tex;
    if (person.state !== 'stuck' || !last) return;
    stops.set(person.lines, [...(stops.get(person.lines) ?? []), last]);
  });
  return [...stops]
    .filter(([, texts]) => texts.length >= SAME_LINE)
    .sort(([, a], [, b]) => b.length - a.length)
    .map(([line, texts]) => ({ kind: 'line-stops', line, texts }));
}

function findReviewingAlerts({ round, people, board, now }: AlertFacts): BoardAlert[] {
  const { dealtAt } = round;
  const late = people.filter(({ derivation }) => {
    const at = derivation?.handedIn?.at;
    return at && dealtAt && at > dealtAt && (!round.lateDealtAt || at > round.lateDealtAt);
  }).length;
  const idle = board.filter(
    ({ state, reviews }) => state !== 'excused' && reviews.dealt > 0 && reviews.begun + reviews.done === 0,
  );
  const isLate = isNearEnd(round.writingEndsAt, round.reviewingEndsAt, now);
  return [
    ...(isLate && idle.length > 0 ? [{ kind: 'reviews-not-begun', count: idle.length } as const] : []),
    ...(late > 0 ? [{ kind: 'late-waiting', count: late } as const] : []),
  ];
}

/** The last quarter of a stage. */
function isNearEnd(from: Date, to: Date, now: Date): boolean {
  return to.getTime() - now.getTime() < (to.getTime() - from.getTime()) / 4;
}
