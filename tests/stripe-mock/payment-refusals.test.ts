import Stripe from 'stripe';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { openMockShop, secretKey, type MockShop } from './mock-shop.ts';

let shop: MockShop;
beforeEach(async () => {
  shop = await openMockShop();
});
afterEach(() => shop.close());

const intents = () => shop.stripe.paymentIntents;
const base = { amount: 1785, currency: 'eur' };

describe('refused payments', () => {
  describe('when the bank declines the card', () => {
    it.each([
      ['pm_card_chargeDeclined', 'generic_decline'],
      ['pm_card_visa_chargeDeclined', 'generic_decline'],
      ['pm_card_visa_chargeDeclinedInsufficientFunds', 'insufficient_funds'],
    ])('answers %s with 402 and %s, and the intent waits for another', async (name, decline) => {
      const asked = intents().create({ ...base, payment_method: name, confirm: true });
      const error = await asked.catch((reason: unknown) => reason);
      expect(error).toBeInstanceOf(Stripe.errors.StripeCardError);
      expect(error).toMatchObject({
        statusCode: 402,
        code: 'card_declined',
        decline_code: decline,
        payment_intent: {
          status: 'requires_payment_method',
          payment_method: null,
          last_payment_error: { type: 'card_error', decline_code: decline },
        },
      });
      await expect
        .poll(() => [...shop.arrived].sort())
        .toEqual(['payment_intent.created', 'payment_intent.payment_failed']);
    });

    it('takes another card on the same intent', async () => {
      const { id } = await intents().create({ ...base, payment_method: 'pm_card_chargeDeclined' });
      await expect(intents().confirm(id)).rejects.toMatchObject({ code: 'card_declined' });
      const after = await intents().confirm(id, { payment_method: 'pm_card_visa' });
      expect(after).toMatchObject({ status: 'succeeded', last_payment_error: null });
    });
  });

  describe('when something in the request is wrong', () => {
    it.each([
      ['no amount', { amount: undefined }, 'amount', 'parameter_missing'],
      ['no currency', { currency: undefined }, 'currency', 'parameter_missing'],
      ['half a cent', { amount: 10.5 }, 'amount', 'parameter_invalid_integer'],
      ['a negative amount', { amount: -100 }, 'amount', 'parameter_invalid_integer'],
      ['49 cents', { amount: 49 }, 'amount', 'amount_too_small'],
      ['a million and more', { amount: 100_000_000 }, 'amount', 'amount_too_large'],
      ['an unknown card', { payment_method: 'pm_none' }, 'payment_method', 'resource_missing'],
      ['confirming no card', { confirm: true }, 'payment_method', 'parameter_missing'],
      ['an unknown parameter', { colour: 'red' }, 'colour', 'parameter_unknown'],
    ])('refuses %s, names the parameter and makes nothing', async (_what, change, param, code) => {
      const asked = { ...base, ...change } as Stripe.PaymentIntentCreateParams;
      await expect(intents().create(asked)).rejects.toMatchObject({
        type: 'StripeInvalidRequestError',
        statusCode: 400,
        param,
        code,
      });
      expect((await intents().list()).data).toEqual([]);
    });

    it.each(['manual', 'automatic_async'])('says that it cannot capture by %s', async (method) => {
      await expect(intents().create({ ...base, capture_method: method })).rejects.toMatchObject({
        param: 'capture_method',
        message: expect.stringContaining('leave it out, or send automatic'),
      });
    });
  });

  describe('when the id is unknown', () => {
    it.each([
      ['an intent', () => intents().retrieve('pi_none'), 'intent'],
      ['an intent to confirm', () => intents().confirm('pi_none'), 'intent'],
      ['an intent to update', () => intents().update('pi_none', { metadata: {} }), 'intent'],
      ['an intent to cancel', () => intents().cancel('pi_none'), 'intent'],
      ['a charge', () => shop.stripe.charges.retrieve('ch_none'), 'id'],
    ])('answers 404 for %s', async (_what, ask, param) => {
      await expect(ask()).rejects.toMatchObject({
        statusCode: 404,
        code: 'resource_missing',
        param,
      });
    });
  });

  describe('when the address is none of the API', () => {
    it('answers in the form of an API error, through the SDK', async () => {
      await expect(shop.stripe.customers.list()).rejects.toMatchObject({
        type: 'StripeInvalidRequestError',
        statusCode: 404,
        message: expect.stringContaining('Unrecognized request URL (GET: /v1/customers'),
      });
    });

    it.each(['/v1/nothing', '/v2/core/events', '/nothing'])('does so at %s', async (place) => {
      const headers = { authorization: `Bearer ${secretKey}` };
      const answer = await fetch(shop.address + place, { method: 'POST', headers });
      expect(answer.status).toBe(404);
      expect(await answer.json()).toEqual({
        error: {
          type: 'invalid_request_error',
          message: `Unrecognized request URL (POST: ${place}).`,
        },
      });
    });
  });
});
