import { IsNull, type DataSource, type EntityManager } from 'typeorm';
import { place, shownStanding } from '../../../shared/lib/standing.ts';
import type { StandingsAnswer, StandingsBody, Withheld } from '../../../shared/schemas/standings.ts';
import { notFound } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import { Class, Membership } from '../classes/classes.entity.ts';
import { findOwnStanding } from './own-standing.ts';
import { makeSheet, isSheetDue } from './standings-sheet.ts';
import { StandingsSheet } from './standings.entity.ts';

export interface StandingsDeps {
  readonly db: DataSource;
  readonly now: () => Date;
}

export type StandingsService = ReturnType<typeof createStandingsService>;

/** The class's weekly sheet of standings, and everyone's own line. */
export function createStandingsService({ db, now }: StandingsDeps) {
  async function read(viewer: Viewer, classId: string): Promise<StandingsAnswer> {
    const { manager } = db;
    const membership = await getMembership(manager, classId, viewer);
    const of = membership.class;
    if (!of) throw new Error('The membership was loaded without its class');
    const sheet = await manager.findOne(StandingsSheet, { where: { classId }, order: { madeAt: 'DESC' } });
    const withheld = findWithheld(of, sheet);
    return {
      classId,
      className: of.name,
      withheld,
      listed: withheld === null && sheet ? await toListed(manager, classId, sheet.body) : [],
      madeAt: sheet?.madeAt.toISOString() ?? null,
      timeZone: of.timeZone,
      own: membership.role === 'student' ? await findOwnStanding(manager, membership, now()) : null,
    };
  }

  async function setOptOut(viewer: Viewer, classId: string, optOut: boolean): Promise<StandingsAnswer> {
    const membership = await getMembership(db.manager, classId, viewer);
    if (membership.role !== 'student') throw notFound();
    await db.manager.update(Membership, membership.id, { standingsOptOut: optOut });
    return await read(viewer, classId);
  }

  /** Makes the sheets that are due; safe to run as often as one likes. */
  async function refresh(): Promise<number> {
    const classes = await db.manager.find(Class, { where: { archivedAt: IsNull() }, relations: { school: true } });
    let made = 0;
    for (const of of classes) {
      await db.transaction(async (manager) => {
        // One at a time for each class, also with several processes.
        await manager.findOneOrFail(Class, { where: { id: of.id }, lock: { mode: 'for_no_key_update' } });
        if (!(await isSheetDue(manager, of, now()))) return;
        await manager.insert(StandingsSheet, {
          classId: of.id,
          madeAt: now(),
          body: (await makeSheet(manager, of, now())) as object,
        });
        made += 1;
      });
    }
    return made;
  }

  return { read, setOptOut, refresh };
}

function findWithheld(of: Class, sheet: StandingsSheet | null): Withheld | null {
  if (!of.standingsOn || of.school?.standingsAllowed === false) return 'off';
  if (!sheet) return 'not-yet';
  return sheet.body.withheld;
}

/** Whoever opted out or left since the sheet was made is not shown; places are counted anew among the others. */
async function toListed(
  manager: EntityManager,
  classId: string,
  body: StandingsBody,
): Promise<StandingsAnswer['listed']> {
  const shown = await manager.find(Membership, {
    where: { classId, role: 'student', removedAt: IsNull(), standingsOptOut: false },
  });
  const ids = new Set(shown.map((membership) => membership.userId));
  return place(body.listed.filter(({ userId }) => ids.has(userId))).map(({ place: at, alias, standing }) => ({
    place: at,
    alias,
    standing: shownStanding(standing),
  }));
}

async function getMembership(manager: EntityManager, classId: string, viewer: Viewer): Promise<Membership> {
  const membership = await manager.findOne(Membership, {
    where: { classId, userId: viewer.userId, removedAt: IsNull() },
    relations: { class: { school: true } },
  });
  if (!membership) throw notFound();
  return membership;
}
