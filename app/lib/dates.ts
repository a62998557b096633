const LOCALE = 'en-GB';
const MINUTE_MS = 60_000;
const HOUR_MS = 60 * MINUTE_MS;
const DAY_MS = 24 * HOUR_MS;

/** A date and a time of day as shown on a wall, without a zone: `2026-10-13T18:00`. */
export type LocalDateTime = string;

export type TimeStyle = 'time' | 'day' | 'day-time' | 'date' | 'date-time' | 'short';

const STYLES: Record<TimeStyle, Intl.DateTimeFormatOptions> = {
  time: { hour: '2-digit', minute: '2-digit' },
  day: { weekday: 'long' },
  'day-time': { weekday: 'long', hour: '2-digit', minute: '2-digit' },
  date: { weekday: 'long', day: 'numeric', month: 'long' },
  'date-time': { weekday: 'long', day: 'numeric', month: 'long', hour: '2-digit', minute: '2-digit' },
  short: { weekday: 'short', hour: '2-digit', minute: '2-digit' },
};

const formatters = new Map<string, Intl.DateTimeFormat>();

function formatter(zone: string, options: Intl.DateTimeFormatOptions): Intl.DateTimeFormat {
  const key = `${zone} ${JSON.stringify(options)}`;
  const known = formatters.get(key);
  if (known) return known;
  const made = new Intl.DateTimeFormat(LOCALE, { hourCycle: 'h23', ...options, timeZone: zone });
  formatters.set(key, made);
  return made;
}

/** An instant (ISO, UTC) in words, as the clocks of `zone` (IANA) show it. */
export function formatInstant(iso: string, zone: string, style: TimeStyle): string {
  const text = formatter(zone, STYLES[style]).format(new Date(iso));
  return text.replace(' at ', ', ').replace(/^(\w+) (\d\d:\d\d)$/, style === 'short' ? '$1 $2' : '$1, $2');
}

function partsIn(zone: string, instant: Date): Record<string, string> {
  const format = formatter(zone, {
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
    hour: '2-digit',
    minute: '2-digit',
    second: '2-digit',
  });
  return Object.fromEntries(format.formatToParts(instant).map((part) => [part.type, part.value]));
}

/** The date and time of day that the clocks of `zone` show at an instant. */
export function toLocal(iso: string, zone: string): LocalDateTime {
  const p = partsIn(zone, new Date(iso));
  return `${p.year}-${p.month}-${p.day}T${p.hour}:${p.minute}`;
}

function offsetMs(zone: string, instantMs: number): number {
  const p = partsIn(zone, new Date(instantMs));
  const asUtc = Date.UTC(
    Number(p.year),
    Number(p.month) - 1,
    Number(p.day),
    Number(p.hour),
    Number(p.minute),
    Number(p.second),
  );
  return asUtc - Math.floor(instantMs / 1000) * 1000;
}

/**
 * The instant (ISO, UTC) at which the clocks of `zone` show `local`; null when `local` is not a date and time.
 * A time skipped in spring is moved on by the skipped hour; a time that comes twice in autumn is the first of the two.
 */
export function toInstant(local: LocalDateTime, zone: string): string | null {
  if (!/^\d{4}-\d\d-\d\dT\d\d:\d\d$/.test(local)) return null;
  const wall = Date.parse(`${local}:00Z`);
  if (Number.isNaN(wall)) return null;
  const before = offsetMs(zone, wall - DAY_MS);
  const after = offsetMs(zone, wall + DAY_MS);
  const fitting = [before, after].map((offset) => wall - offset).filter((at) => at + offsetMs(zone, at) === wall);
  return new Date(fitting.length > 0 ? Math.min(...fitting) : wall - before).toISOString();
}

/** Whether two instants fall on one calendar day in `zone`, or how many days apart they are. */
export function daysBetween(fromIso: string, toIso: string, zone: string): number {
  const day = (iso: string) => Date.parse(`${toLocal(iso, zone).slice(0, 10)}T00:00Z`);
  return Math.round((day(toIso) - day(fromIso)) / DAY_MS);
}

/** The day of an instant as one would say it: `today`, `tomorrow`, `Thursday`, `Monday 20 October`. */
export function sayDay(iso: string, zone: string, now: Date = new Date()): string {
  const days = daysBetween(now.toISOString(), iso, zone);
  if (days === 0) return 'today';
  if (days === 1) return 'tomorrow';
  if (days === -1) return 'yesterday';
  return formatInstant(iso, zone, Math.abs(days) < 7 ? 'day' : 'date');
}

/** A length of time, in its two largest units: `3 h 10 min`, `2 days`, `under a minute`. */
export function sayDuration(ms: number): string {
  const minutes = Math.floor(Math.abs(ms) / MINUTE_MS);
  if (minutes < 1) return 'under a minute';
  if (minutes < 60) return `${minutes} min`;
  const hours = Math.floor(minutes / 60);
  if (hours < 24) return minutes % 60 === 0 ? `${hours} h` : `${hours} h ${minutes % 60} min`;
  const days = Math.floor(hours / 24);
  return days === 1 ? '1 day' : `${days} days`;
}

/** How far an instant lies from now: `3 h 10 min left`, `2 days ago`. */
export function sayDistance(iso: string, now: Date = new Date()): string {
  const ms = Date.parse(iso) - now.getTime();
  return `${sayDuration(ms)} ${ms >= 0 ? 'left' : 'ago'}`;
}
