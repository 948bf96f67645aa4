import type { Role } from '../contracts/auth.ts';
import type { Database } from './connection.ts';

export interface User {
  id: string;
  email: string;
  name: string;
  role: Role;
  passwordHash: string;
}

const userColumns = ['id', 'email', 'name', 'role', 'password_hash as passwordHash'];

/** The active user with this (lower-case) e-mail address, or null. */
export async function findUserByEmail(db: Database, email: string): Promise<User | null> {
  const row = await db('users').where({ email }).whereNull('deactivated_at').first(userColumns);
  return row ?? null;
}

/** Adds a user; throws the database's unique violation when the address is taken. */
export async function addUser(db: Database, user: Omit<User, 'id'>): Promise<User> {
  const [row] = await db('users')
    .insert({
      email: user.email,
      name: user.name,
      role: user.role,
      password_hash: user.passwordHash,
    })
    .returning(userColumns);
  return row;
}

/** Opens a session that ends at `expiresAt` whatever happens. */
export async function addSession(
  db: Database,
  session: { userId: string; renewalHash: string; now: Date; expiresAt: Date },
): Promise<string> {
  const [row] = await db('sessions')
    .insert({
      user_id: session.userId,
      renewal_hash: session.renewalHash,
      created_at: session.now,
      renewed_at: session.now,
      expires_at: session.expiresAt,
    })
    .returning('id');
  return row.id;
}

/** The user behind a live session, or null once it was revoked, ran out, or its user left. */
export async function findSessionUser(
  db: Database,
  sessionId: string,
  now: Date,
): Promise<User | null> {
  const row = await liveSessions(db, now)
    .where('sessions.id', sessionId)
    .first(userColumns.map((column) => `users.${column}`));
  return row ?? null;
}

function liveSessions(db: Database, now: Date) {
  return db('sessions')
    .join('users', 'users.id', 'sessions.user_id')
    .whereNull('sessions.revoked_at')
    .whereNull('users.deactivated_at')
    .where('sessions.expires_at', '>', now);
}

export interface RenewableSession {
  id: string;
  expiresAt: Date;
  /** True when the presented secret is the one before the newest. */
  superseded: boolean;
  renewedAt: Date;
}

/** The live session whose newest or previous renewal secret hashes to `renewalHash`, locked. */
export async function lockSessionByRenewal(
  db: Database,
  renewalHash: string,
  now: Date,
): Promise<RenewableSession | null> {
  const row = await liveSessions(db, now)
    .where((either) => {
      either
        .where('sessions.renewal_hash', renewalHash)
        .orWhere('sessions.previous_renewal_hash', renewalHash);
    })
    .forUpdate('sessions')
    .first('sessions.id', 'sessions.expires_at', 'sessions.renewal_hash', 'sessions.renewed_at');
  if (!row) return null;
  return {
    id: row.id,
    expiresAt: row.expires_at,
    superseded: row.renewal_hash !== renewalHash,
    renewedAt: row.renewed_at,
  };
}

/** Puts a new renewal secret in place of the old one, which is remembered. */
export async function rotateRenewal(
  db: Database,
  sessionId: string,
  renewalHash: string,
  now: Date,
): Promise<void> {
  await db('sessions')
    .where({ id: sessionId })
    .update({
      previous_renewal_hash: db.ref('renewal_hash'),
      renewal_hash: renewalHash,
      renewed_at: now,
    });
}

/** Ends a session at once. */
export async function revokeSession(db: Database, sessionId: string, now: Date): Promise<void> {
  await db('sessions').where({ id: sessionId }).whereNull('revoked_at').update({ revoked_at: now });
}

/** Remembers a failed sign-in, for the limits that all server processes share. */
export async function noteSignInFailure(
  db: Database,
  failure: { email: string; address: string; at: Date },
): Promise<void> {
  await db('sign_in_failures').insert(failure);
}

/** Failed sign-ins since a moment, for an e-mail address and for a network address. */
export async function countSignInFailures(
  db: Database,
  who: { email: string; address: string; since: Date },
): Promise<{ byEmail: number; byAddress: number }> {
  const [row] = (await db('sign_in_failures')
    .where('at', '>', who.since)
    .select(
      db.raw('count(*) filter (where email = ?) as "byEmail"', [who.email]),
      db.raw('count(*) filter (where address = ?) as "byAddress"', [who.address]),
    )) as [{ byEmail: number; byAddress: number }];
  return row;
}

/** Forgets an account's failures after it signed in. */
export async function forgetSignInFailures(db: Database, email: string): Promise<void> {
  await db('sign_in_failures').where({ email }).delete();
}
