import type { OptionalMailKind } from '../../../shared/schemas/mail.ts';
import { isSignedBy, sign } from '../../lib/secrets.ts';
import { isOptionalKind } from './letters.ts';

const PURPOSE = 'unsubscribe';

export interface Unsubscription {
  readonly userId: string;
  readonly kind: OptionalMailKind;
}

/** Names one person and one kind of letter; good for nothing else, and without an end, as old letters are read too. */
export function toUnsubscribeToken(secret: string, { userId, kind }: Unsubscription): string {
  const payload = Buffer.from(`${userId} ${kind}`).toString('base64url');
  return `${payload}.${sign(secret, PURPOSE, payload)}`;
}

/** null for anything that we did not sign. */
export function readUnsubscribeToken(secret: string, token: string): Unsubscription | null {
  const [payload = '', signature = ''] = token.split('.');
  if (!isSignedBy(secret, PURPOSE, payload, signature)) return null;
  const [userId = '', kind = ''] = Buffer.from(payload, 'base64url').toString('utf8').split(' ');
  return isOptionalKind(kind) ? { userId, kind } : null;
}
