import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { pauseAfter } from '../../server/stripe-mock/webhook-delivery.ts';
import { checkout, fillIn, goodCard, openMockShop, type MockShop } from './mock-shop.ts';

let folder: string;
let shop: MockShop;
beforeEach(async () => {
  folder = mkdtempSync(path.join(tmpdir(), 'tockwell-webhooks-'));
  shop = await openMockShop({ stateFile: path.join(folder, 'payments.json') });
});
afterEach(async () => {
  await shop.close();
  rmSync(folder, { recursive: true });
});

async function expireOne() {
  const { id } = await shop.stripe.checkout.sessions.create(checkout());
  await shop.stripe.checkout.sessions.expire(id);
  return id;
}

describe('webhooks', () => {
  describe('when the shop answers with an error', () => {
    it('tries again later until it is taken', async () => {
      shop.answer.status = 500;
      await expireOne();
      await shop.mock.controls.settle();
      expect(shop.arrived).toEqual([]);
      shop.answer.status = 200;
      await shop.mock.controls.settle();
      expect(shop.arrived).toEqual([]);
      shop.clock.now = new Date(shop.clock.now.getTime() + 600_000);
      await shop.mock.controls.settle();
      await expect.poll(() => shop.arrived).toEqual(['checkout.session.expired']);
    });

    it('doubles the pause each time, to five minutes', () => {
      expect([1, 2, 3, 9, 10, 20].map(pauseAfter)).toEqual([
        1000, 2000, 4000, 256_000, 300_000, 300_000,
      ]);
    });
  });

  describe('when events are held back', () => {
    it('sends them on release', async () => {
      shop.mock.controls.hold();
      await expireOne();
      await shop.mock.controls.settle();
      expect(shop.arrived).toEqual([]);
      await shop.mock.controls.release();
      expect(shop.arrived).toEqual(['checkout.session.expired']);
    });
  });

  describe('when an event is sent again', () => {
    it('arrives twice under one id', async () => {
      await expireOne();
      await expect.poll(() => shop.arrived).toHaveLength(1);
      const [event] = shop.mock.controls.events();
      expect(await shop.mock.controls.redeliver(String(event?.id))).toBe(true);
      expect(shop.arrived).toEqual(['checkout.session.expired', 'checkout.session.expired']);
      const kept = await shop.stripe.events.retrieve(String(event?.id));
      expect(kept.type).toBe('checkout.session.expired');
    });
  });

  describe('when the stand-in is started anew', () => {
    it('still knows its sessions and sends what was not taken', async () => {
      shop.answer.status = 503;
      const { id, url } = await shop.stripe.checkout.sessions.create(checkout());
      await fillIn(url, goodCard);
      await shop.mock.controls.settle();
      await shop.close();
      const later = new Date(Date.now() + 3_600_000);
      shop = await openMockShop({ stateFile: path.join(folder, 'payments.json'), now: later });
      const session = await shop.stripe.checkout.sessions.retrieve(id);
      expect(session.payment_status).toBe('paid');
      await expect.poll(() => shop.arrived).toContain('checkout.session.completed');
    });
  });
});
