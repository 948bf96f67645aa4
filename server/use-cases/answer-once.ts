import { createHash } from 'node:crypto';
import type { Deps } from '../ports.ts';
import { claimKey, freeKey, keepAnswer } from '../store/idempotency.ts';
import { Refusal } from './refusal.ts';

export interface Answer {
  status: number;
  body: unknown;
}

/**
 * Does a piece of work once under a key and gives the same answer again afterwards. Another request
 * under the same key is refused; a failed try frees the key.
 */
export async function answerOnce(
  deps: Pick<Deps, 'db'>,
  request: { scope: string; key: string; body: unknown },
  work: () => Promise<Answer>,
): Promise<Answer> {
  const { scope, key } = request;
  if (key.length < 8 || key.length > 200) {
    throw new Refusal('invalid', 'The Idempotency-Key needs 8 to 200 characters.');
  }
  const hash = createHash('sha256').update(writtenOut(request.body)).digest('hex');
  const kept = await claimKey(deps.db, scope, key, hash);
  if (kept !== null) {
    if (kept.requestHash !== hash) {
      throw new Refusal(
        'idempotency-mismatch',
        'This Idempotency-Key was used for another request; take a new one.',
      );
    }
    if (kept.status === null) {
      throw new Refusal(
        'conflict',
        'The same request is still being worked on; ask again in a moment.',
      );
    }
    return { status: kept.status, body: kept.body };
  }
  try {
    const answer = await work();
    await keepAnswer(deps.db, scope, key, answer);
    return answer;
  } catch (error) {
    await freeKey(deps.db, scope, key);
    throw error;
  }
}

function writtenOut(body: unknown): string {
  try {
    return JSON.stringify(body ?? null);
  } catch (error) {
    // A body nested tens of thousands deep can be read, but not written: the stack ends.
    if (!(error instanceof RangeError)) throw error;
    throw new Refusal('invalid', 'The body is nested too deeply; send it flat.');
  }
}
