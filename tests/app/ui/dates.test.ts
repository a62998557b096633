import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatInstant, sayDay, sayDistance, sayDuration, toInstant, toLocal } from '../../../app/lib/dates.ts';

const BERLIN = 'Europe/Berlin';

describe('times on the class’s clocks', () => {
  it('turns a local time into an instant and back, in summer and in winter', () => {
    expect(toInstant('2026-07-01T18:00', BERLIN)).toBe('2026-07-01T16:00:00.000Z');
    expect(toInstant('2026-12-01T18:00', BERLIN)).toBe('2026-12-01T17:00:00.000Z');
    expect(toLocal('2026-07-01T16:00:00Z', BERLIN)).toBe('2026-07-01T18:00');
  });

  it('moves a time that is skipped in spring on by an hour, and takes the first of two in autumn', () => {
    expect(toInstant('2026-03-29T02:30', BERLIN)).toBe('2026-03-29T01:30:00.000Z');
    expect(toInstant('2026-10-25T02:30', BERLIN)).toBe('2026-10-25T00:30:00.000Z');
  });

  it('answers null for what is no date and time', () => {
    expect(toInstant('', BERLIN)).toBeNull();
    expect(toInstant('2026-13-01T10:00', BERLIN)).toBeNull();
  });

  it('comes back to the same clock face from every instant', () => {
    const zones = fc.constantFrom(BERLIN, 'America/New_York', 'Asia/Kolkata', 'Australia/Lord_Howe', 'UTC');
    const minutes = fc.integer({ min: Date.UTC(2025, 0) / 60_000, max: Date.UTC(2028, 0) / 60_000 });
    fc.assert(
      fc.property(zones, minutes, (zone, minute) => {
        const local = toLocal(new Date(minute * 60_000).toISOString(), zone);
        const back = toInstant(local, zone);
        expect(back && toLocal(back, zone)).toBe(local);
      }),
    );
  });

  it('says days as one would', () => {
    const now = new Date('2026-10-13T10:00:00Z');
    expect(sayDay('2026-10-13T21:30:00Z', BERLIN, now)).toBe('today');
    expect(sayDay('2026-10-13T22:30:00Z', BERLIN, now)).toBe('tomorrow');
    expect(sayDay('2026-10-15T10:00:00Z', BERLIN, now)).toBe('Thursday');
    expect(sayDay('2026-10-26T10:00:00Z', BERLIN, now)).toBe('Monday 26 October');
  });

  it('writes instants in the styles of the pages', () => {
    expect(formatInstant('2026-10-20T16:00:00Z', BERLIN, 'date-time')).toBe('Tuesday 20 October, 18:00');
    expect(formatInstant('2026-10-20T16:00:00Z', BERLIN, 'day-time')).toBe('Tuesday, 18:00');
    expect(formatInstant('2026-10-20T16:00:00Z', BERLIN, 'short')).toBe('Tue 18:00');
  });

  it('says lengths of time in their two largest units', () => {
    expect(sayDuration(30_000)).toBe('under a minute');
    expect(sayDuration(11_400_000)).toBe('3 h 10 min');
    expect(sayDuration(2 * 86_400_000)).toBe('2 days');
    expect(sayDistance('2026-10-13T09:00:00Z', new Date('2026-10-13T10:00:00Z'))).toBe('1 h ago');
  });
});
