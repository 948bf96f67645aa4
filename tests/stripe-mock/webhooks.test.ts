import { existsSync, mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { createStripeMock } from '../../server/stripe-mock/stripe-mock.ts';
import { pauseAfter } from '../../server/stripe-mock/webhook-delivery.ts';
import {
  checkout,
  clientOf,
  fillIn,
  goodCard,
  openMockShop,
  secretKey,
  type MockShop,
} from './mock-shop.ts';

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

  describe('when the stand-in is closed while an event is under way', () => {
    it('writes nothing afterwards, and keeps the event for the next start', async () => {
      let arrived = () => {};
      const reached = new Promise<void>((done) => (arrived = done));
      const slow = createServer((_request, _response) => arrived());
      await new Promise<void>((done) => slow.listen(0, '127.0.0.1', done));
      const { port } = slow.address() as AddressInfo;
      const stateFile = path.join(folder, 'slow', 'payments.json');
      const settings = { secretKey, webhookSecret: 'whsec_local_secret', stateFile };
      const webhookUrl = `http://127.0.0.1:${port}/hook`;
      const mock = createStripeMock({ ...settings, webhookUrl });
      const stripe = clientOf(await mock.listen());
      const intent = await stripe.paymentIntents.create({ amount: 100, currency: 'eur' });
      await reached;
      await mock.close();
      const kept = createStripeMock({ ...settings, webhookUrl: null }).controls.events();
      expect(kept).toMatchObject([{ data: { object: { id: intent.id } }, pending_webhooks: 1 }]);
      rmSync(path.dirname(stateFile), { recursive: true });
      slow.closeAllConnections();
      await new Promise((done) => slow.close(done));
      await pause(50);
      expect(existsSync(path.dirname(stateFile))).toBe(false);
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
