import type Stripe from 'stripe';
import { cardBrand, type Card, type Decline } from './card.ts';
import { makeId } from './ids.ts';
import { nowSeconds, record, type Service } from './service.ts';
import type { KeptSession } from './state.ts';

/** Takes the payment: the session is complete, the intent succeeded, and its charge stands. */
export function completePayment(service: Service, kept: KeptSession, card: Card): void {
  const intent = intentOf(service, kept);
  const charge = chargeOf(service, kept, intent, card);
  service.state.charges[charge.id] = charge;
  Object.assign(intent, {
    amount_received: intent.amount,
    latest_charge: charge.id,
    last_payment_error: null,
    payment_method: charge.payment_method,
    status: 'succeeded',
  } satisfies Partial<Stripe.PaymentIntent>);
  Object.assign(kept.session, {
    status: 'complete',
    payment_status: 'paid',
    url: null,
    customer_details: customerOf(kept, card),
  } satisfies Partial<Stripe.Checkout.Session>);
  record(service, 'charge.succeeded', charge);
  record(service, 'payment_intent.succeeded', intent);
  record(service, 'checkout.session.completed', kept.session);
}

/** Notes a declined card on the intent; the session stays open for another try. */
export function declinePayment(service: Service, kept: KeptSession, decline: Decline): void {
  const intent = intentOf(service, kept);
  intent.status = 'requires_payment_method';
  intent.last_payment_error = {
    type: 'card_error',
    code: 'card_declined',
    decline_code: decline.code,
    message: decline.message,
  };
  record(service, 'payment_intent.payment_failed', intent);
}

function intentOf(service: Service, kept: KeptSession): Stripe.PaymentIntent {
  const known = kept.session.payment_intent;
  const existing = typeof known === 'string' ? service.state.intents[known] : undefined;
  if (existing) return existing;
  const id = makeId('pi');
  const intent: Stripe.PaymentIntent = {
    ...unusedIntentFields,
    id,
    amount: kept.session.amount_total ?? 0,
    client_secret: `${id}_secret_${makeId('x').slice(2)}`,
    created: nowSeconds(service),
    currency: kept.session.currency ?? '',
    metadata: kept.intentMetadata,
    status: 'requires_payment_method',
  };
  service.state.intents[id] = intent;
  kept.session.payment_intent = id;
  record(service, 'payment_intent.created', intent);
  return intent;
}

function chargeOf(
  service: Service,
  kept: KeptSession,
  intent: Stripe.PaymentIntent,
  card: Card,
): Stripe.Charge {
  return {
    ...unusedChargeFields,
    id: makeId('ch'),
    amount: intent.amount,
    amount_captured: intent.amount,
    billing_details: {
      address: null,
      email: kept.session.customer_email,
      name: card.name,
      phone: null,
      tax_id: null,
    },
    created: nowSeconds(service),
    currency: intent.currency,
    metadata: intent.metadata,
    payment_intent: intent.id,
    payment_method: makeId('pm'),
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

function customerOf(kept: KeptSession, card: Card): Stripe.Checkout.Session.CustomerDetails {
  return {
    address: null,
    business_name: null,
    email: kept.session.customer_email,
    individual_name: card.name,
    name: card.name,
    phone: null,
    tax_exempt: 'none',
    tax_ids: [],
  };
}

const unusedIntentFields = {
  object: 'payment_intent',
  allowed_payment_method_types: null,
  amount_capturable: 0,
  amount_received: 0,
  application: null,
  application_fee_amount: null,
  automatic_payment_methods: null,
  canceled_at: null,
  cancellation_reason: null,
  capture_method: 'automatic',
  confirmation_method: 'automatic',
  customer: null,
  customer_account: null,
  description: null,
  excluded_payment_method_types: null,
  last_payment_error: null,
  latest_charge: null,
  livemode: false,
  managed_payments: null,
  next_action: null,
  on_behalf_of: null,
  payment_method: null,
  payment_method_configuration_details: null,
  payment_method_options: null,
  payment_method_types: ['card'],
  payment_record: null,
  processing: null,
  receipt_email: null,
  review: null,
  setup_future_usage: null,
  shipping: null,
  source: null,
  statement_descriptor: null,
  statement_descriptor_suffix: null,
  transfer_group: null,
} satisfies Partial<Stripe.PaymentIntent>;

const unusedChargeFields = {
  object: 'charge',
  amount_refunded: 0,
  application: null,
  application_fee: null,
  application_fee_amount: null,
  balance_transaction: null,
  calculated_statement_descriptor: null,
  captured: true,
  customer: null,
  description: null,
  disputed: false,
  failure_balance_transaction: null,
  failure_code: null,
  failure_message: null,
  fraud_details: {},
  livemode: false,
  on_behalf_of: null,
  outcome: null,
  paid: true,
  receipt_email: null,
  receipt_number: null,
  receipt_url: null,
  refunded: false,
  review: null,
  shipping: null,
  source: null,
  source_transfer: null,
  statement_descriptor: null,
  statement_descriptor_suffix: null,
  status: 'succeeded',
  transfer_data: null,
  transfer_group: null,
} satisfies Partial<Stripe.Charge>;

const unusedCardFields = {
  amount_authorized: null,
  authorization_code: null,
  checks: null,
  country: null,
  electronic_commerce_indicator: null,
  fingerprint: null,
  funding: 'credit',
  installments: null,
  mandate: null,
  network: null,
  network_token: null,
  network_transaction_id: null,
  regulated_status: null,
  three_d_secure: null,
  transaction_link_id: null,
  wallet: null,
} satisfies Partial<Stripe.Charge.PaymentMethodDetails.Card>;
