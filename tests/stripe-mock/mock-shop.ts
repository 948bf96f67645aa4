import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { text } from 'node:stream/consumers';
import Stripe from 'stripe';
import { createStripeMock, type StripeMock } from '../../server/stripe-mock/stripe-mock.ts';

export const secretKey = 'sk_test_local_key';
const webhookSecret = 'whsec_local_secret';

export interface MockShop {
  mock: StripeMock;
  stripe: Stripe;
  address: string;
  /** Types of the events that arrived with a good signature, in order of arrival. */
  arrived: string[];
  /** The status the shop's webhook answers with. */
  answer: { status: number };
  clock: { now: Date };
  close(): Promise<void>;
}

/** The stand-in with the real SDK against it, and a webhook that checks signatures by the SDK. */
export async function openMockShop(options: { stateFile?: string; now?: Date } = {}) {
  const arrived: string[] = [];
  const answer = { status: 200 };
  const clock = { now: options.now ?? new Date() };
  const webhook = await webhookServer(arrived, answer);
  const mock = createStripeMock({
    secretKey,
    webhookSecret,
    webhookUrl: `http://127.0.0.1:${(webhook.address() as AddressInfo).port}/hook`,
    clock: () => clock.now,
    ...(options.stateFile && { stateFile: options.stateFile }),
  });
  const address = await mock.listen();
  const close = async () => {
    await mock.close();
    webhook.closeAllConnections();
    await new Promise((done) => webhook.close(done));
  };
  return { mock, stripe: clientOf(address), address, arrived, answer, clock, close };
}

export function clientOf(address: string, key = secretKey): Stripe {
  const { hostname, port } = new URL(address);
  const quiet = { telemetry: false, maxNetworkRetries: 0 };
  return new Stripe(key, { ...quiet, host: hostname, port: Number(port), protocol: 'http' });
}

async function webhookServer(arrived: string[], answer: { status: number }): Promise<Server> {
  const server = createServer((request, response) => {
    void text(request).then((body) => {
      const signature = String(request.headers['stripe-signature']);
      const event = Stripe.webhooks.constructEvent(body, signature, webhookSecret);
      if (answer.status < 300) arrived.push(event.type);
      response.writeHead(answer.status).end();
    });
  });
  await new Promise<void>((done) => server.listen(0, '127.0.0.1', done));
  return server;
}

/** A checkout of two kits at 6.45 and shipping: 17.85 in all. */
export function checkout(
  changes: Partial<Stripe.Checkout.SessionCreateParams> = {},
): Stripe.Checkout.SessionCreateParams {
  const line = (name: string, amount: number, quantity: number) => ({
    quantity,
    price_data: { currency: 'eur', unit_amount: amount, product_data: { name } },
  });
  return {
    mode: 'payment',
    ui_mode: 'hosted_page',
    line_items: [line('Timing kit, 90 / min', 645, 2), line('Shipping', 495, 1)],
    customer_email: 'ada@maker.example',
    client_reference_id: 'TW-1001',
    metadata: { order: 'TW-1001' },
    payment_intent_data: { metadata: { order: 'TW-1001' } },
    success_url: 'http://127.0.0.1:9/paid?session={CHECKOUT_SESSION_ID}',
    cancel_url: 'http://127.0.0.1:9/basket',
    ...changes,
  };
}

export const goodCard = {
  number: '4242 4242 4242 4242',
  expiry: '09 / 39',
  code: '123',
  name: 'Ada Maker',
};

/** Sends the form of the card page, as a browser without scripts does. */
export function fillIn(url: string | null, card: Record<string, string>): Promise<Response> {
  const body = new URLSearchParams(card);
  return fetch(url ?? '', { method: 'POST', body, redirect: 'manual' });
}
