import type Stripe from 'stripe';
import { invalidRequest, missingResource, refused } from './api-error.ts';
import { makeId } from './ids.ts';
import type { RefundParameters } from './parameters.ts';
import { nowSeconds, record, type Service } from './service.ts';

/** Gives back all or part of a charge, never more than is left of it. */
export function createRefund(service: Service, asked: RefundParameters): Stripe.Refund {
  const charge = chargeFor(service, asked);
  const amount = checkedAmount(charge, asked.amount);
  const refund: Stripe.Refund = {
    id: makeId('re'),
    object: 'refund',
    amount,
    balance_transaction: null,
    charge: charge.id,
    created: nowSeconds(service),
    currency: charge.currency,
    customer: null,
    customer_account: null,
    metadata: asked.metadata ?? {},
    payment_intent: charge.payment_intent,
    payment_method: charge.payment_method,
    reason: asked.reason ?? null,
    receipt_number: null,
    source_transfer_reversal: null,
    status: 'succeeded',
    transfer_reversal: null,
  };
  service.state.refunds[refund.id] = refund;
  charge.amount_refunded += amount;
  charge.refunded = charge.amount_refunded === charge.amount;
  record(service, 'refund.created', refund);
  record(service, 'charge.refunded', charge);
  record(service, 'refund.updated', refund);
  return refund;
}

function chargeFor(service: Service, asked: RefundParameters): Stripe.Charge {
  if (asked.charge !== undefined) {
    const charge = service.state.charges[asked.charge];
    if (!charge) throw missingResource('charge', asked.charge, 'charge');
    return charge;
  }
  if (asked.payment_intent === undefined) {
    const message = 'One of the following params should be provided: payment_intent or charge.';
    throw invalidRequest(message, 'parameter_missing', 'payment_intent');
  }
  const intent = service.state.intents[asked.payment_intent];
  if (!intent) throw missingResource('payment_intent', asked.payment_intent, 'payment_intent');
  const latest = intent.latest_charge;
  const charge = typeof latest === 'string' ? service.state.charges[latest] : undefined;
  if (!charge) {
    throw refused(`${intent.id} has no successful charge to refund.`, null, 'payment_intent');
  }
  return charge;
}

function checkedAmount(charge: Stripe.Charge, asked: number | undefined): number {
  const left = charge.amount - charge.amount_refunded;
  if (left === 0) {
    throw refused(`Charge ${charge.id} has been refunded.`, 'charge_already_refunded');
  }
  const amount = asked ?? left;
  if (amount < 1) {
    const message = 'The amount must be greater than or equal to 1.';
    throw invalidRequest(message, 'parameter_invalid_integer', 'amount');
  }
  if (amount > left) {
    const message = `Refund amount (${amount}) is greater than unrefunded amount on charge (${left}).`;
    throw refused(message, null, 'amount');
  }
  return amount;
}
