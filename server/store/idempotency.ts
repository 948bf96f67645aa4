import type { Database } from './connection.ts';

export interface KeptAnswer {
  requestHash: string;
  status: number | null;
  body: unknown;
}

/** A claim without an answer this old was left by a process that died. */
const abandonedAfter = "interval '2 minutes'";

/**
 * Claims a key for a request. Returns null when the key is new (or was abandoned) and now ours, or
 * what is kept under it: its status is null while another request still works on the answer.
 */
export async function claimKey(
  db: Database,
  scope: string,
  key: string,
  requestHash: string,
): Promise<KeptAnswer | null> {
  const { rows } = await db.raw(
    `insert into idempotency_keys (scope, key, request_hash) values (?, ?, ?)
     on conflict (scope, key) do update set created_at = now()
       where idempotency_keys.status is null and idempotency_keys.request_hash = excluded.request_hash
         and idempotency_keys.created_at < now() - ${abandonedAfter}
     returning key`,
    [scope, key, requestHash],
  );
  if (rows.length > 0) return null;
  const row = await db('idempotency_keys')
    .where({ scope, key })
    .first('request_hash', 'status', 'body');
  return row ? { requestHash: row.request_hash, status: row.status, body: row.body } : null;
}

/** Keeps the answer given under a key. */
export async function keepAnswer(
  db: Database,
  scope: string,
  key: string,
  answer: { status: number; body: unknown },
): Promise<void> {
  await db('idempotency_keys')
    .where({ scope, key })
    .update({ status: answer.status, body: JSON.stringify(answer.body) });
}

/** Frees a key whose request failed, so that it may be tried again. */
export async function freeKey(db: Database, scope: string, key: string): Promise<void> {
  await db('idempotency_keys').where({ scope, key }).whereNull('status').delete();
}
