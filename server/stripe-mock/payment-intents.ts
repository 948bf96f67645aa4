import type Stripe from 'stripe';
import { checkAmount } from './amount.ts';
import {
  cardDeclined,
  invalidRequest,
  missingResource,
  refused,
  unexpectedState,
} from './api-error.ts';
import type { CancelParameters, IntentParameters, UpdateParameters } from './intent-parameters.ts';
import { declineIntent, openIntent, settleIntent } from './intents.ts';
import { nowSeconds, record, type Service } from './service.ts';
import { cardOf, takeMethod } from './test-methods.ts';

const noMethod = "You cannot confirm this PaymentIntent because it's missing a payment method.";

/** Starts a payment without a hosted page, and with `confirm` tries the card at once. */
export function createIntent(service: Service, asked: IntentParameters): Stripe.PaymentIntent {
  if (asked.amount < 1) {
    const message = 'This value must be greater than or equal to 1.';
    throw invalidRequest(message, 'parameter_invalid_integer', 'amount');
  }
  checkAmount(asked.amount, 'amount');
  const name = asked.payment_method;
  if (asked.confirm && name === undefined) {
    throw invalidRequest(noMethod, 'parameter_missing', 'payment_method');
  }
  const intent = openIntent(service, {
    amount: asked.amount,
    automatic_payment_methods: asked.automatic_payment_methods ?? null,
    currency: asked.currency,
    description: asked.description ?? null,
    metadata: asked.metadata ?? {},
    payment_method: name === undefined ? null : takeMethod(service, name),
    status: name === undefined ? 'requires_payment_method' : 'requires_confirmation',
  });
  if (asked.confirm) tryCard(service, intent);
  return intent;
}

export function findIntent(service: Service, id: string): Stripe.PaymentIntent {
  const intent = service.state.intents[id];
  if (!intent) throw missingResource('payment_intent', id, 'intent');
  return intent;
}

/** Tries the card named now or before. */
export function confirmIntent(service: Service, id: string, name?: string): Stripe.PaymentIntent {
  const intent = findIntent(service, id);
  refuseForPage(service, id, 'confirm', 'Send the customer to its page instead.');
  if (intent.status === 'succeeded') {
    const reason = 'it has already succeeded after being previously confirmed';
    throw unexpectedState(`You cannot confirm this PaymentIntent because ${reason}.`, intent);
  }
  if (intent.status === 'canceled') throw wrongStatus('confirm', intent, confirmable);
  if (name !== undefined) intent.payment_method = takeMethod(service, name);
  if (intent.payment_method === null) throw unexpectedState(noMethod, intent);
  tryCard(service, intent);
  return intent;
}

function tryCard(service: Service, intent: Stripe.PaymentIntent): void {
  const { card, decline } = cardOf(service, intent);
  if (!decline) return settleIntent(service, intent, card, null);
  declineIntent(service, intent, decline);
  throw cardDeclined(intent, decline.code, decline.message);
}

/** Merges metadata key by key; an empty value takes its key away, an empty whole takes all. */
export function updateIntent(service: Service, id: string, asked: UpdateParameters) {
  const intent = findIntent(service, id);
  if (asked.metadata === '') intent.metadata = {};
  else {
    const merged = Object.entries({ ...intent.metadata, ...asked.metadata });
    intent.metadata = Object.fromEntries(merged.filter(([, value]) => value !== ''));
  }
  if (asked.description !== undefined) intent.description = asked.description || null;
  service.save();
  return intent;
}

/** Calls a payment off before its money is taken. */
export function cancelIntent(service: Service, id: string, asked: CancelParameters) {
  const intent = findIntent(service, id);
  refuseForPage(service, id, 'cancel', 'Expire the Checkout Session instead.');
  if (intent.status === 'succeeded' || intent.status === 'canceled') {
    throw wrongStatus('cancel', intent, cancelable);
  }
  intent.status = 'canceled';
  intent.canceled_at = nowSeconds(service);
  intent.cancellation_reason = asked.cancellation_reason ?? null;
  record(service, 'payment_intent.canceled', intent);
  return intent;
}

/** What a hosted page takes is the page's alone, or it could be taken twice. */
function refuseForPage(service: Service, id: string, verb: string, instead: string): void {
  const owned = Object.values(service.state.sessions).some(
    ({ session }) => session.payment_intent === id,
  );
  if (!owned) return;
  throw refused(`You cannot ${verb} the PaymentIntent for a Checkout Session. ${instead}`);
}

const confirmable = 'confirmed: requires_payment_method, requires_confirmation';
const cancelable = 'canceled: requires_payment_method, requires_confirmation';

function wrongStatus(verb: string, intent: Stripe.PaymentIntent, allowed: string) {
  const state = `because it has a status of ${intent.status}`;
  const rule = `Only a PaymentIntent with one of the following statuses may be ${allowed}.`;
  return unexpectedState(`You cannot ${verb} this PaymentIntent ${state}. ${rule}`, intent);
}
