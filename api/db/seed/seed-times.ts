/** Clock times of one school day, counted from today in a time zone. */
export interface DayTime {
  /** 0 is today, -1 yesterday. */
  readonly day: number;
  /** 18.5 is half past six. */
  readonly hour: number;
}

/** The instant at which clocks in a zone show this time, on a day counted from that of `present`. */
export function instantOf(present: Date, timeZone: string, { day, hour }: DayTime): Date {
  const today = new Date(present.getTime() + offsetAt(present, timeZone));
  const wall = Date.UTC(today.getUTCFullYear(), today.getUTCMonth(), today.getUTCDate() + day) + hour * 3_600_000;
  // Twice, because the first guess may stand on the other side of a change of clocks.
  const guess = wall - offsetAt(new Date(wall), timeZone);
  return new Date(wall - offsetAt(new Date(guess), timeZone));
}

/** An instant between two, `share` of the way. */
export function between(from: Date, to: Date, share: number): Date {
  return new Date(from.getTime() + (to.getTime() - from.getTime()) * share);
}

/** How far the zone's clocks are ahead of UTC. */
function offsetAt(instant: Date, timeZone: string): number {
  const parts = new Intl.DateTimeFormat('en-GB', {
    timeZone,
    hourCycle: 'h23',
    year: 'numeric',
    month: 'numeric',
    day: 'numeric',
    hour: 'numeric',
    minute: 'numeric',
    second: 'numeric',
  }).formatToParts(instant);
  const value = (type: string) => Number(parts.find((part) => part.type === type)?.value ?? 0);
  const wall = Date.UTC(
    value('year'),
    value('month') - 1,
    value('day'),
    value('hour'),
    value('minute'),
    value('second'),
  );
  return wall - Math.floor(instant.getTime() / 1000) * 1000;
}
