import { IsNull, type EntityManager } from 'typeorm';
import { listUpperThird } from '../../../shared/lib/standing.ts';
import type { StandingsBody } from '../../../shared/schemas/standings.ts';
import { Membership, type Class } from '../classes/classes.entity.ts';
import { byPerson, findCountedPoints } from './counted-points.ts';
import { StandingsSheet } from './standings.entity.ts';

const DAY_MS = 86_400_000;

/**
 * Whether a new sheet is due: none since Monday began in the class's zone, and no round settles within a day of now,
 * before or after, so that no step in the list gives away who reviewed whom.
 */
export async function isSheetDue(manager: EntityManager, of: Class, now: Date): Promise<boolean> {
  if (!of.standingsOn || of.school?.standingsAllowed === false) return false;
  const last = await manager.findOne(StandingsSheet, { where: { classId: of.id }, order: { madeAt: 'DESC' } });
  if (last && weekOf(last.madeAt, of.timeZone) >= weekOf(now, of.timeZone)) return false;
  const rows: { near: boolean }[] = await manager.query(
    `select exists (
       select 1 from round where class_id = $1
          and (settled_at between $2 and $3 or (stage = 'answering' and settles_at between $4 and $3))
     ) as near`,
    [of.id, new Date(now.getTime() - DAY_MS), new Date(now.getTime() + DAY_MS), now],
  );
  return rows[0]?.near !== true;
}

/** The list as it stands now: present students only, opted-out ones reckoned with but not shown. */
export async function makeSheet(manager: EntityManager, of: Class, now: Date): Promise<StandingsBody> {
  const members = await manager.find(Membership, { where: { classId: of.id, role: 'student', removedAt: IsNull() } });
  const aliases = new Map(members.map((member) => [member.userId, member.alias ?? '']));
  const optedOut = new Set(
    members.filter((member) => member.standingsOptOut || !member.alias).map((member) => member.userId),
  );
  const people = byPerson(await findCountedPoints(manager, of.id, now)).filter(({ userId }) => aliases.has(userId));
  const { withheld, listed, reviewers } = listUpperThird(people, optedOut);
  return { withheld, reviewers, listed: listed.map((entry) => ({ ...entry, alias: aliases.get(entry.userId) ?? '' })) };
}

/** Number of the Monday-to-Sunday week that an instant falls in, as the clocks of a zone show it. */
export function weekOf(instant: Date, timeZone: string): number {
  const [year, month, day] = new Intl.DateTimeFormat('en-CA', {
    timeZone,
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
  })
    .format(instant)
    .split('-')
    .map(Number);
  const dayNumber = Date.UTC(year ?? 1970, (month ?? 1) - 1, day ?? 1) / DAY_MS;
  // Day 0 was a Thursday; Mondays are days 4, 11, ...
  return Math.floor((dayNumber + 3) / 7);
}
