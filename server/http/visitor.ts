import type { Request, RequestHandler, Response } from 'express';
import type { Me } from '../contracts/auth.ts';
import type { Deps } from '../ports.ts';
import {
  recogniseSession,
  requirePermission,
  type Permission,
} from '../use-cases/recognise-session.ts';
import type { BasketKeeper } from '../use-cases/view-basket.ts';
import { renewSession } from '../use-cases/renew-session.ts';
import { Refusal } from '../use-cases/refusal.ts';
import { hashSecret, newSecret } from '../use-cases/sign-in.ts';
import {
  clearSessionCookies,
  cookieNames,
  readSessionToken,
  writeGuestCookie,
  writeRenewalCookie,
  writeSessionCookie,
  type CookieSettings,
} from './session-cookies.ts';

export interface SignedIn extends Me {
  sessionId: string;
}

const visitors = new WeakMap<Request, SignedIn>();

/** Who is signed in on this request, or null. */
export function signedIn(req: Request): SignedIn | null {
  return visitors.get(req) ?? null;
}

/** Who is signed in; refuses when nobody is. */
export function requireSignedIn(req: Request): SignedIn {
  const me = signedIn(req);
  if (me === null) throw new Refusal('not-signed-in', 'Sign in to do this.');
  return me;
}

/**
 * Recognises who is signed in. The token's signature says which session; the database says whether
 * that session still lives, so a sign-out or a revoked account counts at once. A token that ran out
 * is renewed on the way by the renewal secret.
 */
export function recogniseVisitor(
  deps: Pick<Deps, 'db' | 'clock'>,
  cookies: CookieSettings,
): RequestHandler {
  return async (req, res, next) => {
    const jar = req.cookies as Record<string, unknown>;
    const sessionId = readSessionToken(jar[cookieNames.session], cookies.secret);
    if (sessionId !== null) {
      const me = await recogniseSession(deps, sessionId);
      if (me) visitors.set(req, { ...me, sessionId });
      else clearSessionCookies(res, cookies);
    } else {
      const renewal = jar[cookieNames.renewal];
      if (typeof renewal === 'string') await renew(req, res, renewal);
    }
    next();
  };

  async function renew(req: Request, res: Response, secret: string): Promise<void> {
    const renewed = await renewSession(deps, secret);
    if (renewed === null) {
      clearSessionCookies(res, cookies);
      return;
    }
    const { me, sessionId } = renewed;
    writeSessionCookie(res, cookies, { sessionId, userId: me.id });
    if (renewed.renewalSecret !== null) {
      writeRenewalCookie(res, cookies, renewed.renewalSecret, renewed.expiresAt, deps.clock.now());
    }
    visitors.set(req, { ...me, sessionId });
  }
}

/** Lets only those through who hold a permission: 401 for nobody, 403 for the wrong role. */
export function guard(permission: Permission): RequestHandler {
  return (req, _res, next) => {
    requirePermission(signedIn(req), permission);
    next();
  };
}

/** Refuses addresses with a zero byte in them: no text of the shop's can hold one. */
export const readableAddress: RequestHandler = (req, _res, next) => {
  if (req.url.includes('%00')) {
    throw new Refusal('unreadable-request', 'The address holds a zero byte (%00); remove it.');
  }
  next();
};

const stateChanging = new Set(['POST', 'PUT', 'PATCH', 'DELETE']);

/**
 * Refuses state-changing calls that a browser made from another site: the browser itself says so in
 * Sec-Fetch-Site or Origin. Programs that send neither carry no cookies of anybody else's.
 */
export const sameOriginOnly: RequestHandler = (req, _res, next) => {
  if (!stateChanging.has(req.method)) return next();
  const site = req.get('sec-fetch-site');
  const origin = req.get('origin');
  const foreign =
    (site !== undefined && site !== 'same-origin' && site !== 'none') ||
    (origin !== undefined && originHost(origin) !== req.get('host'));
  if (foreign) throw new Refusal('not-allowed', 'This call must come from the shop’s own pages.');
  next();
};

function originHost(origin: string): string | null {
  try {
    return new URL(origin).host;
  } catch {
    return null;
  }
}

/** Hash of the guest's basket key, or null before there is one. */
export function guestKeyHash(req: Request): string | null {
  const key = (req.cookies as Record<string, unknown>)[cookieNames.guest];
  return typeof key === 'string' && key.length >= 20 ? hashSecret(key) : null;
}

/** Whose basket this request means, or null when a guest has none yet. */
export function basketKeeper(req: Request): BasketKeeper | null {
  const me = signedIn(req);
  if (me !== null) return { userId: me.id };
  const hash = guestKeyHash(req);
  return hash === null ? null : { guestKeyHash: hash };
}

/** Whose basket; a guest without one gets a key. */
export function openBasketKeeper(
  req: Request,
  res: Response,
  cookies: CookieSettings,
): BasketKeeper {
  const known = basketKeeper(req);
  if (known !== null) return known;
  const key = newSecret();
  writeGuestCookie(res, cookies, key);
  return { guestKeyHash: hashSecret(key) };
}
