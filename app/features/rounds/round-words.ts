import type { RoundListItem, RoundWarning, Stage, StageEffect } from '../../../shared/schemas/round.ts';
import { formatInstant, sayDay } from '../../lib/dates.ts';

/** `1 person`, `3 people`. */
export function plural(count: number, one: string, many = `${one}s`): string {
  return `${count} ${count === 1 ? one : many}`;
}
export const people = (count: number): string => plural(count, 'person', 'people');

/** Day and hour as short as a board needs: `today 21:00`, `Mon 10:00`, `Mon 20 Oct, 10:00` further away. */
export function shortInstant(iso: string, zone: string, now: string): string {
  const day = sayDay(iso, zone, new Date(now));
  const time = formatInstant(iso, zone, 'time');
  if (['today', 'tomorrow', 'yesterday'].includes(day)) return `${day} ${time}`;
  const isNear = Math.abs(Date.parse(iso) - Date.parse(now)) < 6 * 86_400_000;
  if (isNear) return formatInstant(iso, zone, 'short');
  const date = new Intl.DateTimeFormat('en-GB', { timeZone: zone, day: 'numeric', month: 'short' }).format(
    new Date(iso),
  );
  return `${date}, ${time}`;
}

/** The instant at which the round moves on by itself; null when it is settled. */
export function nextInstantOf({ stage, instants }: Pick<RoundListItem, 'stage' | 'instants'>): string | null {
  return {
    planned: instants.opensAt,
    writing: instants.writingEndsAt,
    reviewing: instants.reviewingEndsAt,
    answering: instants.settlesAt,
    settled: null,
  }[stage];
}

/** The act that moves a round on, in its own verb. */
export const MOVE_WORDS: Record<Exclude<Stage, 'settled'>, { readonly act: string; readonly title: string }> = {
  planned: { act: 'Open now', title: 'Open the round now?' },
  writing: { act: 'Open reviewing now', title: 'Close writing and deal the derivations now?' },
  reviewing: { act: 'Open answering now', title: 'Close reviewing now?' },
  answering: { act: 'Settle now', title: 'Settle the round now?' },
};

export function sayEffect({ kind, count, each }: StageEffect): string {
  switch (kind) {
    case 'freezes-task':
      return 'The task is fixed as it stands now.';
    case 'opens-writing':
      return `Writing opens for ${people(count)}.`;
    case 'closes-writing':
      return `Writing closes for ${people(count)} who ${count === 1 ? 'has' : 'have'} not handed in.`;
    case 'deals':
      return `${plural(count, 'derivation')} ${count === 1 ? 'is' : 'are'} dealt, ${plural(each ?? 0, 'review')} for each reviewer.`;
    case 'closes-reviewing':
      return `${plural(count, 'review')} that ${count === 1 ? 'is' : 'are'} not handed in can no longer be.`;
    case 'shows-findings':
      return `Authors see ${plural(count, 'finding')}, without names.`;
    case 'closes-answering':
      return `${plural(count, 'finding')} ${count === 1 ? 'stays' : 'stay'} unanswered.`;
    case 'shows-verdicts':
      return `The verdicts on ${plural(count, 'derivation')} and all points are shown.`;
    case 'voids':
      return `${plural(count, 'open dispute')} ${count === 1 ? 'is' : 'are'} closed without a ruling; the findings concerned do not count.`;
    case 'mails':
      return `${people(count)} ${count === 1 ? 'gets' : 'get'} a mail.`;
  }
}

export function sayWarning({ kind, count }: RoundWarning): string {
  switch (kind) {
    case 'names-guessable':
      return `With ${people(count)} in the class, readers can guess whose work they see.`;
    case 'few-derivations':
      return `Only ${plural(count, 'derivation')}: readers can guess whose work they see.`;
    case 'reviews-cut':
      return `There is too little to review: each reviewer gets ${count}.`;
    case 'nothing-to-review':
      return 'There is nothing to deal: nobody could review anybody.';
    case 'not-dealt':
      return `${plural(count, 'derivation')} of fewer than two steps ${count === 1 ? 'is' : 'are'} not dealt.`;
    case 'still-writing':
      return `${people(count)} ${count === 1 ? 'has' : 'have'} begun and not handed in.`;
    case 'reviews-open':
      return `${plural(count, 'review')} ${count === 1 ? 'is' : 'are'} still open.`;
    case 'answers-open':
      return `${plural(count, 'finding')} ${count === 1 ? 'has' : 'have'} no answer yet.`;
    case 'disputes-open':
      return `${plural(count, 'dispute')} ${count === 1 ? 'waits' : 'wait'} for a ruling.`;
    case 'checks-waiting':
      return `${plural(count, 'derivation')} ${count === 1 ? 'has' : 'have'} not been checked yet.`;
  }
}
