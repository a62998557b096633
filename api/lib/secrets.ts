import { createHash, createHmac, randomBytes, randomInt, timingSafeEqual } from 'node:crypto';

/** Letters and digits that are not taken for each other when read aloud or copied by hand. */
const CODE_LETTERS = 'ABCDEFGHJKMNPQRSTUVWXYZ23456789';

/** 32 random bytes, base64url: for links and sessions. Store only its `sha256`. */
export function createToken(): string {
  return randomBytes(32).toString('base64url');
}

/** A code that a person types, drawn evenly from 31 unmistakable letters and digits. */
export function createCode(length: number): string {
  return Array.from({ length }, () => CODE_LETTERS[randomInt(CODE_LETTERS.length)]).join('');
}

/** Hex digest; what the database keeps of a token. */
export function sha256(text: string): string {
  return createHash('sha256').update(text).digest('hex');
}

/** Signs `text` under a purpose, so that a signature made for one use is worth nothing for another. */
export function sign(secret: string, purpose: string, text: string): string {
  return createHmac('sha256', secret).update(`${purpose}\n${text}`).digest('base64url');
}

export function isSignedBy(secret: string, purpose: string, text: string, signature: string): boolean {
  const expected = Buffer.from(sign(secret, purpose, text));
  const given = Buffer.from(signature);
  return expected.length === given.length && timingSafeEqual(expected, given);
}
