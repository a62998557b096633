import { formatInstant, sayDay } from '../../lib/dates.ts';

/** Day and hour in the gutter, as the class's clocks show them. */
export function When({ iso, zone, word }: { readonly iso: string; readonly zone: string; readonly word?: string }) {
  return (
    <p className="when">
      <b>{word ?? sayDay(iso, zone)}</b>{' '}
      <time dateTime={iso} title={formatInstant(iso, zone, 'date-time')}>
        {word ? sayDay(iso, zone) : formatInstant(iso, zone, 'time')}
      </time>
    </p>
  );
}
