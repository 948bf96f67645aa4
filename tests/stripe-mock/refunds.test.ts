import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { checkout, fillIn, goodCard, openMockShop, type MockShop } from './mock-shop.ts';

let shop: MockShop;
let intent: string;
beforeEach(async () => {
  shop = await openMockShop();
  const { id, url } = await shop.stripe.checkout.sessions.create(checkout());
  await fillIn(url, goodCard);
  intent = (await shop.stripe.checkout.sessions.retrieve(id)).payment_intent as string;
});
afterEach(() => shop.close());

const refund = (amount?: number, key?: string) =>
  shop.stripe.refunds.create(
    { payment_intent: intent, ...(amount !== undefined && { amount }) },
    key ? { idempotencyKey: key } : {},
  );

describe('refunds', () => {
  describe('when part is given back, then the rest', () => {
    it('keeps count on the charge and tells the shop each time', async () => {
      expect(await refund(785)).toMatchObject({ amount: 785, status: 'succeeded' });
      const [charge] = (await shop.stripe.charges.list({ payment_intent: intent })).data;
      expect(charge).toMatchObject({ amount_refunded: 785, refunded: false });
      expect(await refund()).toMatchObject({ amount: 1000 });
      const after = await shop.stripe.charges.retrieve(String(charge?.id));
      expect(after).toMatchObject({ amount_refunded: 1785, refunded: true });
      const listed = await shop.stripe.refunds.list({ payment_intent: intent });
      expect(listed.data.map(({ amount }) => amount)).toEqual([1000, 785]);
      const told = () => shop.arrived.filter((type) => type === 'charge.refunded');
      await expect.poll(told).toHaveLength(2);
    });
  });

  describe('when more is asked for than is left', () => {
    it('refuses, and the charge stays as it was', async () => {
      await refund(1000);
      await expect(refund(786)).rejects.toMatchObject({ statusCode: 400, param: 'amount' });
      expect(await refund(785)).toMatchObject({ status: 'succeeded' });
    });

    it('has a code of its own for a charge wholly refunded', async () => {
      await refund();
      await expect(refund(1)).rejects.toMatchObject({ code: 'charge_already_refunded' });
    });
  });

  describe('when the same refund is asked for twice under one key', () => {
    it('gives the money back once', async () => {
      const first = await refund(500, 'refund-1');
      const again = await refund(500, 'refund-1');
      expect(again.id).toBe(first.id);
      expect((await shop.stripe.refunds.list()).data).toHaveLength(1);
    });
  });

  describe('when the payment is unknown', () => {
    it('says which', async () => {
      const asked = shop.stripe.refunds.create({ payment_intent: 'pi_none' });
      await expect(asked).rejects.toMatchObject({ code: 'resource_missing' });
    });
  });
});
