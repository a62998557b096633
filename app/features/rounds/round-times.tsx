import type { Instants } from '../../../shared/schemas/round.ts';
import { daysBetween, formatInstant } from '../../lib/dates.ts';
import { TimeEdge } from '../../ui/time-edge.tsx';
import { shortInstant } from './round-words.ts';

export interface RoundTimesProps {
  readonly instants: Instants;
  readonly zone: string;
  /** ISO, the server's. */
  readonly now: string;
}

/** The five instants of a round along an edge laid flat, with now. */
export function RoundTimes({ instants, zone, now }: RoundTimesProps) {
  const { opensAt, writingEndsAt, reviewingEndsAt, answeringEndsAt, settlesAt } = instants;
  const say = (iso: string) => shortInstant(iso, zone, now);
  const isOneDay = daysBetween(opensAt, writingEndsAt, zone) === 0;
  return (
    <TimeEdge
      label="Stages of the round"
      now={now}
      nowWords={`now ${formatInstant(now, zone, 'time')}`}
      stretches={[
        {
          id: 'writing',
          name: 'writing',
          from: opensAt,
          to: writingEndsAt,
          words: `${say(opensAt)} to ${isOneDay ? formatInstant(writingEndsAt, zone, 'time') : say(writingEndsAt)}`,
        },
        {
          id: 'reviewing',
          name: 'reviewing',
          from: writingEndsAt,
          to: reviewingEndsAt,
          words: `to ${say(reviewingEndsAt)}`,
        },
        // Rulings are made between the end of answering and settling; students meet both as one stage.
        {
          id: 'answering',
          name: 'answering',
          from: reviewingEndsAt,
          to: settlesAt,
          words: `to ${say(answeringEndsAt)}`,
        },
      ]}
      end={{ name: 'settled', words: say(settlesAt) }}
    />
  );
}
