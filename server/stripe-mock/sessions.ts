import type Stripe from 'stripe';
import { checkAmount } from './amount.ts';
import { invalidRequest, missingResource, refused } from './api-error.ts';
import { makeId } from './ids.ts';
import type { SessionParameters } from './parameters.ts';
import { nowSeconds, record, type Service } from './service.ts';
import { unusedSessionFields } from './session-fields.ts';
import type { KeptSession } from './state.ts';

const halfHourSeconds = 1800;
const daySeconds = 86_400;
// A client counts its 30 minutes from its own second, rounded, and the request is a while under way.
const roundingSeconds = 5;

/** Opens a payment page. */
export function createSession(service: Service, asked: SessionParameters): KeptSession {
  const lineItems = asked.line_items.map(lineItemOf);
  const total = checkedTotal(lineItems);
  const id = makeId('cs_test', 58);
  const kept: KeptSession = {
    session: {
      ...unusedSessionFields,
      id,
      amount_subtotal: total,
      amount_total: total,
      cancel_url: asked.cancel_url ?? null,
      client_reference_id: asked.client_reference_id ?? null,
      created: nowSeconds(service),
      currency: lineItems[0]?.currency ?? null,
      customer_email: asked.customer_email ?? null,
      expires_at: checkedExpiry(service, asked.expires_at),
      metadata: asked.metadata ?? {},
      payment_status: 'unpaid',
      status: 'open',
      success_url: asked.success_url,
      url: `${service.publicUrl()}/c/pay/${id}`,
    },
    lineItems,
    intentMetadata: asked.payment_intent_data?.metadata ?? {},
  };
  service.state.sessions[id] = kept;
  service.save();
  return kept;
}

function lineItemOf(asked: SessionParameters['line_items'][number]): Stripe.LineItem {
  const { currency, unit_amount: each, product_data: product } = asked.price_data;
  const total = each * asked.quantity;
  return {
    id: makeId('li'),
    object: 'item',
    adjustable_quantity: null,
    amount_discount: 0,
    amount_subtotal: total,
    amount_tax: 0,
    amount_total: total,
    currency,
    description: product.name,
    metadata: product.metadata ?? {},
    price: null,
    quantity: asked.quantity,
  };
}

function checkedTotal(lineItems: Stripe.LineItem[]): number {
  if (new Set(lineItems.map((item) => item.currency)).size > 1) {
    throw invalidRequest('All line items must have the same currency.', null, 'line_items');
  }
  const total = lineItems.reduce((sum, item) => sum + item.amount_total, 0);
  checkAmount(total);
  return total;
}

function checkedExpiry(service: Service, asked: number | undefined): number {
  const created = nowSeconds(service);
  if (asked === undefined) return created + daySeconds;
  const earliest = created + halfHourSeconds - roundingSeconds;
  if (asked < earliest || asked > created + daySeconds + roundingSeconds) {
    const range = 'between 30 minutes and 24 hours from now';
    throw invalidRequest(`The \`expires_at\` timestamp must be ${range}.`, null, 'expires_at');
  }
  return asked;
}

/** The session as it is now: one whose time has run out expires on being looked at. */
export function findSession(service: Service, id: string): KeptSession {
  const kept = service.state.sessions[id];
  if (!kept) throw missingResource('checkout.session', id);
  if (kept.session.status === 'open' && kept.session.expires_at <= nowSeconds(service)) {
    closeAsExpired(service, kept);
  }
  return kept;
}

/** Expires every open session whose time has run out. */
export function expireDueSessions(service: Service): void {
  for (const id of Object.keys(service.state.sessions)) findSession(service, id);
}

export function expireSession(service: Service, id: string): KeptSession {
  const kept = findSession(service, id);
  if (kept.session.status !== 'open') {
    const { status } = kept.session;
    throw refused(`Only open sessions can be expired; this one is ${status}.`);
  }
  closeAsExpired(service, kept);
  return kept;
}

function closeAsExpired(service: Service, kept: KeptSession): void {
  kept.session.status = 'expired';
  kept.session.url = null;
  record(service, 'checkout.session.expired', kept.session);
}
