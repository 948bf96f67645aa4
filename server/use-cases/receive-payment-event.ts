import type { Deps } from '../ports.ts';
import { addJob } from '../store/mail-outbox.ts';
import { keepPaymentEvent } from '../store/payments.ts';
import { inTransaction } from '../store/transaction.ts';

/**
 * Checks an event's signature, keeps it under its own id and queues it; the work is done by a job,
 * so the payment service gets its answer at once. A known event changes nothing.
 */
export async function receivePaymentEvent(
  deps: Pick<Deps, 'db' | 'payments'>,
  rawBody: Buffer,
  signature: string,
): Promise<void> {
  const event = deps.payments.readEvent(rawBody, signature);
  await inTransaction(deps.db, async (trx) => {
    if (await keepPaymentEvent(trx, event)) {
      await addJob(trx, 'apply-payment-event', { eventId: event.id }, `event-${event.id}`);
    }
  });
}
