import { Router, type Request, type Response } from 'express';
import { signInSchema, signUpSchema, type Me } from '../contracts/auth.ts';
import type { Deps } from '../ports.ts';
import { signIn, signUp, type OpenedSession, type Visitor } from '../use-cases/sign-in.ts';
import { signOut } from '../use-cases/sign-out.ts';
import {
  clearSessionCookies,
  writeRenewalCookie,
  writeSessionCookie,
  type CookieSettings,
} from './session-cookies.ts';
import { guestKeyHash, requireSignedIn, signedIn } from './visitor.ts';

/** Sign-up, sign-in, sign-out, and who is signed in. */
export function authRoutes(deps: Pick<Deps, 'db' | 'clock'>, cookies: CookieSettings): Router {
  const router = Router();
  const visitor = (req: Request): Visitor => ({
    address: req.ip ?? 'unknown',
    guestKeyHash: guestKeyHash(req),
  });
  const welcome = (res: Response, session: OpenedSession): Me => {
    writeSessionCookie(res, cookies, { sessionId: session.sessionId, userId: session.me.id });
    writeRenewalCookie(res, cookies, session.renewalSecret, session.expiresAt, deps.clock.now());
    return session.me;
  };

  router.post('/sign-up', async (req, res) => {
    const session = await signUp(deps, signUpSchema.parse(req.body), visitor(req));
    res.status(201).json(welcome(res, session));
  });

  router.post('/sign-in', async (req, res) => {
    const session = await signIn(deps, signInSchema.parse(req.body), visitor(req));
    res.json(welcome(res, session));
  });

  router.post('/sign-out', async (req, res) => {
    const me = signedIn(req);
    if (me !== null) await signOut(deps, me.sessionId);
    clearSessionCookies(res, cookies);
    res.status(204).end();
  });

  router.get('/me', (req, res) => {
    const { id, email, name, role } = requireSignedIn(req);
    res.json({ id, email, name, role });
  });

  return router;
}
