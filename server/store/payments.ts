import type { Database } from './connection.ts';

export type PaymentStatus = 'open' | 'captured' | 'expired' | 'refunded';

export interface PaymentRow {
  id: number;
  orderId: number;
  sessionId: string;
  paymentUrl: string;
  intentId: string | null;
  amountMinor: number;
  status: PaymentStatus;
  createdAt: Date;
}

const paymentColumns = [
  'id',
  'order_id as orderId',
  'session_id as sessionId',
  'payment_url as paymentUrl',
  'intent_id as intentId',
  'amount_minor as amountMinor',
  'status',
  'created_at as createdAt',
];

/** Records the payment page opened for an order. */
export async function addPayment(
  db: Database,
  payment: { orderId: number; sessionId: string; paymentUrl: string; amountMinor: number },
): Promise<void> {
  await db('payments').insert({
    order_id: payment.orderId,
    session_id: payment.sessionId,
    payment_url: payment.paymentUrl,
    amount_minor: payment.amountMinor,
    currency: 'EUR',
    status: 'open',
  });
}

/** The payments of an order, newest first. */
export async function paymentsOfOrder(db: Database, orderId: number): Promise<PaymentRow[]> {
  return db('payments').where({ order_id: orderId }).orderBy('id', 'desc').select(paymentColumns);
}

/** The payment of a checkout session, or null when the shop did not open it. */
export async function findPaymentBySession(
  db: Database,
  sessionId: string,
): Promise<PaymentRow | null> {
  return (await db('payments').where({ session_id: sessionId }).first(paymentColumns)) ?? null;
}

/** The payment behind a payment intent, or null. */
export async function findPaymentByIntent(
  db: Database,
  intentId: string,
): Promise<PaymentRow | null> {
  return (await db('payments').where({ intent_id: intentId }).first(paymentColumns)) ?? null;
}

/** Marks a payment as captured by an intent. */
export async function markCaptured(
  db: Database,
  paymentId: number,
  intentId: string,
  at: Date,
): Promise<void> {
  await db('payments')
    .where({ id: paymentId })
    .update({ status: 'captured', intent_id: intentId, captured_at: at });
}

/** Marks a payment as expired or refunded. */
export async function setPaymentStatus(
  db: Database,
  paymentId: number,
  status: 'expired' | 'refunded',
): Promise<void> {
  await db('payments').where({ id: paymentId }).update({ status });
}

/**
 * Keeps an event of the payment service under its own id; false when that id is already known, so
 * that a repeated delivery changes nothing.
 */
export async function keepPaymentEvent(
  db: Database,
  event: { id: string; type: string; payload: unknown },
): Promise<boolean> {
  const rows = await db('payment_events')
    .insert({ id: event.id, type: event.type, payload: JSON.stringify(event.payload) })
    .onConflict('id')
    .ignore()
    .returning('id');
  return rows.length === 1;
}

export interface PaymentEventRow {
  id: string;
  type: string;
  payload: unknown;
}

/** Locks an event that was not applied yet; null otherwise. */
export async function lockPaymentEvent(db: Database, id: string): Promise<PaymentEventRow | null> {
  const row = await db('payment_events')
    .where({ id })
    .whereNull('applied_at')
    .forUpdate()
    .first('id', 'type', 'payload');
  return row ?? null;
}

/** Notes what an event led to. */
export async function markEventApplied(
  db: Database,
  id: string,
  outcome: string,
  at: Date,
): Promise<void> {
  await db('payment_events').where({ id }).update({ applied_at: at, outcome });
}

export interface RefundRow {
  id: number;
  paymentId: number;
  refundId: string | null;
  amountMinor: number;
  status: 'asked' | 'done' | 'failed';
  reason: string;
  actorName: string;
  createdAt: Date;
}

const refundColumns = [
  'refunds.id',
  'refunds.payment_id as paymentId',
  'refunds.refund_id as refundId',
  'refunds.amount_minor as amountMinor',
  'refunds.status',
  'refunds.reason',
  'refunds.actor_name as actorName',
  'refunds.created_at as createdAt',
];

/** Writes down a refund before the payment service is asked; the same request key is written once. */
export async function addRefund(
  db: Database,
  refund: {
    paymentId: number;
    requestKey: string;
    amountMinor: number;
    reason: string;
    actorName: string;
  },
): Promise<number> {
  const [row] = await db('refunds')
    .insert({
      payment_id: refund.paymentId,
      request_key: refund.requestKey,
      amount_minor: refund.amountMinor,
      status: 'asked',
      reason: refund.reason,
      actor_name: refund.actorName,
    })
    .onConflict('request_key')
    .merge({ status: 'asked' })
    .returning('id');
  return row.id;
}

/** Notes how a refund ended. */
export async function settleRefund(
  db: Database,
  id: number,
  end: { status: 'done' | 'failed'; refundId: string | null },
): Promise<void> {
  await db('refunds').where({ id }).update({ status: end.status, refund_id: end.refundId });
}

/** The refunds of an order, oldest first. */
export async function refundsOfOrder(db: Database, orderId: number): Promise<RefundRow[]> {
  return db('refunds')
    .join('payments', 'payments.id', 'refunds.payment_id')
    .where('payments.order_id', orderId)
    .orderBy('refunds.id')
    .select(refundColumns);
}
