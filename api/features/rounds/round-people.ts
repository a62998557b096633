import type { EntityManager } from 'typeorm';
import { lateBatchAt, GRACE_MS } from '../../../shared/lib/round-times.ts';
import type { Round } from './rounds.entity.ts';

/** A student of the class, as far as one round is concerned. */
export interface RoundPerson {
  readonly userId: string;
  readonly name: string;
  readonly excused: boolean;
  readonly extension: { readonly writingEndsAt: Date | null; readonly reviewingEndsAt: Date | null } | null;
  readonly derivation: RoundDerivation | null;
}

export interface RoundDerivation {
  readonly id: string;
  readonly openedAt: Date | null;
  /** null while it is being written or was taken back. */
  readonly handedIn: {
    readonly versionId: string;
    readonly at: Date;
    readonly steps: number;
    readonly late: boolean;
  } | null;
}

/** A shorter derivation leaves nothing to find. */
export const FEWEST_STEPS = 2;

/** Every active student of the round's class, in the order of names. */
export async function listRoundPeople(
  manager: EntityManager,
  round: Pick<Round, 'id' | 'classId'>,
): Promise<RoundPerson[]> {
  const rows: PersonRow[] = await manager.query(PEOPLE_SQL, [round.id, round.classId]);
  return rows.map((row) => ({
    userId: row.user_id,
    name: row.name,
    excused: row.excused,
    extension: row.extension_id
      ? { writingEndsAt: row.own_writing_ends_at, reviewingEndsAt: row.own_reviewing_ends_at }
      : null,
    derivation: row.derivation_id
      ? {
          id: row.derivation_id,
          openedAt: row.opened_at,
          handedIn:
            row.version_id && row.handed_in_at
              ? { versionId: row.version_id, at: row.handed_in_at, steps: row.steps ?? 0, late: row.late ?? false }
              : null,
        }
      : null,
  }));
}

interface PersonRow {
  readonly user_id: string;
  readonly name: string;
  readonly excused: boolean;
  readonly extension_id: string | null;
  readonly own_writing_ends_at: Date | null;
  readonly own_reviewing_ends_at: Date | null;
  readonly derivation_id: string | null;
  readonly opened_at: Date | null;
  readonly version_id: string | null;
  readonly handed_in_at: Date | null;
  readonly late: boolean | null;
  readonly steps: number | null;
}

const PEOPLE_SQL = `
  select p.id as user_id, p.name, x.id is not null as excused,
         e.id as extension_id, e.writing_ends_at as own_writing_ends_at, e.reviewing_ends_at as own_reviewing_ends_at,
         d.id as derivation_id, d.opened_at, d.current_version_id as version_id, d.handed_in_at, d.late,
         jsonb_array_length(v.lines) - 1 as steps
    from membership m
    join person p on p.id = m.user_id and p.disabled_at is null
    left join derivation d on d.round_id = $1 and d.author_id = p.id
    left join derivation_version v on v.id = d.current_version_id
    left join extension e on e.round_id = $1 and e.user_id = p.id
    left join excuse x on x.round_id = $1 and x.user_id = p.id
   where m.class_id = $2 and m.role = 'student' and m.removed_at is null
   order by p.name, p.id`;

/**
 * Whoever may still hand in at `at` is dealt nothing before doing so: people with longer time, and everybody while
 * late derivations are taken (`takesLate`).
 */
export function mayStillHandIn(person: RoundPerson, at: Date, takesLate: boolean): boolean {
  if (person.derivation?.handedIn) return false;
  const own = person.extension?.writingEndsAt;
  return takesLate || (own ? own.getTime() + GRACE_MS > at.getTime() : false);
}

/** Whether a derivation was handed in and is long enough to be dealt. */
export function isDealable(person: RoundPerson): boolean {
  return (person.derivation?.handedIn?.steps ?? 0) >= FEWEST_STEPS;
}

/** When the late batch is dealt: half way through reviewing, or when the last longer time to write has ended. */
export function lateBatchInstant(round: Round, people: readonly RoundPerson[]): Date {
  const ends = people.map(({ extension }) => (extension?.writingEndsAt?.getTime() ?? 0) + GRACE_MS);
  const latest = Math.max(lateBatchAt(round).getTime(), ...ends);
  return new Date(Math.min(latest, round.reviewingEndsAt.getTime()));
}
