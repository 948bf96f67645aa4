import { createHash, randomBytes } from 'node:crypto';
import type { Me, SignIn, SignUp } from '../contracts/auth.ts';
import { commonPassword } from '../domain/passwords.ts';
import type { Deps } from '../ports.ts';
import { basketLines, findBasket, mergeBaskets, openBasket } from '../store/baskets.ts';
import type { Database } from '../store/connection.ts';
import {
  addSession,
  addUser,
  countSignInFailures,
  findUserByEmail,
  forgetSignInFailures,
  noteSignInFailure,
  type User,
} from '../store/people.ts';
import { breaksConstraint, inTransaction } from '../store/transaction.ts';
import { hashPassword, passwordMatches } from './password-hash.ts';
import { Refusal } from './refusal.ts';

const failureWindowMinutes = 15;
const failuresPerEmail = 30;
const failuresPerAddress = 600;
const sessionDays = { customer: 30, packer: 1, owner: 1 } as const;

/** What a browser gets when it signs in. */
export interface OpenedSession {
  me: Me;
  sessionId: string;
  renewalSecret: string;
  expiresAt: Date;
}

export interface Visitor {
  /** Network address the request came from. */
  address: string;
  /** Hash of the guest's basket key, if the browser carries one. */
  guestKeyHash: string | null;
}

/** Hash under which a random secret is stored: it has 256 bits, so a plain digest is enough. */
export function hashSecret(secret: string): string {
  return createHash('sha256').update(secret).digest('base64url');
}

export function newSecret(): string {
  return randomBytes(32).toString('base64url');
}

/** Makes an account for a customer and signs it in. */
export async function signUp(
  deps: Pick<Deps, 'db' | 'clock'>,
  input: SignUp,
  visitor: Visitor,
): Promise<OpenedSession> {
  if (commonPassword(input.password, [input.email, input.name])) {
    throw new Refusal('invalid', 'This password is too easy to guess; choose another.', [
      {
        path: 'password',
        message: 'This password is on the list of easily guessed ones; choose another.',
      },
    ]);
  }
  const passwordHash = await hashPassword(input.password);
  try {
    return await inTransaction(deps.db, async (trx) => {
      const user = await addUser(trx, {
        email: input.email,
        name: input.name,
        role: 'customer',
        passwordHash,
      });
      return openSession(trx, deps.clock.now(), user, visitor);
    });
  } catch (error) {
    if (!breaksConstraint(error, 'users_email_once')) throw error;
    throw new Refusal(
      'invalid',
      'There is already an account for this e-mail address; sign in instead.',
      [
        {
          path: 'email',
          message: 'There is already an account for this address; sign in instead.',
        },
      ],
    );
  }
}

/** Signs a person in. Too many failures for one account or from one address make both wait. */
export async function signIn(
  deps: Pick<Deps, 'db' | 'clock'>,
  input: SignIn,
  visitor: Visitor,
): Promise<OpenedSession> {
  const now = deps.clock.now();
  const since = new Date(now.getTime() - failureWindowMinutes * 60_000);
  const who = { email: input.email, address: visitor.address };
  const failures = await countSignInFailures(deps.db, { ...who, since });
  if (failures.byEmail >= failuresPerEmail || failures.byAddress >= failuresPerAddress) {
    throw new Refusal(
      'too-many-requests',
      'Too many failed sign-ins. Wait a quarter of an hour, then try again.',
    );
  }
  const user = await findUserByEmail(deps.db, input.email);
  const matches = await passwordMatches(input.password, user?.passwordHash ?? null);
  if (user === null || !matches) {
    await noteSignInFailure(deps.db, { ...who, at: now });
    throw new Refusal(
      'wrong-credentials',
      'E-mail address and password do not match. Check both and try again.',
    );
  }
  return inTransaction(deps.db, async (trx) => {
    await forgetSignInFailures(trx, input.email);
    return openSession(trx, now, user, visitor);
  });
}

async function openSession(
  db: Database,
  now: Date,
  user: User,
  visitor: Visitor,
): Promise<OpenedSession> {
  const renewalSecret = newSecret();
  const expiresAt = new Date(now.getTime() + sessionDays[user.role] * 86_400_000);
  const sessionId = await addSession(db, {
    userId: user.id,
    renewalHash: hashSecret(renewalSecret),
    now,
    expiresAt,
  });
  if (visitor.guestKeyHash !== null) await takeOverBasket(db, user.id, visitor.guestKeyHash);
  const { id, email, name, role } = user;
  return { me: { id, email, name, role }, sessionId, renewalSecret, expiresAt };
}

async function takeOverBasket(db: Database, userId: string, guestKeyHash: string): Promise<void> {
  const guestId = await findBasket(db, { guestKeyHash });
  if (guestId === null || (await basketLines(db, guestId)).length === 0) return;
  await mergeBaskets(db, guestId, await openBasket(db, { userId }));
}
