import type { ReactNode } from 'react';
import { createContext, useContext, useEffect, useState } from 'react';
import type { TimeStyle } from '../lib/dates.ts';
import { formatInstant, sayDay, sayDistance } from '../lib/dates.ts';

const ZoneContext = createContext('UTC');

/** The time zone (IANA) of everything inside: the class's own. */
export function ZoneProvider({ zone, children }: { zone: string; children: ReactNode }) {
  return <ZoneContext value={zone}>{children}</ZoneContext>;
}

export function useZone(): string {
  return useContext(ZoneContext);
}

export interface TimeProps {
  /** An instant: ISO, UTC. */
  readonly iso: string;
  readonly zone?: string;
  /** due: `today, 21:00`, with the weekday or date where further away. */
  readonly style?: TimeStyle | 'due';
}

/** An instant as the class's clocks show it. */
export function Time({ iso, zone, style = 'due' }: TimeProps) {
  const around = useZone();
  const own = zone ?? around;
  const words =
    style === 'due' ? `${sayDay(iso, own)}, ${formatInstant(iso, own, 'time')}` : formatInstant(iso, own, style);
  const clock = /\d\d:\d\d$/.exec(words)?.[0] ?? '';
  return (
    <time dateTime={iso} title={`${formatInstant(iso, own, 'date-time')} (${own})`}>
      {words.slice(0, words.length - clock.length)}
      {clock ? <span className="num">{clock}</span> : null}
    </time>
  );
}

const TICK_MS = 30_000;

/** How long is left until an instant, or how long ago it was; kept up to date. */
export function TimeLeft({ iso }: { iso: string }) {
  const [now, setNow] = useState(() => new Date());
  useEffect(() => {
    const timer = setInterval(() => setNow(new Date()), TICK_MS);
    return () => clearInterval(timer);
  }, []);
  return <span className="whitespace-nowrap">{sayDistance(iso, now)}</span>;
}
