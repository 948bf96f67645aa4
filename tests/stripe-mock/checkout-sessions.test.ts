import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { checkout, clientOf, fillIn, goodCard, openMockShop, type MockShop } from './mock-shop.ts';

// The answers follow the service's published API reference, read through its SDK.
let shop: MockShop;
beforeEach(async () => {
  shop = await openMockShop();
});
afterEach(() => shop.close());

const types = () => [...shop.arrived].sort();

describe('checkout sessions', () => {
  describe('when one is created', () => {
    it('adds up its lines and offers a page to pay on', async () => {
      const session = await shop.stripe.checkout.sessions.create(checkout());
      expect(session).toMatchObject({
        object: 'checkout.session',
        amount_total: 1785,
        currency: 'eur',
        status: 'open',
        payment_status: 'unpaid',
        payment_intent: null,
        metadata: { order: 'TW-1001' },
      });
      expect(session.id).toMatch(/^cs_test_/);
      expect(session.url).toBe(`${shop.address}/c/pay/${session.id}`);
      expect(session.expires_at - session.created).toBe(86_400);
    });

    it('lists its items only when asked to', async () => {
      const { id } = await shop.stripe.checkout.sessions.create(checkout());
      const bare = await shop.stripe.checkout.sessions.retrieve(id);
      const full = await shop.stripe.checkout.sessions.retrieve(id, { expand: ['line_items'] });
      const listed = await shop.stripe.checkout.sessions.listLineItems(id);
      expect(bare.line_items).toBeUndefined();
      expect(full.line_items?.data.map((item) => item.amount_total)).toEqual([1290, 495]);
      expect(listed.data.map((item) => item.description)).toEqual([
        'Timing kit, 90 / min',
        'Shipping',
      ]);
    });
  });

  describe('when something in the request is wrong', () => {
    const inSeconds = (seconds: number) => Math.floor(Date.now() / 1000) + seconds;
    it.each([
      ['no success_url', { success_url: undefined }, 'success_url', 'parameter_missing'],
      ['an unknown parameter', { colour: 'red' }, 'colour', 'parameter_unknown'],
      ['an expiry in 29 minutes', { expires_at: inSeconds(29 * 60) }, 'expires_at', undefined],
      ['an expiry in 25 hours', { expires_at: inSeconds(25 * 3600) }, 'expires_at', undefined],
      ['an address that is none', { success_url: 'shop' }, 'success_url', undefined],
      ['no lines', { line_items: [] }, 'line_items', 'parameter_missing'],
    ])('refuses %s and names the parameter', async (_what, change, param, code) => {
      const asked = { ...checkout(), ...change } as ReturnType<typeof checkout>;
      await expect(shop.stripe.checkout.sessions.create(asked)).rejects.toMatchObject({
        type: 'StripeInvalidRequestError',
        statusCode: 400,
        param,
        code,
      });
    });

    it('names a nested parameter in brackets', async () => {
      const line = { currency: 'eur', unit_amount: 1.5, product_data: { name: 'Kit' } };
      const asked = checkout({ line_items: [{ quantity: 1, price_data: line }] });
      await expect(shop.stripe.checkout.sessions.create(asked)).rejects.toMatchObject({
        param: 'line_items[0][price_data][unit_amount]',
        code: 'parameter_invalid_integer',
      });
    });

    it('refuses another key with 401 and an unknown session with 404', async () => {
      const stranger = clientOf(shop.address, 'sk_test_other');
      await expect(stranger.checkout.sessions.create(checkout())).rejects.toMatchObject({
        type: 'StripeAuthenticationError',
        statusCode: 401,
      });
      await expect(shop.stripe.checkout.sessions.retrieve('cs_none')).rejects.toMatchObject({
        statusCode: 404,
        code: 'resource_missing',
      });
    });
  });

  describe('when it shall be open for exactly 30 minutes', () => {
    const asked = (seconds: number) => {
      const expires = Math.floor(shop.clock.now.getTime() / 1000) + seconds;
      return shop.stripe.checkout.sessions.create(checkout({ expires_at: expires }));
    };

    it('takes it, though the request is two seconds on its way', async () => {
      const session = asked(1800);
      shop.clock.now = new Date(shop.clock.now.getTime() + 2000);
      const { created, expires_at: expires } = await session;
      expect(expires - created).toBe(1798);
    });

    it('still refuses ten seconds less', async () => {
      await expect(asked(1790)).rejects.toMatchObject({ param: 'expires_at' });
    });
  });

  describe('when its time runs out', () => {
    it('expires, says so by webhook and takes no payment', async () => {
      const session = await shop.stripe.checkout.sessions.create(checkout());
      shop.clock.now = new Date((session.expires_at + 1) * 1000);
      await shop.mock.controls.settle();
      await expect.poll(types).toEqual(['checkout.session.expired']);
      const after = await shop.stripe.checkout.sessions.retrieve(session.id);
      expect(after).toMatchObject({ status: 'expired', payment_status: 'unpaid', url: null });
      const answer = await fillIn(session.url, goodCard);
      expect(answer.status).toBe(410);
      expect(await answer.text()).toContain('Too late to pay here');
    });
  });

  describe('when the shop expires it', () => {
    it('closes once, and refuses a second time', async () => {
      const { id } = await shop.stripe.checkout.sessions.create(checkout());
      expect((await shop.stripe.checkout.sessions.expire(id)).status).toBe('expired');
      await expect(shop.stripe.checkout.sessions.expire(id)).rejects.toMatchObject({
        type: 'StripeInvalidRequestError',
      });
    });
  });
});
