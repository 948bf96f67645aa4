import type Stripe from 'stripe';
import { cardBrand, type Card, type Decline } from './card.ts';
import { makeId } from './ids.ts';
import { nowSeconds, record, type Service } from './service.ts';
import { unusedCardFields, unusedChargeFields, unusedIntentFields } from './unused-fields.ts';

type IntentStart = Pick<Stripe.PaymentIntent, 'amount' | 'currency' | 'metadata' | 'status'> &
  Partial<Stripe.PaymentIntent>;

/** Starts a payment intent and tells of it. */
export function openIntent(service: Service, start: IntentStart): Stripe.PaymentIntent {
  const id = makeId('pi');
  const intent: Stripe.PaymentIntent = {
    ...unusedIntentFields,
    id,
    client_secret: `${id}_secret_${makeId('x').slice(2)}`,
    created: nowSeconds(service),
    ...start,
  };
  service.state.intents[id] = intent;
  record(service, 'payment_intent.created', intent);
  return intent;
}

/** Takes the money: the intent has succeeded and its charge stands. */
export function settleIntent(
  service: Service,
  intent: Stripe.PaymentIntent,
  card: Card,
  email: string | null,
): void {
  const charge = chargeOf(service, intent, card, email);
  service.state.charges[charge.id] = charge;
  Object.assign(intent, {
    amount_received: intent.amount,
    latest_charge: charge.id,
    last_payment_error: null,
    payment_method: charge.payment_method,
    status: 'succeeded',
  } satisfies Partial<Stripe.PaymentIntent>);
  record(service, 'charge.succeeded', charge);
  record(service, 'payment_intent.succeeded', intent);
}

/** Notes a declined card. Unlike the service, this keeps no failed charge of the attempt. */
export function declineIntent(
  service: Service,
  intent: Stripe.PaymentIntent,
  decline: Decline,
): void {
  intent.status = 'requires_payment_method';
  intent.payment_method = null;
  intent.last_payment_error = {
    type: 'card_error',
    code: 'card_declined',
    decline_code: decline.code,
    message: decline.message,
  };
  record(service, 'payment_intent.payment_failed', intent);
}

function chargeOf(
  service: Service,
  intent: Stripe.PaymentIntent,
  card: Card,
  email: string | null,
): Stripe.Charge {
  const { amount, currency, metadata, payment_method: method } = intent;
  return {
    ...unusedChargeFields,
    id: makeId('ch'),
    amount,
    amount_captured: amount,
    billing_details: { address: null, email, name: card.name || null, phone: null, tax_id: null },
    created: nowSeconds(service),
    currency,
    description: intent.description,
    metadata,
    payment_intent: intent.id,
    payment_method: typeof method === 'string' ? method : makeId('pm'),
    payment_method_details: { type: 'card', card: cardDetails(card) },
  };
}

function cardDetails(card: Card): Stripe.Charge.PaymentMethodDetails.Card {
  return {
    ...unusedCardFields,
    brand: cardBrand,
    exp_month: card.expiryMonth,
    exp_year: card.expiryYear,
    last4: card.number.slice(-4),
  };
}
