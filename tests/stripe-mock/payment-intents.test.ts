import type Stripe from 'stripe';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { openMockShop, type MockShop } from './mock-shop.ts';

// States, codes and events follow the service's API reference, read through its SDK; the words of
// "unexpected state" are those its users quote.
let shop: MockShop;
beforeEach(async () => {
  shop = await openMockShop();
});
afterEach(() => shop.close());

const intents = () => shop.stripe.paymentIntents;
const start = (changes: Partial<Stripe.PaymentIntentCreateParams> = {}) =>
  intents().create({ amount: 1785, currency: 'eur', ...changes });
const paid = () => start({ payment_method: 'pm_card_visa', confirm: true });
const told = () => [...shop.arrived].sort();

describe('payment intents', () => {
  describe('when one is created', () => {
    it('waits for a payment method, and keeps what the shop noted on it', async () => {
      const { id } = await start({ metadata: { order: 'TW-1001' }, description: 'Two kits' });
      expect(await intents().retrieve(id)).toMatchObject({
        object: 'payment_intent',
        amount: 1785,
        amount_received: 0,
        currency: 'eur',
        description: 'Two kits',
        metadata: { order: 'TW-1001' },
        payment_method: null,
        status: 'requires_payment_method',
      });
      await expect.poll(told).toEqual(['payment_intent.created']);
    });

    it('waits to be confirmed when it has a payment method', async () => {
      const intent = await start({ payment_method: 'pm_card_visa' });
      expect(intent.status).toBe('requires_confirmation');
      expect(intent.payment_method).toMatch(/^pm_/);
      expect((await shop.stripe.charges.list()).data).toEqual([]);
    });

    it('takes the money at once when it is confirmed in the same call', async () => {
      const intent = await start({
        payment_method: 'pm_card_visa',
        confirm: true,
        automatic_payment_methods: { enabled: true, allow_redirects: 'never' },
        expand: ['latest_charge'],
      });
      expect(intent).toMatchObject({
        status: 'succeeded',
        amount_received: 1785,
        latest_charge: {
          amount: 1785,
          payment_intent: intent.id,
          payment_method: intent.payment_method,
          payment_method_details: { card: { brand: 'visa', last4: '4242' } },
        },
      });
      await expect
        .poll(told)
        .toEqual(['charge.succeeded', 'payment_intent.created', 'payment_intent.succeeded']);
    });
  });

  describe('when a charge has been made', () => {
    it('is found by its id and by its intent, and can be refunded', async () => {
      const [first, second] = [await paid(), await paid()];
      const listed = await shop.stripe.charges.list({ payment_intent: first.id });
      expect(listed.data.map(({ id }) => id)).toEqual([first.latest_charge]);
      const charge = await shop.stripe.charges.retrieve(second.latest_charge as string);
      expect(charge).toMatchObject({ paid: true, payment_intent: second.id });
      const refund = await shop.stripe.refunds.create({ payment_intent: first.id });
      expect(refund).toMatchObject({ amount: 1785, charge: first.latest_charge });
    });
  });

  describe('when several are listed', () => {
    it('gives the newest first, a page at a time', async () => {
      const ids = [(await start()).id, (await start()).id, (await start()).id].reverse();
      const page = await intents().list({ limit: 2 });
      expect(page.data.map(({ id }) => id)).toEqual(ids.slice(0, 2));
      expect(page.has_more).toBe(true);
      const all: string[] = [];
      for await (const { id } of intents().list({ limit: 2 })) all.push(id);
      expect(all).toEqual(ids);
    });
  });

  describe('when metadata is updated', () => {
    it('merges key by key, takes away what is emptied, and leaves the charge as it was', async () => {
      const { id, latest_charge: charge } = await start({
        metadata: { order: 'TW-1001', note: 'gift' },
        payment_method: 'pm_card_visa',
        confirm: true,
      });
      const after = await intents().update(id, { metadata: { note: '', packer: 'Wren' } });
      expect(after.metadata).toEqual({ order: 'TW-1001', packer: 'Wren' });
      const { metadata } = await shop.stripe.charges.retrieve(charge as string);
      expect(metadata).toEqual({ order: 'TW-1001', note: 'gift' });
      expect((await intents().update(id, { metadata: '' })).metadata).toEqual({});
    });
  });
});
