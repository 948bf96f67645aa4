import type Stripe from 'stripe';
import type { Card, Decline } from './card.ts';
import { declineIntent, openIntent, settleIntent } from './intents.ts';
import { record, type Service } from './service.ts';
import type { KeptSession } from './state.ts';

/** Takes the payment of a page: the session is complete and its intent has succeeded. */
export function completePayment(service: Service, kept: KeptSession, card: Card): void {
  const intent = intentOf(service, kept);
  settleIntent(service, intent, card, kept.session.customer_email);
  Object.assign(kept.session, {
    status: 'complete',
    payment_status: 'paid',
    url: null,
    customer_details: customerOf(kept, card),
  } satisfies Partial<Stripe.Checkout.Session>);
  record(service, 'checkout.session.completed', kept.session);
}

/** Notes a declined card on the intent; the session stays open for another try. */
export function declinePayment(service: Service, kept: KeptSession, decline: Decline): void {
  declineIntent(service, intentOf(service, kept), decline);
}

function intentOf(service: Service, kept: KeptSession): Stripe.PaymentIntent {
  const known = kept.session.payment_intent;
  const existing = typeof known === 'string' ? service.state.intents[known] : undefined;
  if (existing) return existing;
  const intent = openIntent(service, {
    amount: kept.session.amount_total ?? 0,
    currency: kept.session.currency ?? '',
    metadata: kept.intentMetadata,
    status: 'requires_payment_method',
  });
  kept.session.payment_intent = intent.id;
  return intent;
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
