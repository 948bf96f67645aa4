import type { Deps } from '../ports.ts';
import { revokeSession } from '../store/people.ts';

/** Ends a session at once, wherever its token is. */
export function signOut(deps: Pick<Deps, 'db' | 'clock'>, sessionId: string): Promise<void> {
  return revokeSession(deps.db, sessionId, deps.clock.now());
}
