import { randomInt } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { ALIAS_COUNT, aliasAt } from '../../../shared/lib/aliases.ts';
import { ProblemError } from '../../http/problem-error.ts';
import { Class, Membership } from './classes.entity.ts';

/** Gives a student without an alias a free one, drawn by chance. Locks the class, so that two students never draw the same. */
export async function giveAlias(manager: EntityManager, classId: string, userId: string): Promise<void> {
  const taken = await lockAliases(manager, classId);
  const [alias] = drawFree(taken, 1);
  await manager
    .createQueryBuilder()
    .update(Membership)
    .set({ alias })
    .where('class_id = :classId AND user_id = :userId AND alias IS NULL', { classId, userId })
    .execute();
}

/** A handful of free aliases to choose from. */
export async function drawAliases(manager: EntityManager, classId: string, count: number): Promise<string[]> {
  return drawFree(await takenAliases(manager, classId), count);
}

/** @throws {ProblemError} conflict when somebody has it. Call within a transaction. */
export async function takeAlias(
  manager: EntityManager,
  membership: Membership,
  alias: string,
  at: Date,
): Promise<void> {
  const taken = await lockAliases(manager, membership.classId);
  if (taken.has(alias)) throw new ProblemError('conflict', { detail: 'Somebody has this alias. Choose another.' });
  await manager.update(Membership, { id: membership.id }, { alias, aliasChangedAt: at });
}

async function lockAliases(manager: EntityManager, classId: string): Promise<Set<string>> {
  await manager.findOne(Class, { where: { id: classId }, select: { id: true }, lock: { mode: 'for_no_key_update' } });
  return await takenAliases(manager, classId);
}

async function takenAliases(manager: EntityManager, classId: string): Promise<Set<string>> {
  const rows = await manager.find(Membership, { where: { classId }, select: { alias: true } });
  return new Set(rows.flatMap(({ alias }) => (alias === null ? [] : [alias])));
}

function drawFree(taken: ReadonlySet<string>, count: number): string[] {
  const drawn = new Set<string>();
  while (drawn.size < count) {
    const alias = aliasAt(randomInt(ALIAS_COUNT));
    if (!taken.has(alias)) drawn.add(alias);
  }
  return [...drawn];
}
