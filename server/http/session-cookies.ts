import type { CookieOptions, Response } from 'express';
import jwt from 'jsonwebtoken';

export const cookieNames = {
  session: 'tockwell_session',
  renewal: 'tockwell_renewal',
  guest: 'tockwell_basket',
} as const;

/** The signed token is good for this long; then the renewal secret must be shown. */
export const tokenSeconds = 600;

export interface CookieSettings {
  secret: string;
  secure: boolean;
}

function options({ secure }: CookieSettings, maxAgeMs: number, path = '/'): CookieOptions {
  return { httpOnly: true, sameSite: 'lax', secure, path, maxAge: maxAgeMs };
}

/** Puts the short-lived signed session token into its cookie. */
export function writeSessionCookie(
  res: Response,
  settings: CookieSettings,
  session: { sessionId: string; userId: string },
): void {
  const token = jwt.sign({ sid: session.sessionId }, settings.secret, {
    subject: session.userId,
    expiresIn: tokenSeconds,
    algorithm: 'HS256',
  });
  res.cookie(cookieNames.session, token, options(settings, tokenSeconds * 1000));
}

/** Puts the renewal secret into its cookie, for as long as the session may live. */
export function writeRenewalCookie(
  res: Response,
  settings: CookieSettings,
  secret: string,
  expiresAt: Date,
  now: Date,
): void {
  const left = Math.max(0, expiresAt.getTime() - now.getTime());
  res.cookie(cookieNames.renewal, secret, options(settings, left, '/api'));
}

/** Takes both session cookies away. */
export function clearSessionCookies(res: Response, settings: CookieSettings): void {
  res.clearCookie(cookieNames.session, options(settings, 0));
  res.clearCookie(cookieNames.renewal, options(settings, 0, '/api'));
}

/** Gives a guest's basket its key, good for 30 days. */
export function writeGuestCookie(res: Response, settings: CookieSettings, key: string): void {
  res.cookie(cookieNames.guest, key, options(settings, 30 * 86_400_000));
}

/** The session id inside a signed token, or null when it is forged, altered or has run out. */
export function readSessionToken(token: unknown, secret: string): string | null {
  if (typeof token !== 'string') return null;
  try {
    const claims = jwt.verify(token, secret, { algorithms: ['HS256'] });
    return typeof claims === 'object' && typeof claims.sid === 'string' ? claims.sid : null;
  } catch {
    return null;
  }
}
