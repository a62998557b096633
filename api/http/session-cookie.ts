import type { Request, Response } from 'express';

export const SESSION_COOKIE = 'slipstone_session';

/** The server's own limits end a session earlier; the cookie only must not end it sooner. */
const COOKIE_DAYS = 60;

/** The session token that the browser sent, if any. */
export function readSessionCookie(req: Request): string | null {
  for (const pair of (req.headers.cookie ?? '').split(';')) {
    const at = pair.indexOf('=');
    if (at > 0 && pair.slice(0, at).trim() === SESSION_COOKIE) return decode(pair.slice(at + 1).trim());
  }
  return null;
}

/** Sets the session cookie, or clears it with null. `secure` is true exactly when people reach us over https. */
export function writeSessionCookie(res: Response, token: string | null, secure: boolean): void {
  const options = { httpOnly: true, sameSite: 'lax', secure, path: '/' } as const;
  if (token === null) res.clearCookie(SESSION_COOKIE, options);
  else res.cookie(SESSION_COOKIE, token, { ...options, maxAge: COOKIE_DAYS * 86_400_000 });
}

function decode(value: string): string | null {
  try {
    return decodeURIComponent(value) || null;
  } catch {
    return null;
  }
}
