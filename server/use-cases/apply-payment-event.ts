import type { Deps } from '../ports.ts';
import { lockPaymentEvent, markEventApplied } from '../store/payments.ts';
import { inTransaction } from '../store/transaction.ts';
import { settleCheckout } from './settle-checkout.ts';
import { noteRefundByService } from './refund-order.ts';

/** Acts on a kept event once. Throws when the payment service cannot be asked; the queue retries. */
export async function applyPaymentEvent(
  deps: Pick<Deps, 'db' | 'clock' | 'payments' | 'signer' | 'publicUrl'>,
  eventId: string,
): Promise<void> {
  const event = await inTransaction(deps.db, (trx) => lockPaymentEvent(trx, eventId));
  if (event === null) return;
  const meaning = deps.payments.interpret(event);
  let outcome = 'nothing to do';
  if (meaning.kind === 'checkout-ended') outcome = await settleCheckout(deps, meaning.sessionId);
  if (meaning.kind === 'refunded') outcome = await noteRefundByService(deps, meaning);
  await markEventApplied(deps.db, eventId, outcome, deps.clock.now());
}
