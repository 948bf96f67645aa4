import type { Deps } from '../ports.ts';
import type { Me } from '../contracts/auth.ts';
import { lockSessionByRenewal, revokeSession, rotateRenewal } from '../store/people.ts';
import { inTransaction } from '../store/transaction.ts';
import { recogniseSession } from './recognise-session.ts';
import { hashSecret, newSecret } from './sign-in.ts';

/** Requests sent together may still carry the previous secret for this long. */
const overlapSeconds = 60;

export interface RenewedSession {
  me: Me;
  sessionId: string;
  /** The next renewal secret; null when the newest is already with the browser. */
  renewalSecret: string | null;
  expiresAt: Date;
}

/**
 * Renews a session whose short-lived token ran out. The secret changes each time; an old one that
 * turns up later than a minute after its successor was stolen or replayed, and ends the session.
 */
export async function renewSession(
  deps: Pick<Deps, 'db' | 'clock'>,
  presented: string,
): Promise<RenewedSession | null> {
  const now = deps.clock.now();
  return inTransaction(deps.db, async (trx) => {
    const session = await lockSessionByRenewal(trx, hashSecret(presented), now);
    if (session === null) return null;
    const age = (now.getTime() - session.renewedAt.getTime()) / 1000;
    if (session.superseded && age > overlapSeconds) {
      await revokeSession(trx, session.id, now);
      return null;
    }
    const me = await recogniseSession({ ...deps, db: trx }, session.id);
    if (me === null) return null;
    const renewed = { me, sessionId: session.id, expiresAt: session.expiresAt };
    if (session.superseded) return { ...renewed, renewalSecret: null };
    const renewalSecret = newSecret();
    await rotateRenewal(trx, session.id, hashSecret(renewalSecret), now);
    return { ...renewed, renewalSecret };
  });
}
