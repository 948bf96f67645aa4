import Stripe from 'stripe';
import { BadSignature, PaymentRefused, type PaymentEvent, type PaymentGateway } from '../ports.ts';
import { currency } from '../domain/money.ts';

export interface StripeSettings {
  secretKey: string;
  webhookSecret: string;
  /** Address of a stand-in; null for the real service. */
  apiUrl: string | null;
}

/** The card-payment service behind the shop's own port. Its types end in this file. */
export function createStripePayments(settings: StripeSettings): PaymentGateway {
  const stripe = connect(settings);
  return {
    openCheckout: (request) =>
      refusing(async () => {
        const session = await stripe.checkout.sessions.create(
          {
            mode: 'payment',
            ui_mode: 'hosted_page',
            customer_email: request.email,
            client_reference_id: request.orderRef,
            line_items: request.lines.map((line) => ({
              quantity: line.quantity,
              price_data: {
                currency: currency.toLowerCase(),
                unit_amount: line.amountMinor,
                product_data: { name: line.name },
              },
            })),
            metadata: { order: request.orderRef },
            payment_intent_data: { metadata: { order: request.orderRef } },
            success_url: request.successUrl,
            cancel_url: request.cancelUrl,
            expires_at: Math.floor(request.expiresAt.getTime() / 1000),
          },
          { idempotencyKey: request.key },
        );
        if (!session.url) throw new PaymentRefused('The payment service opened no page.');
        return { sessionId: session.id, url: session.url };
      }),
    checkoutState: (sessionId) =>
      refusing(async () => {
        const session = await stripe.checkout.sessions.retrieve(sessionId);
        return {
          status: stateOf(session.status),
          paid: session.payment_status === 'paid',
          intentId: idOf(session.payment_intent),
          amountMinor: session.amount_total ?? 0,
          currency: (session.currency ?? '').toUpperCase(),
        };
      }),
    closeCheckout: async (sessionId) => {
      try {
        await stripe.checkout.sessions.expire(sessionId);
      } catch (error) {
        // Only an open page can be closed; one that has ended needs nothing.
        if (!(error instanceof Stripe.errors.StripeInvalidRequestError)) throw refusalOf(error);
      }
    },
    refund: ({ intentId, amountMinor, key }) =>
      refusing(async () => {
        const refund = await stripe.refunds.create(
          { payment_intent: intentId, amount: amountMinor, reason: 'requested_by_customer' },
          { idempotencyKey: key },
        );
        return { refundId: refund.id, succeeded: refund.status === 'succeeded' };
      }),
    readEvent(rawBody, signature) {
      try {
        const event = stripe.webhooks.constructEvent(rawBody, signature, settings.webhookSecret);
        return { id: event.id, type: event.type, payload: event.data.object };
      } catch {
        throw new BadSignature('The signature does not match this body.');
      }
    },
    interpret,
  };
}

function connect({ secretKey, apiUrl }: StripeSettings): Stripe {
  const common = { telemetry: false, maxNetworkRetries: 2, timeout: 15_000 };
  if (apiUrl === null) return new Stripe(secretKey, common);
  const url = new URL(apiUrl);
  return new Stripe(secretKey, {
    ...common,
    host: url.hostname,
    port: Number(url.port),
    protocol: url.protocol === 'https:' ? 'https' : 'http',
  });
}

function idOf(value: string | { id: string } | null): string | null {
  return typeof value === 'string' ? value : (value?.id ?? null);
}

async function refusing<Result>(work: () => Promise<Result>): Promise<Result> {
  try {
    return await work();
  } catch (error) {
    throw refusalOf(error);
  }
}

function refusalOf(error: unknown): PaymentRefused {
  if (error instanceof PaymentRefused) return error;
  const detail = error instanceof Error ? error.message : 'no reason given';
  return new PaymentRefused(detail, { cause: error });
}

/** Reads the few fields the shop acts on out of an event's object, whatever else it holds. */
function interpret({ type, payload }: { type: string; payload: unknown }): PaymentEvent {
  if (typeof payload !== 'object' || payload === null) return { kind: 'other' };
  if (type === 'checkout.session.completed' || type === 'checkout.session.expired') {
    const { id } = payload as { id?: unknown };
    return typeof id === 'string' ? { kind: 'checkout-ended', sessionId: id } : { kind: 'other' };
  }
  if (type === 'charge.refunded') {
    const charge = payload as {
      payment_intent?: string | { id: string } | null;
      amount_refunded?: number;
      refunded?: boolean;
    };
    const intentId = idOf(charge.payment_intent ?? null);
    if (intentId === null) return { kind: 'other' };
    return {
      kind: 'refunded',
      intentId,
      refundedMinor: charge.amount_refunded ?? 0,
      wholly: charge.refunded === true,
    };
  }
  return { kind: 'other' };
}

function stateOf(status: string | null): 'open' | 'complete' | 'expired' {
  return status === 'complete' || status === 'expired' ? status : 'open';
}
