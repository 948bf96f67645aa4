import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { checkout, fillIn, goodCard, openMockShop, type MockShop } from './mock-shop.ts';

let shop: MockShop;
beforeEach(async () => {
  shop = await openMockShop();
});
afterEach(() => shop.close());

const open = () => shop.stripe.checkout.sessions.create(checkout());

describe('the card page', () => {
  describe('when it is opened', () => {
    it('shows the order, its total, that no money moves, and the test numbers', async () => {
      const text = await (await fetch((await open()).url ?? '')).text();
      for (const words of [
        'Order TW-1001',
        '2 × Timing kit, 90 / min',
        'Pay €\u00a017.85',
        'No money moves',
        'Back to the shop',
        '4242 4242 4242 4242',
        '4000 0000 0000 0002',
      ]) {
        expect(text).toContain(words);
      }
    });

    it('escapes what the shop put into names', async () => {
      const price = { currency: 'eur', unit_amount: 100, product_data: { name: '<b>Kit</b>' } };
      const asked = checkout({ line_items: [{ quantity: 1, price_data: price }] });
      const { url } = await shop.stripe.checkout.sessions.create(asked);
      expect(await (await fetch(url ?? '')).text()).toContain('&lt;b&gt;Kit&lt;/b&gt;');
    });
  });

  describe('when a good card is entered', () => {
    it('goes on to the shop, and the payment stands', async () => {
      const { id, url } = await open();
      const answer = await fillIn(url, goodCard);
      expect(answer.status).toBe(303);
      expect(answer.headers.get('location')).toBe(`http://127.0.0.1:9/paid?session=${id}`);
      const session = await shop.stripe.checkout.sessions.retrieve(id, {
        expand: ['payment_intent.latest_charge'],
      });
      expect(session).toMatchObject({
        status: 'complete',
        payment_status: 'paid',
        payment_intent: {
          status: 'succeeded',
          amount_received: 1785,
          metadata: { order: 'TW-1001' },
          latest_charge: { amount: 1785, payment_method_details: { card: { last4: '4242' } } },
        },
      });
      await expect
        .poll(() => [...shop.arrived].sort())
        .toEqual([
          'charge.succeeded',
          'checkout.session.completed',
          'payment_intent.created',
          'payment_intent.succeeded',
        ]);
    });

    it('is paid once only, however often the form is sent', async () => {
      const { url } = await open();
      await fillIn(url, goodCard);
      const again = await fillIn(url, goodCard);
      expect(again.status).toBe(303);
      expect((await fetch(url ?? '')).status).toBe(410);
      expect((await shop.stripe.charges.list()).data).toHaveLength(1);
    });
  });

  describe('when the page is open in two tabs', () => {
    const charges = async () => (await shop.stripe.charges.list()).data;

    it('sends the second on as paid, and tries no card there, good or bad', async () => {
      const { id, url } = await open();
      const tab = await (await fetch(url ?? '')).text();
      expect(tab).toContain('<form method="post"');
      expect((await fillIn(url, goodCard)).status).toBe(303);
      for (const number of [goodCard.number, '4000 0000 0000 0002']) {
        const late = await fillIn(url, { ...goodCard, number });
        expect(late.status).toBe(303);
      }
      expect((await fetch(url ?? '')).status).toBe(410);
      expect(await charges()).toHaveLength(1);
      expect((await shop.stripe.checkout.sessions.retrieve(id)).payment_status).toBe('paid');
      expect(shop.arrived).not.toContain('payment_intent.payment_failed');
    });

    it('charges once when both are sent at the same moment', async () => {
      const { url } = await open();
      const answers = await Promise.all([1, 2, 3, 4].map(() => fillIn(url, goodCard)));
      expect(answers.map(({ status }) => status).sort()).toEqual([303, 303, 303, 303]);
      expect(await charges()).toHaveLength(1);
    });
  });

  describe('when the card is declined', () => {
    it('says so, and takes another card afterwards', async () => {
      const { id, url } = await open();
      const answer = await fillIn(url, { ...goodCard, number: '4000 0000 0000 0002' });
      expect(answer.status).toBe(402);
      const text = await answer.text();
      expect(text).toContain('The card was declined. Try another card.');
      expect(text).not.toContain('0000 0000 0002"');
      await expect.poll(() => shop.arrived).toContain('payment_intent.payment_failed');
      expect((await shop.stripe.checkout.sessions.retrieve(id)).status).toBe('open');
      expect((await fillIn(url, goodCard)).status).toBe(303);
    });
  });

  describe('when a field is wrong', () => {
    it.each([
      ['a mistyped number', { number: '4242 4242 4242 4241' }, 'mistyped digit'],
      ['letters for a number', { number: 'none' }, '12 to 19 digits'],
      ['a past expiry', { expiry: '01/20' }, 'This card has expired'],
      ['a month of 13', { expiry: '13/39' }, 'Enter month and year'],
      ['a code of two digits', { code: '12' }, 'Enter the 3 digits'],
      ['no name', { name: ' ' }, 'Enter the name'],
    ])('answers %s with what to change', async (_what, change, words) => {
      const { id, url } = await open();
      const answer = await fillIn(url, { ...goodCard, ...change });
      expect(answer.status).toBe(422);
      expect(await answer.text()).toContain(words);
      expect((await shop.stripe.checkout.sessions.retrieve(id)).payment_intent).toBeNull();
    });
  });

  describe('when the address is not that of a payment', () => {
    it('says so', async () => {
      expect((await fetch(`${shop.address}/c/pay/cs_none`)).status).toBe(404);
    });
  });
});
