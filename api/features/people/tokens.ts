import { IsNull, type EntityManager } from 'typeorm';
import { ProblemError } from '../../http/problem-error.ts';
import { createCode, createToken, sha256 } from '../../lib/secrets.ts';
import { AccountToken } from './people.entity.ts';

export interface TokenOrder {
  readonly userId: string;
  readonly kind: AccountToken['kind'];
  readonly expiresAt: Date;
  readonly email?: string;
  readonly createdById?: string;
  /** What the person types; absent: a long random link. */
  readonly secret?: string;
}

/** Makes a single-use secret and voids the person's earlier ones of its kind. Only the hash is stored. */
export async function issueToken(manager: EntityManager, order: TokenOrder): Promise<string> {
  const secret = order.secret ?? createToken();
  await manager.delete(AccountToken, { userId: order.userId, kind: order.kind });
  await manager.insert(AccountToken, {
    userId: order.userId,
    kind: order.kind,
    tokenHash: sha256(secret),
    email: order.email ?? null,
    expiresAt: order.expiresAt,
    createdById: order.createdById ?? null,
  });
  return secret;
}

/**
 * Uses the secret up; two calls at once give it to one of them.
 * @throws {ProblemError} gone when it is unknown, used or over.
 */
export async function takeToken(
  manager: EntityManager,
  kind: AccountToken['kind'],
  secret: string,
  at: Date,
): Promise<AccountToken> {
  const row = await manager.findOneBy(AccountToken, { kind, tokenHash: sha256(secret), usedAt: IsNull() });
  if (!row || row.expiresAt <= at) throw gone();
  const { affected } = await manager.update(AccountToken, { id: row.id, usedAt: IsNull() }, { usedAt: at });
  if (affected !== 1) throw gone();
  return row;
}

/** Every link and code of a person that is still under way is worth nothing from now on. */
export async function voidTokens(manager: EntityManager, userId: string): Promise<void> {
  await manager.delete(AccountToken, { userId, usedAt: IsNull() });
}

function gone(): ProblemError {
  return new ProblemError('gone', { detail: 'The link was used already or is too old. Ask for a new one.' });
}

const CODE_LENGTH = 10;
const CODE_HOURS = 24;

/** A code that a teacher hands over; the person types it with their name. The earlier one is void. */
export async function issueSignInCode(
  manager: EntityManager,
  userId: string,
  createdById: string,
  at: Date,
): Promise<{ code: string; expiresAt: Date }> {
  const code = createCode(CODE_LENGTH);
  const expiresAt = new Date(at.getTime() + CODE_HOURS * 3_600_000);
  await issueToken(manager, { userId, kind: 'one-day-code', expiresAt, createdById, secret: `${userId}:${code}` });
  return { code, expiresAt };
}
