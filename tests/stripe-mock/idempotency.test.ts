import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { checkout, openMockShop, type MockShop } from './mock-shop.ts';

// What is replayed follows "Idempotent requests" of the service's API reference: the first answer
// is saved once the work has begun, whether it succeeds or fails; failed validation is not.
let shop: MockShop;
beforeEach(async () => {
  shop = await openMockShop();
});
afterEach(() => shop.close());

const key = { idempotencyKey: 'order-1001' };
const intents = () => shop.stripe.paymentIntents;
const base = { amount: 1785, currency: 'eur', confirm: true };
const replay = { headers: { 'idempotent-replayed': 'true' } };

describe('idempotency keys', () => {
  describe('when a success is asked for again', () => {
    it('gives the same session and says that it is a replay', async () => {
      const first = await shop.stripe.checkout.sessions.create(checkout(), key);
      const again = await shop.stripe.checkout.sessions.create(checkout(), key);
      expect(again.id).toBe(first.id);
      expect(again.lastResponse.headers['idempotent-replayed']).toBe('true');
      expect(first.lastResponse.headers['idempotent-replayed']).toBeUndefined();
      expect(again.lastResponse.requestId).toMatch(/^req_/);
    });

    it('charges once', async () => {
      const asked = { ...base, payment_method: 'pm_card_visa' };
      const first = await intents().create(asked, key);
      expect((await intents().create(asked, key)).id).toBe(first.id);
      expect((await shop.stripe.charges.list()).data).toHaveLength(1);
    });

    it('forgets the key after a day', async () => {
      const asked = { ...base, payment_method: 'pm_card_visa' };
      const first = await intents().create(asked, key);
      shop.clock.now = new Date(shop.clock.now.getTime() + 86_400_000);
      expect((await intents().create(asked, key)).id).not.toBe(first.id);
    });
  });

  describe('when the first answer was a refusal of work under way', () => {
    it('replays a declined card and tries it no second time', async () => {
      const asked = { ...base, payment_method: 'pm_card_chargeDeclined' };
      const declined = { statusCode: 402, code: 'card_declined' };
      await expect(intents().create(asked, key)).rejects.toMatchObject(declined);
      await expect(intents().create(asked, key)).rejects.toMatchObject({ ...declined, ...replay });
      expect((await intents().list()).data).toHaveLength(1);
    });

    it('replays a refusal by the state, though the state has changed since', async () => {
      const { id } = await intents().create({ amount: 1785, currency: 'eur' });
      const unexpected = { code: 'payment_intent_unexpected_state' };
      await expect(intents().confirm(id, {}, key)).rejects.toMatchObject(unexpected);
      await intents().confirm(id, { payment_method: 'pm_card_visa' });
      await expect(intents().confirm(id, {}, key)).rejects.toMatchObject({
        ...unexpected,
        ...replay,
        payment_intent: { status: 'requires_payment_method' },
      });
    });
  });

  describe('when the first request was wrong in itself', () => {
    it('takes the mended request under the same key', async () => {
      const small = { ...base, amount: 49, payment_method: 'pm_card_visa' };
      await expect(intents().create(small, key)).rejects.toMatchObject({
        code: 'amount_too_small',
      });
      const mended = await intents().create({ ...small, amount: 50 }, key);
      expect(mended.status).toBe('succeeded');
      expect(mended.lastResponse.headers['idempotent-replayed']).toBeUndefined();
    });
  });

  describe('when the key comes with another request', () => {
    const misuse = { type: 'StripeIdempotencyError', statusCode: 400 };
    it('refuses other parameters', async () => {
      await shop.stripe.checkout.sessions.create(checkout(), key);
      const other = checkout({ client_reference_id: 'TW-1002' });
      const asked = shop.stripe.checkout.sessions.create(other, key);
      await expect(asked).rejects.toMatchObject(misuse);
    });

    it('refuses another address, and after a refusal too', async () => {
      const asked = { ...base, payment_method: 'pm_card_chargeDeclined' };
      await expect(intents().create(asked, key)).rejects.toMatchObject({ statusCode: 402 });
      const other = { ...asked, payment_method: 'pm_card_visa' };
      await expect(intents().create(other, key)).rejects.toMatchObject(misuse);
      const [intent] = (await intents().list()).data;
      await expect(intents().cancel(String(intent?.id), {}, key)).rejects.toMatchObject(misuse);
    });
  });

  describe('when the key is longer than 255 characters', () => {
    it('refuses it', async () => {
      const asked = intents().create(base, { idempotencyKey: 'k'.repeat(256) });
      await expect(asked).rejects.toMatchObject({
        statusCode: 400,
        message: 'An idempotency key has at most 255 characters.',
      });
    });
  });
});
