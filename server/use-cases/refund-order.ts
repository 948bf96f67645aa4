import { createHash } from 'node:crypto';
import { refundMail } from '../domain/order-mail.ts';
import { nextStatus } from '../domain/order-state.ts';
import { money } from '../domain/money.ts';
import { PaymentRefused, type Deps } from '../ports.ts';
import { writeAudit } from '../store/audit.ts';
import type { Database } from '../store/connection.ts';
import { queueMail } from '../store/mail-outbox.ts';
import {
  addOrderEvent,
  lockOrder,
  lockOrderById,
  setStatus,
  type OrderRow,
} from '../store/orders.ts';
import {
  addRefund,
  findPaymentByIntent,
  paymentsOfOrder,
  refundsOfOrder,
  setPaymentStatus,
  settleRefund,
  type PaymentRow,
} from '../store/payments.ts';
import { shopSettings } from '../store/settings.ts';
import { moveReservations, type Actor } from '../store/stock.ts';
import { inTransaction } from '../store/transaction.ts';
import { Refusal } from './refusal.ts';

/** What may still be refunded of an order, in minor units. */
export async function refundableMinor(db: Database, orderId: number): Promise<number> {
  const payments = await paymentsOfOrder(db, orderId);
  const refunds = await refundsOfOrder(db, orderId);
  const captured = payments
    .filter((payment) => payment.status === 'captured' || payment.status === 'refunded')
    .reduce((sum, payment) => sum + payment.amountMinor, 0);
  const given = refunds
    .filter((refund) => refund.status !== 'failed')
    .reduce((sum, refund) => sum + refund.amountMinor, 0);
  return captured - given;
}

/**
 * Refunds an order in full. The intention is written down first, then the payment service is asked
 * under a key of its own, so a crash in between repeats the same refund and never a second one. Parts
 * still on the shelf are free again; shipped parts stay gone.
 */
export async function refundOrder(
  deps: Deps,
  actor: Actor,
  ref: string,
  reason: string,
): Promise<void> {
  const asked = await inTransaction(deps.db, async (trx) => {
    const order = await lockOrder(trx, ref);
    if (order === null) throw new Refusal('not-found', `There is no order ${ref}.`);
    const step = nextStatus(order.status, 'refund');
    const payment = (await paymentsOfOrder(trx, order.id)).find((one) => one.status === 'captured');
    if (step.kind === 'refused' || !payment?.intentId) {
      const why = step.kind === 'refused' ? step.reason : 'No payment was captured for it.';
      throw new Refusal('wrong-state', `${why} There is nothing to refund.`);
    }
    // A refusal is remembered under its key at the service, so a new try needs a new one.
    const tries = (await refundsOfOrder(trx, order.id)).filter(
      (one) => one.status === 'failed',
    ).length;
    const digest = createHash('sha256').update(payment.sessionId).digest('hex').slice(0, 24);
    const key = `refund-${digest}-${tries}`;
    const refundId = await addRefund(trx, {
      paymentId: payment.id,
      requestKey: key,
      amountMinor: payment.amountMinor,
      reason,
      actorName: actor.name,
    });
    return { refundId, key, intentId: payment.intentId, amountMinor: payment.amountMinor };
  });
  try {
    const answer = await deps.payments.refund(asked);
    await finishRefund(deps, actor, ref, reason, { ...asked, serviceId: answer.refundId });
  } catch (error) {
    if (!(error instanceof PaymentRefused)) throw error;
    await settleRefund(deps.db, asked.refundId, { status: 'failed', refundId: null });
    throw new Refusal(
      'payment-refused',
      `The payment service refused the refund: ${error.message}`,
    );
  }
}

async function finishRefund(
  deps: Deps,
  actor: Actor,
  ref: string,
  reason: string,
  refund: { refundId: number; serviceId: string; amountMinor: number },
): Promise<void> {
  await inTransaction(deps.db, async (trx) => {
    const order = await lockOrder(trx, ref);
    if (order === null) throw new Refusal('not-found', `There is no order ${ref}.`);
    await settleRefund(trx, refund.refundId, { status: 'done', refundId: refund.serviceId });
    const payment = (await paymentsOfOrder(trx, order.id)).find((one) => one.status === 'captured');
    // Asked for twice at once, the service refunds once; the second finds it closed and noted.
    if (!payment) return;
    await closeRefunded(deps, trx, order, payment, `Refunded in full: ${reason}`, actor.name);
    await writeAudit(trx, {
      at: deps.clock.now(),
      actor,
      action: 'refund order',
      subjectKind: 'order',
      subjectId: ref,
      before: { status: order.status },
      after: { status: 'refunded', amount: money(refund.amountMinor) },
      note: reason,
    });
  });
}

async function closeRefunded(
  deps: Pick<Deps, 'clock'>,
  trx: Database,
  order: OrderRow,
  payment: PaymentRow,
  what: string,
  who: string,
): Promise<void> {
  await setPaymentStatus(trx, payment.id, 'refunded');
  const step = nextStatus(order.status, 'refund');
  if (step.kind === 'refused') return;
  // Frees what is still promised, on hold too; shipped parts are no longer.
  await moveReservations(trx, order.id, 'released');
  await setStatus(trx, order.id, { status: step.to, claimedBy: null });
  await addOrderEvent(trx, order.id, {
    at: deps.clock.now(),
    who,
    what,
    from: order.status,
    to: step.to,
  });
  await queueMail(trx, {
    messageKey: `refund-${order.ref}`,
    orderId: order.id,
    recipient: order.email,
    ...refundMail({ shop: await shopSettings(trx), order, amount: money(payment.amountMinor) }),
  });
}

/** Takes note of a refund made at the payment service itself; one made here is known already. */
export async function noteRefundByService(
  deps: Pick<Deps, 'db' | 'clock'>,
  refund: { intentId: string; refundedMinor: number; wholly: boolean },
): Promise<string> {
  const known = await findPaymentByIntent(deps.db, refund.intentId);
  if (known === null) return 'not ours';
  return inTransaction(deps.db, async (trx) => {
    const order = await lockOrderById(trx, known.orderId);
    const payment = await findPaymentByIntent(trx, refund.intentId);
    if (order === null || payment === null) return 'not ours';
    if (payment.status === 'refunded' || !refund.wholly) return 'nothing to do';
    const ours = (await refundsOfOrder(trx, order.id)).some((one) => one.status !== 'failed');
    if (ours) return 'being refunded here';
    await closeRefunded(deps, trx, order, payment, 'Refunded at the payment service', 'Payment');
    return 'refunded';
  });
}
