import { hash, verify } from '@node-rs/argon2';
import { dictionary } from '@zxcvbn-ts/language-common';
import { ProblemError } from '../../http/problem-error.ts';

/** Argon2id, at least OWASP's 19 MiB, two passes, one lane (Password Storage Cheat Sheet). */
const COST = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };
const common = new Set(dictionary['passwords-common'].map((word) => word.toLowerCase()));

function normalise(password: string): string {
  return password.normalize('NFKC');
}

export async function hashPassword(password: string): Promise<string> {
  return await hash(normalise(password), COST);
}

/** Takes as long for an unknown person (`hashed` null) as for a wrong password. */
export async function passwordMatches(hashed: string | null, password: string): Promise<boolean> {
  const matches = await verify(hashed ?? (await decoy), normalise(password));
  return hashed !== null && matches;
}
const decoy = hashPassword('no person has this password');

/**
 * Refuses what guessers try first, with the reason.
 * @throws {ProblemError} invalid-fields at `pointer`.
 */
export function refuseCommonPassword(password: string, own: readonly (string | null)[], pointer = '/password'): void {
  const plain = normalise(password).toLowerCase();
  const letters = plain.replace(/[^\p{L}]/gu, '');
  if (common.has(plain) || (letters.length >= 4 && common.has(letters) && plain.length - letters.length <= 4)) {
    refuse(
      pointer,
      'This is on the list of passwords that are guessed first. Choose another; a few words in a row do well.',
    );
  }
  if (/^(.{1,3})\1+$/u.test(plain))
    refuse(pointer, 'This repeats one short piece and is guessed early. Choose another.');
  if (own.some((word) => word !== null && word.length >= 3 && plain === word.toLowerCase())) {
    refuse(pointer, 'This is your own name or address. Choose something that others do not know.');
  }
}

function refuse(pointer: string, detail: string): never {
  throw new ProblemError('invalid-fields', { errors: [{ pointer, detail }] });
}
