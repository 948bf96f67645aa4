import type { Me } from '../contracts/auth.ts';
import { may, type Permission } from '../domain/permissions.ts';
import type { Deps } from '../ports.ts';
import type { Database } from '../store/connection.ts';
import { findSessionUser } from '../store/people.ts';
import { Refusal } from './refusal.ts';

/** The person behind a live session, or null once it was ended, ran out, or its user left. */
export async function recogniseSession(
  deps: Pick<Deps, 'clock'> & { db: Database },
  sessionId: string,
): Promise<Me | null> {
  const user = await findSessionUser(deps.db, sessionId, deps.clock.now());
  if (user === null) return null;
  const { id, email, name, role } = user;
  return { id, email, name, role };
}

/** Lets only somebody through who holds a permission: refuses nobody and the wrong role differently. */
export function requirePermission(me: Me | null, permission: Permission): void {
  if (me === null) throw new Refusal('not-signed-in', 'Sign in to do this.');
  if (!may(me.role, permission)) {
    throw new Refusal('not-allowed', `This needs another role than ${me.role}.`);
  }
}

export type { Permission };
