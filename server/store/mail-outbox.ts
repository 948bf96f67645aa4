import type { Database } from './connection.ts';

export interface OutboxMail {
  messageKey: string;
  orderId: number | null;
  recipient: string;
  subject: string;
  text: string;
  html: string;
}

/**
 * Puts a mail in the outbox and asks the job queue to send it, both in the caller's transaction:
 * nothing is sent for work that was rolled back. A mail with the same key is put in only once.
 */
export async function queueMail(db: Database, mail: OutboxMail): Promise<void> {
  const [row] = await db('mail_outbox')
    .insert({
      message_key: mail.messageKey,
      order_id: mail.orderId,
      recipient: mail.recipient,
      subject: mail.subject,
      body_text: mail.text,
      body_html: mail.html,
    })
    .onConflict('message_key')
    .ignore()
    .returning('id');
  if (row) await addJob(db, 'send-mail', { outboxId: row.id }, `mail-${row.id}`);
}

/** Adds a job to the queue inside the caller's transaction; a waiting job of the same key is replaced. */
export async function addJob(
  db: Database,
  task: string,
  payload: Record<string, unknown>,
  jobKey: string,
): Promise<void> {
  await db.raw('select graphile_worker.add_job(?, payload := ?::json, job_key := ?)', [
    task,
    JSON.stringify(payload),
    jobKey,
  ]);
}

export interface WaitingMail {
  id: number;
  messageKey: string;
  recipient: string;
  subject: string;
  text: string;
  html: string;
}

/** Locks a mail that still waits; null when it was sent or another process is sending it. */
export async function lockWaitingMail(db: Database, outboxId: number): Promise<WaitingMail | null> {
  const row = await db('mail_outbox')
    .where({ id: outboxId })
    .whereNull('sent_at')
    .forUpdate()
    .skipLocked()
    .first('id', 'message_key', 'recipient', 'subject', 'body_text', 'body_html');
  if (!row) return null;
  return {
    id: row.id,
    messageKey: row.message_key,
    recipient: row.recipient,
    subject: row.subject,
    text: row.body_text,
    html: row.body_html,
  };
}

/** Marks a mail as sent. */
export async function markSent(db: Database, outboxId: number, at: Date): Promise<void> {
  await db('mail_outbox').where({ id: outboxId }).update({ sent_at: at, last_error: null });
}

/** Notes a failed try; the job queue tries again later. */
export async function noteMailFailure(
  db: Database,
  outboxId: number,
  error: string,
): Promise<void> {
  await db('mail_outbox')
    .where({ id: outboxId })
    .update({ last_error: error.slice(0, 500), attempts: db.raw('attempts + 1') });
}
