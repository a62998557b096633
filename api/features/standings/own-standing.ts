import type { EntityManager } from 'typeorm';
import { chanceSaid, shownPoints } from '../../../shared/lib/scoring.ts';
import { classMeanOf, shownStanding, standingOf } from '../../../shared/lib/standing.ts';
import { sureWordOf } from '../../../shared/schemas/finding.ts';
import type { OwnStanding } from '../../../shared/schemas/standings.ts';
import type { Membership } from '../classes/classes.entity.ts';
import { byPerson, findCountedPoints, type CountedPoint } from './counted-points.ts';

const WEEK_MS = 7 * 86_400_000;
const SAID = ['a-little', 'half', 'nearly', 'certain'] as const;
/** A class mean of fewer people would tell what a classmate earned. */
const LEAST_FOR_CLASS_MEAN = 5;

/** One's own figures, whole points throughout; nobody else is sent them. */
export async function findOwnStanding(manager: EntityManager, membership: Membership, now: Date): Promise<OwnStanding> {
  const { classId, userId } = membership;
  const points = await findCountedPoints(manager, classId, now);
  const standing = standingAt(points, userId);
  const before = standingAt(await findCountedPoints(manager, classId, new Date(now.getTime() - WEEK_MS)), userId);
  return {
    alias: membership.alias ?? '',
    optedOut: membership.standingsOptOut,
    standing,
    change: standing === null || before === null ? null : standing - before,
    rounds: toRounds(points, userId),
    sureness: toSureness(points.filter((point) => point.userId === userId)),
  };
}

function standingAt(points: readonly CountedPoint[], userId: string): number | null {
  const people = byPerson(points);
  const own = people.find((person) => person.userId === userId);
  return own ? shownStanding(standingOf(own.points, classMeanOf(people))) : null;
}

function toRounds(points: readonly CountedPoint[], userId: string): OwnStanding['rounds'] {
  const rounds = new Map<string, CountedPoint[]>();
  for (const point of points) rounds.set(point.roundId, [...(rounds.get(point.roundId) ?? []), point]);
  return [...rounds.values()].flatMap((all) => {
    const own = all.filter((point) => point.userId === userId);
    if (own.length === 0 || !all[0]) return [];
    const people = new Set(all.map((point) => point.userId)).size;
    return [
      { number: all[0].roundNumber, mean: meanOf(own), classMean: people >= LEAST_FOR_CLASS_MEAN ? meanOf(all) : null },
    ];
  });
}

function toSureness(own: readonly CountedPoint[]): OwnStanding['sureness'] {
  const said = own.filter((point) => point.sureness > 0);
  return SAID.flatMap((sure) => {
    const those = said.filter((point) => sureWordOf(point.sureness) === sure);
    if (those.length === 0) return [];
    const chances = those.map((point) =>
      chanceSaid(point.noFault ? 'none' : (point.pick ?? 1), point.sureness, point.steps),
    );
    const expected = Math.round((100 * chances.reduce((sum, chance) => sum + chance, 0)) / those.length) / 100;
    return [{ sure, right: those.filter((point) => point.outcome === 'right').length, of: those.length, expected }];
  });
}

function meanOf(points: readonly CountedPoint[]): number {
  return shownPoints(points.reduce((sum, point) => sum + point.points, 0) / points.length);
}
