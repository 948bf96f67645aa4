import type Stripe from 'stripe';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { checkout, fillIn, goodCard, openMockShop, type MockShop } from './mock-shop.ts';

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

describe('steps of a payment intent', () => {
  describe('when it is confirmed later', () => {
    it('uses the payment method it has, or the one that comes with the call', async () => {
      const early = await start({ payment_method: 'pm_card_visa' });
      expect((await intents().confirm(early.id)).status).toBe('succeeded');
      const late = await start();
      const after = await intents().confirm(late.id, { payment_method: 'pm_card_visa' });
      expect(after.status).toBe('succeeded');
    });

    it('refuses without a payment method, and a second time', async () => {
      const { id } = await start();
      await expect(intents().confirm(id)).rejects.toMatchObject({
        code: 'payment_intent_unexpected_state',
        payment_intent: { id, status: 'requires_payment_method' },
      });
      await intents().confirm(id, { payment_method: 'pm_card_visa' });
      await expect(intents().confirm(id)).rejects.toMatchObject({
        type: 'StripeInvalidRequestError',
        statusCode: 400,
        code: 'payment_intent_unexpected_state',
        message: expect.stringContaining('already succeeded after being previously confirmed'),
      });
      expect((await shop.stripe.charges.list()).data).toHaveLength(1);
    });
  });

  describe('when it is cancelled', () => {
    it('says why and when, tells the shop, and takes no card afterwards', async () => {
      const { id } = await start({ payment_method: 'pm_card_visa' });
      const after = await intents().cancel(id, { cancellation_reason: 'abandoned' });
      expect(after).toMatchObject({ status: 'canceled', cancellation_reason: 'abandoned' });
      expect(after.canceled_at).toBe(Math.floor(shop.clock.now.getTime() / 1000));
      await expect.poll(told).toContain('payment_intent.canceled');
      for (const step of [() => intents().confirm(id), () => intents().cancel(id)]) {
        await expect(step()).rejects.toMatchObject({
          code: 'payment_intent_unexpected_state',
          message: expect.stringContaining('has a status of canceled'),
        });
      }
    });

    it('refuses once the money is taken', async () => {
      const { id } = await paid();
      await expect(intents().cancel(id)).rejects.toMatchObject({
        code: 'payment_intent_unexpected_state',
        payment_intent: { id, status: 'succeeded' },
      });
    });
  });

  describe('when it belongs to a hosted page', () => {
    it('is confirmed and cancelled by the page alone', async () => {
      const session = await shop.stripe.checkout.sessions.create(checkout());
      await fillIn(session.url, { ...goodCard, number: '4000 0000 0000 0002' });
      const kept = await shop.stripe.checkout.sessions.retrieve(session.id);
      const id = kept.payment_intent as string;
      const card = { payment_method: 'pm_card_visa' };
      for (const step of [() => intents().confirm(id, card), () => intents().cancel(id)]) {
        await expect(step()).rejects.toMatchObject({
          statusCode: 400,
          message: expect.stringContaining('for a Checkout Session'),
        });
      }
      expect((await shop.stripe.charges.list()).data).toEqual([]);
    });
  });
});
