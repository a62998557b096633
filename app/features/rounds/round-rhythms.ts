import type { Instants } from '../../../shared/schemas/round.ts';
import { toInstant, toLocal } from '../../lib/dates.ts';

/** A usual course of a round, from which its five times are proposed. */
export type Rhythm = 'lesson' | 'days' | 'week';

export const RHYTHMS: readonly { readonly value: Rhythm; readonly label: string; readonly hint: string }[] = [
  { value: 'lesson', label: 'One lesson', hint: '30 minutes to write, 20 to review, 10 to answer' },
  { value: 'days', label: 'Three days', hint: 'an evening for each' },
  { value: 'week', label: 'One week', hint: 'two evenings to write, two to review, one to answer' },
];

const MINUTE = 60_000;

/** The next full quarter of an hour, so that the proposed times read well. */
export function nextQuarter(now: Date): Date {
  return new Date(Math.ceil((now.getTime() + MINUTE) / (15 * MINUTE)) * 15 * MINUTE);
}

/** An evening hour on the class's clocks, some days after an instant. */
function eveningAfter(from: Date, days: number, hour: string, zone: string): string {
  const day = toLocal(new Date(from.getTime() + days * 1440 * MINUTE).toISOString(), zone).slice(0, 10);
  return toInstant(`${day}T${hour}`, zone) ?? from.toISOString();
}

/** Five times in order, beginning at the next quarter of an hour. */
export function proposeInstants(rhythm: Rhythm, zone: string, now: Date): Instants {
  const opens = nextQuarter(now);
  if (rhythm === 'lesson') {
    const after = (minutes: number) => new Date(opens.getTime() + minutes * MINUTE).toISOString();
    return {
      opensAt: opens.toISOString(),
      writingEndsAt: after(30),
      reviewingEndsAt: after(50),
      answeringEndsAt: after(60),
      settlesAt: after(60),
    };
  }
  const [writing, reviewing, answering, settles] = rhythm === 'days' ? [1, 2, 3, 3] : [2, 4, 6, 7];
  const evening = (days: number | undefined) => eveningAfter(opens, days ?? 1, '21:00', zone);
  return {
    opensAt: opens.toISOString(),
    writingEndsAt: evening(writing),
    reviewingEndsAt: evening(reviewing),
    answeringEndsAt: evening(answering),
    settlesAt: settles === answering ? evening(settles) : eveningAfter(opens, settles ?? 7, '18:00', zone),
  };
}
