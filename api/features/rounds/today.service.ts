import type { DataSource } from 'typeorm';
import type { Reading, ReadSettings } from '../../../shared/maths/expression.ts';
import { CONTEST_MS } from '../../../shared/lib/round-times.ts';
import type { TodayAnswer, TodayThing, WaitingRound } from '../../../shared/schemas/today.ts';
import type { Viewer } from '../../http/route.ts';
import type { Now } from '../../lib/clock.ts';
import { listRounds } from './round-lists.ts';
import { listOwnRounds, toThing, type OwnRound } from './today-rounds.ts';
import { findOwnProgress } from './today-progress.ts';

export interface TodayDeps {
  readonly db: DataSource;
  readonly now: Now;
  readonly readLine: (tex: string, settings: ReadSettings) => Reading;
}
export type TodayService = ReturnType<typeof createTodayService>;

/** Settled rounds stay this long on the first page of those who teach. */
const RECENT_MS = 14 * 86_400_000;

/** What is due for one person, soonest first. Before settling nothing in it depends on a verdict. */
export function createTodayService({ db, now, readLine }: TodayDeps) {
  return {
    async getToday(viewer: Viewer): Promise<TodayAnswer> {
      const { manager } = db;
      const at = now();
      const settledSince = new Date(at.getTime() - CONTEST_MS);
      const own = await listOwnRounds(manager, viewer.userId, settledSince);
      const things: TodayThing[] = [];
      const waiting: WaitingRound[] = [];
      for (const round of own) {
        const thing = await toThing(manager, viewer.userId, round, { at, readLine });
        if (thing) things.push(thing);
        else if (round.stage !== 'settled') waiting.push(toWaiting(round));
      }
      const rounds = await listRounds(manager, viewer.userId, null);
      const recent = at.getTime() - RECENT_MS;
      return {
        now: at.toISOString(),
        things: things.sort((one, other) => dueOf(one) - dueOf(other)),
        waiting,
        progress: await findOwnProgress(manager, viewer.userId),
        rounds: rounds.filter(({ stage, instants }) => stage !== 'settled' || Date.parse(instants.settlesAt) >= recent),
        joinRequests: await manager.query(JOIN_SQL, [viewer.userId]),
      };
    },
  };
}

/** Settled rounds come after everything that has an end. */
function dueOf(thing: TodayThing): number {
  return thing.kind === 'look' ? Number.MAX_SAFE_INTEGER - Date.parse(thing.settledAt) : Date.parse(thing.dueAt);
}

function toWaiting(round: OwnRound): WaitingRound {
  const { roundId, title, className, timeZone, number, stage } = round;
  const nextAt = {
    planned: round.opensAt,
    writing: round.writingEndsAt,
    reviewing: round.reviewingEndsAt,
    answering: round.settlesAt,
    settled: round.settlesAt,
  }[stage];
  const handedIn = round.derivation?.versionId != null;
  return { roundId, title, className, timeZone, number, stage, nextAt: nextAt.toISOString(), handedIn };
}

const JOIN_SQL = `
  select c.id as "classId", c.name as "className", count(*)::int as count
    from join_request j
    join class c on c.id = j.class_id and c.archived_at is null
    join membership m on m.class_id = c.id and m.user_id = $1 and m.role = 'teacher' and m.removed_at is null
   where j.decided_at is null
   group by c.id, c.name order by c.name, c.id`;
