import { In, type EntityManager } from 'typeorm';
import { VerdictRecord } from '../verdicts/verdicts.entity.ts';
import { Finding } from '../reviews/reviews.entity.ts';

/** The verdict in force of each version: the latest ruling, else the latest of the checker. Versions without one are absent. */
export async function findCurrentVerdicts(
  manager: EntityManager,
  versionIds: readonly string[],
): Promise<Map<string, VerdictRecord>> {
  if (versionIds.length === 0) return new Map();
  const rows = await manager.find(VerdictRecord, {
    where: { versionId: In([...new Set(versionIds)]) },
    relations: { ruling: true },
    order: { createdAt: 'ASC', id: 'ASC' },
  });
  const current = new Map<string, VerdictRecord>();
  for (const row of rows) {
    const known = current.get(row.versionId);
    if (known?.source !== 'ruling' || row.source === 'ruling') current.set(row.versionId, row);
  }
  return current;
}

/** What is handed in now, by review: the last finding, unless the reviewer took it back. */
export async function findFindingsInForce(
  manager: EntityManager,
  reviewIds: readonly string[],
): Promise<Map<string, Finding>> {
  if (reviewIds.length === 0) return new Map();
  const rows = await manager
    .createQueryBuilder(Finding, 'finding')
    .where('finding.reviewId in (:...reviewIds)', { reviewIds })
    .andWhere('finding.takenBackAt is null')
    .orderBy('finding.handedInAt', 'ASC')
    .addOrderBy('finding.id', 'ASC')
    .getMany();
  return new Map(rows.map((row) => [row.reviewId, row]));
}
