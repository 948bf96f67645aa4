import type { DeskOrder } from '../contracts/desk.ts';
import { money } from '../domain/money.ts';
import type { Deps } from '../ports.ts';
import { findOrder } from '../store/orders.ts';
import { paymentsOfOrder, refundsOfOrder } from '../store/payments.ts';
import { promisedPieces } from '../store/stock.ts';
import { refundableMinor } from './refund-order.ts';
import { Refusal } from './refusal.ts';
import { describeOrder } from './view-order.ts';

/** One order with its payments and what may be refunded. */
export async function viewDeskOrder(deps: Pick<Deps, 'db'>, ref: string): Promise<DeskOrder> {
  const order = await findOrder(deps.db, ref);
  if (order === null) throw new Refusal('not-found', `There is no order ${ref}.`);
  const [base, payments, refunds, refundable, promised] = await Promise.all([
    describeOrder(deps.db, order),
    paymentsOfOrder(deps.db, order.id),
    refundsOfOrder(deps.db, order.id),
    refundableMinor(deps.db, order.id),
    promisedPieces(deps.db, order.id),
  ]);
  return {
    ...base,
    payments: [
      ...payments.map((payment) => ({
        at: payment.createdAt.toISOString(),
        what: 'Card payment',
        amount: money(payment.amountMinor),
        status: payment.status,
        reference: payment.intentId ?? payment.sessionId,
      })),
      ...refunds.map((refund) => ({
        at: refund.createdAt.toISOString(),
        what: `Refund: ${refund.reason} (${refund.actorName})`,
        amount: money(-refund.amountMinor),
        status: refund.status,
        reference: refund.refundId ?? 'asked for',
      })),
    ],
    refundable: money(refundable),
    stockNote:
      promised > 0
        ? 'A refund puts the parts back on the shelf.'
        : 'The parts have left or are free already; a refund moves no stock.',
  };
}
