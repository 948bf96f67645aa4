import { nextStatus } from '../domain/order-state.ts';
import { confirmationMail } from '../domain/order-mail.ts';
import { shipBy } from '../domain/ship-by.ts';
import { allocate } from '../domain/stock.ts';
import { currency } from '../domain/money.ts';
import type { CheckoutState, Deps } from '../ports.ts';
import type { Database } from '../store/connection.ts';
import { queueMail } from '../store/mail-outbox.ts';
import {
  addOrderEvent,
  linesOfOrders,
  lockOrderById,
  partsOfOrder,
  setStatus,
  type OrderRow,
} from '../store/orders.ts';
import {
  findPaymentBySession,
  markCaptured,
  setPaymentStatus,
  type PaymentRow,
} from '../store/payments.ts';
import { forgetReleased, holdShares, lockLotsOfParts, moveReservations } from '../store/stock.ts';
import { countryName, shopSettings } from '../store/settings.ts';
import { inTransaction } from '../store/transaction.ts';

type SettleDeps = Pick<Deps, 'db' | 'clock' | 'payments' | 'signer' | 'publicUrl'>;

/**
 * Brings an order in line with what the payment service says of its checkout. Asks for the present
 * state instead of trusting an event's, so duplicate, late and disordered events all end the same.
 * Returns what it led to, for the record.
 */
export async function settleCheckout(deps: SettleDeps, sessionId: string): Promise<string> {
  const known = await findPaymentBySession(deps.db, sessionId);
  if (known === null) return 'not ours';
  const state = await deps.payments.checkoutState(sessionId);
  return inTransaction(deps.db, async (trx) => {
    const order = await lockOrderById(trx, known.orderId);
    const payment = await findPaymentBySession(trx, sessionId);
    if (order === null || payment === null) return 'not ours';
    if (state.paid && state.intentId !== null) return settlePaid(deps, trx, order, payment, state);
    if (state.status === 'expired') return settleExpired(deps, trx, order, payment);
    return 'still open';
  });
}

async function settlePaid(
  deps: SettleDeps,
  trx: Database,
  order: OrderRow,
  payment: PaymentRow,
  state: CheckoutState,
): Promise<string> {
  if (payment.status === 'captured' || payment.status === 'refunded') return 'already settled';
  const at = deps.clock.now();
  await markCaptured(trx, payment.id, state.intentId!, at);
  if (state.amountMinor !== order.totalMinor || state.currency !== currency) {
    return hold(trx, order, at, 'Paid another amount than the order’s total; the owner decides');
  }
  const step = nextStatus(order.status, 'pay');
  if (step.kind === 'refused') {
    return hold(trx, order, at, `Paid although ${step.reason.toLowerCase()} The owner decides`);
  }
  // Paid after the reservation lapsed: the parts may still be there.
  if (order.status === 'cancelled' && !(await promiseAgain(trx, order.id))) {
    return hold(
      trx,
      order,
      at,
      'Paid after the reservation lapsed and the parts are gone; the owner decides',
    );
  }
  await moveReservations(trx, order.id, 'allocated');
  const leave = shipBy(at);
  await setStatus(trx, order.id, {
    status: step.to,
    paidAt: at,
    shipBy: leave,
    reservedUntil: null,
  });
  await addOrderEvent(trx, order.id, {
    at,
    who: 'Payment',
    what: 'Paid by card; the parts are set aside',
    from: order.status,
    to: step.to,
  });
  const mail = confirmationMail({
    shop: await shopSettings(trx),
    order: { ...order, shipBy: leave },
    lines: await linesOfOrders(trx, [order.id]),
    countryName: await countryName(trx, order.shipTo.country),
    link: `${deps.publicUrl}/orders/${order.ref}?token=${deps.signer.orderToken(order.ref)}`,
  });
  await queueMail(trx, {
    messageKey: `confirmation-${order.ref}`,
    orderId: order.id,
    recipient: order.email,
    ...mail,
  });
  return 'paid';
}

async function promiseAgain(trx: Database, orderId: number): Promise<boolean> {
  const demands = await partsOfOrder(trx, orderId);
  const lots = await lockLotsOfParts(trx, [...new Set(demands.map((demand) => demand.partId))]);
  const allocation = allocate(demands, lots);
  if (allocation.kind === 'short') return false;
  await forgetReleased(trx, orderId);
  await holdShares(trx, orderId, allocation.shares);
  return true;
}

async function hold(trx: Database, order: OrderRow, at: Date, what: string): Promise<string> {
  const step = nextStatus(order.status, 'hold');
  if (step.kind === 'moved')
    await setStatus(trx, order.id, { status: step.to, reservedUntil: null });
  await addOrderEvent(trx, order.id, {
    at,
    who: 'Payment',
    what,
    from: order.status,
    to: step.kind === 'moved' ? step.to : order.status,
  });
  return 'on hold';
}

async function settleExpired(
  deps: SettleDeps,
  trx: Database,
  order: OrderRow,
  payment: PaymentRow,
): Promise<string> {
  if (payment.status === 'open') await setPaymentStatus(trx, payment.id, 'expired');
  const step = nextStatus(order.status, 'expire');
  if (step.kind === 'refused') return 'nothing to do';
  await moveReservations(trx, order.id, 'released');
  await setStatus(trx, order.id, { status: step.to, reservedUntil: null });
  await addOrderEvent(trx, order.id, {
    at: deps.clock.now(),
    who: 'Payment',
    what: 'Not paid in time; the parts are back on the shelf',
    from: order.status,
    to: step.to,
  });
  return 'expired';
}
