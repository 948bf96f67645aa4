import { PaymentRefused, type Deps } from '../ports.ts';
import { overdueOrders } from '../store/orders.ts';
import { paymentsOfOrder } from '../store/payments.ts';
import { cancelUnpaidOrder } from './cancel-unpaid-order.ts';
import { settleCheckout } from './settle-checkout.ts';

const ordersAtOnce = 50;

/**
 * Ends orders whose time to pay ran out. The payment page is closed first and its state asked for,
 * so a payment made in the last second is honoured and none can be made afterwards. Returns how many
 * orders were looked at.
 */
export async function releaseExpiredReservations(
  deps: Pick<Deps, 'db' | 'clock' | 'payments' | 'signer' | 'publicUrl'>,
): Promise<number> {
  const overdue = await overdueOrders(deps.db, deps.clock.now(), ordersAtOnce);
  for (const order of overdue) {
    const [payment] = await paymentsOfOrder(deps.db, order.id);
    if (!payment) {
      await cancelUnpaidOrder(deps, order.ref, 'The payment page was never opened');
      continue;
    }
    try {
      await deps.payments.closeCheckout(payment.sessionId);
      await settleCheckout(deps, payment.sessionId);
    } catch (error) {
      // The payment service is away: leave the order for the next round rather than guess.
      if (!(error instanceof PaymentRefused)) throw error;
    }
  }
  return overdue.length;
}
