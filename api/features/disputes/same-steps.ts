import { In, type EntityManager } from 'typeorm';
import type { HandedInLine } from '../../../shared/schemas/sheet.ts';
import { Derivation, DerivationVersion } from '../derivations/derivations.entity.ts';

/** A step of one version. */
export interface StepPlace {
  readonly versionId: string;
  readonly step: number;
}

/** For the rounds given: where else the same step was taken (what it is judged from and its line are equal). */
export interface SameSteps {
  /** Without the place itself. */
  find(place: StepPlace): StepPlace[];
}

/** Reads all derivations handed in to these rounds. */
export async function loadSameSteps(manager: EntityManager, roundIds: readonly string[]): Promise<SameSteps> {
  const places = new Map<string, StepPlace[]>();
  const keys = new Map<string, string>();
  for (const { roundId, version } of await findHandedIn(manager, roundIds)) {
    for (let step = 1; step < version.lines.length; step += 1) {
      const key = `${roundId} ${stepKey(version.lines, step)}`;
      keys.set(`${version.id} ${step}`, key);
      places.set(key, [...(places.get(key) ?? []), { versionId: version.id, step }]);
    }
  }
  return {
    find: ({ versionId, step }) => {
      const key = keys.get(`${versionId} ${step}`);
      const found = key === undefined ? [] : (places.get(key) ?? []);
      return found.filter((place) => place.versionId !== versionId);
    },
  };
}

async function findHandedIn(manager: EntityManager, roundIds: readonly string[]) {
  if (roundIds.length === 0) return [];
  const derivations = await manager.find(Derivation, { where: { roundId: In([...new Set(roundIds)]) } });
  const ids = derivations.flatMap((derivation) => derivation.currentVersionId ?? []);
  const versions =
    ids.length === 0
      ? []
      : await manager.find(DerivationVersion, {
          where: { id: In(ids) },
          select: { id: true, derivationId: true, lines: true },
        });
  const roundOf = new Map(derivations.map((derivation) => [derivation.id, derivation.roundId]));
  return versions.map((version) => ({ version, roundId: roundOf.get(version.derivationId) ?? '' }));
}

function stepKey(lines: readonly HandedInLine[], step: number): string {
  const from = lines[step]?.uses ?? [step - 1];
  return JSON.stringify([...from, step].map((at) => squeezed(lines[at])));
}

function squeezed(line: HandedInLine | undefined): string {
  return (line?.tex ?? '').replaceAll(/\s+/g, '');
}
