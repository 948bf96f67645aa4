import type Stripe from 'stripe';
import { invalidRequest, missingResource } from './api-error.ts';
import { makeId } from './ids.ts';
import type { SessionParameters } from './parameters.ts';
import { nowSeconds, record, type Service } from './service.ts';
import type { KeptSession } from './state.ts';

const halfHourSeconds = 1800;
const daySeconds = 86_400;
const smallestTotal = 50;
const largestTotal = 99_999_999;

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
  if (total < smallestTotal) {
    throw invalidRequest(`The total must be at least ${smallestTotal}.`, 'amount_too_small');
  }
  if (total > largestTotal) {
    throw invalidRequest(`The total must be at most ${largestTotal}.`, 'amount_too_large');
  }
  return total;
}

function checkedExpiry(service: Service, asked: number | undefined): number {
  const created = nowSeconds(service);
  if (asked === undefined) return created + daySeconds;
  if (asked < created + halfHourSeconds || asked > created + daySeconds) {
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
    throw invalidRequest(`Only open sessions can be expired; this one is ${status}.`);
  }
  closeAsExpired(service, kept);
  return kept;
}

function closeAsExpired(service: Service, kept: KeptSession): void {
  kept.session.status = 'expired';
  kept.session.url = null;
  record(service, 'checkout.session.expired', kept.session);
}

const unusedSessionFields = {
  object: 'checkout.session',
  adaptive_pricing: null,
  after_expiration: null,
  allow_promotion_codes: null,
  allowed_payment_method_types: null,
  automatic_tax: { enabled: false, liability: null, provider: null, status: null },
  billing_address_collection: null,
  client_secret: null,
  collected_information: null,
  consent: null,
  consent_collection: null,
  currency_conversion: null,
  custom_fields: [],
  custom_text: {
    after_submit: null,
    shipping_address: null,
    submit: null,
    terms_of_service_acceptance: null,
  },
  customer: null,
  customer_account: null,
  customer_creation: 'if_required',
  customer_details: null,
  discounts: [],
  integration_identifier: null,
  invoice: null,
  invoice_creation: null,
  livemode: false,
  locale: null,
  managed_payments: null,
  mode: 'payment',
  origin_context: null,
  payment_intent: null,
  payment_link: null,
  payment_method_collection: 'if_required',
  payment_method_configuration_details: null,
  payment_method_options: {},
  payment_method_types: ['card'],
  permissions: null,
  recovered_from: null,
  saved_payment_method_options: null,
  setup_intent: null,
  shipping_address_collection: null,
  shipping_cost: null,
  shipping_options: [],
  submit_type: null,
  subscription: null,
  total_details: { amount_discount: 0, amount_shipping: 0, amount_tax: 0 },
  ui_mode: 'hosted_page',
  wallet_options: null,
} satisfies Partial<Stripe.Checkout.Session>;
