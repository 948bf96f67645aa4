import Stripe from 'stripe';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { tasks } from '../../server/jobs/worker.ts';
import { cancelUnpaidOrder } from '../../server/use-cases/cancel-unpaid-order.ts';
import { settleCheckout } from '../../server/use-cases/settle-checkout.ts';
import { releaseExpiredReservations } from '../../server/use-cases/release-expired-reservations.ts';
import { openTestShop, webhookSecret, type TestShop } from '../support/test-shop.ts';
import {
  clockBrief,
  paidOrder,
  payByCard,
  placeOrder,
  promisedTo,
  signIn,
  statusOf,
  stockDisagreements,
} from '../support/shopping.ts';

let shop: TestShop;
beforeAll(async () => {
  shop = await openTestShop();
});
afterAll(() => shop.close());

const mailsAbout = (ref: string) => shop.mail.mails().filter((mail) => mail.subject.includes(ref));

async function sessionOf(ref: string): Promise<string> {
  const row = await shop
    .db('payments')
    .join('orders', 'orders.id', 'payments.order_id')
    .where('orders.ref', ref)
    .first('session_id');
  return row.session_id;
}

async function eventsOf(ref: string): Promise<string[]> {
  const rows = await shop
    .db('order_events')
    .join('orders', 'orders.id', 'order_events.order_id')
    .where('orders.ref', ref)
    .orderBy('order_events.id')
    .select('to_status');
  return rows.map((row) => row.to_status);
}

function sendEvent(payload: string, header?: string) {
  const signature =
    header ?? Stripe.webhooks.generateTestHeaderString({ payload, secret: webhookSecret });
  return shop
    .visit()
    .post('/api/webhooks/stripe')
    .set({ 'content-type': 'application/json', 'stripe-signature': signature })
    .send(payload);
}

/** An event of the service about a session, whatever its real state. */
function eventAbout(sessionId: string, id: string, type = 'checkout.session.completed'): string {
  return JSON.stringify({
    id,
    object: 'event',
    type,
    data: { object: { id: sessionId, object: 'checkout.session', payment_status: 'paid' } },
  });
}

describe('paying', () => {
  describe('when the first card is declined and the second is not', () => {
    it('pays once, sets the parts aside, names a day and mails once', async () => {
      const { ref, paymentUrl, pack } = await placeOrder(shop.visit());
      const declined = await payByCard(paymentUrl, '4000 0000 0000 0002');
      expect(declined.status).toBe(402);
      await shop.work();
      expect(await statusOf(shop, ref)).toBe('awaiting_payment');
      const paid = await payByCard(paymentUrl);
      expect(paid.status).toBe(303);
      expect(paid.headers.get('location')).toContain(`/orders/${ref}/thanks?token=`);
      await shop.work();
      const order = await shop.db('orders').where({ ref }).first();
      expect(order.status).toBe('paid');
      expect(order.ship_by.getTime()).toBeGreaterThan(order.paid_at.getTime());
      expect(order.reserved_until).toBeNull();
      expect(await promisedTo(shop, ref)).toBe(pack.parts.length);
      await shop.work();
      const [mail, ...more] = mailsAbout(ref);
      expect(more).toEqual([]);
      expect(mail!.to).toEqual(['tove@marlin.example']);
      for (const body of [mail!.text, mail!.html!]) {
        expect(body).toContain((order.total_minor / 100).toFixed(2));
        expect(body).toMatch(/14 days/);
        expect(body).toMatch(/token=/);
      }
    });
  });

  describe('when the same event comes again and again', () => {
    it('changes nothing more', async () => {
      const { ref } = await paidOrder(shop);
      const before = await eventsOf(ref);
      for (const event of shop.payments.controls.events().slice(-3)) {
        expect(await shop.payments.controls.redeliver(event.id)).toBe(true);
      }
      const session = await sessionOf(ref);
      await Promise.all([1, 2, 3].map((k) => sendEvent(eventAbout(session, `evt_again_${k}`))));
      await shop.work();
      expect(await eventsOf(ref)).toEqual(before);
      expect(mailsAbout(ref)).toHaveLength(1);
    });
  });

  describe('when an event says paid and the service does not', () => {
    it('believes the service', async () => {
      const { ref } = await placeOrder(shop.visit());
      const answer = await sendEvent(eventAbout(await sessionOf(ref), 'evt_premature'));
      expect(answer.status).toBe(200);
      await shop.work();
      expect(await statusOf(shop, ref)).toBe('awaiting_payment');
    });
  });

  describe('when events of one payment arrive in another order', () => {
    it('ends the same', async () => {
      const { ref, paymentUrl } = await placeOrder(shop.visit());
      shop.payments.controls.hold();
      await payByCard(paymentUrl);
      const session = await sessionOf(ref);
      await sendEvent(eventAbout(session, 'evt_early_expiry', 'checkout.session.expired'));
      await sendEvent(eventAbout(session, 'evt_then_completed'));
      await shop.payments.controls.release();
      await shop.work();
      expect(await eventsOf(ref)).toEqual(['awaiting_payment', 'paid']);
    });
  });

  describe('when an event is forged, altered, old or not signed', () => {
    const body = (id: string) => eventAbout('cs_none', id);
    const signed = (payload: string, options: { secret?: string; timestamp?: number } = {}) =>
      Stripe.webhooks.generateTestHeaderString({ payload, secret: webhookSecret, ...options });
    const now = () => Math.floor(Date.now() / 1000);

    it.each([
      ['signed with another secret', (text: string) => signed(text, { secret: 'whsec_other' })],
      ['of another body', () => signed(body('evt_other'))],
      ['301 s old', (text: string) => signed(text, { timestamp: now() - 302 })],
      ['without a signature worth the name', () => 'nonsense'],
    ])('refuses one that is %s, and keeps nothing', async (_, header) => {
      const answer = await sendEvent(body('evt_forged'), header(body('evt_forged')));
      expect(answer.status).toBe(400);
      expect(answer.body.type).toMatch(/bad-signature$/);
      expect(await shop.db('payment_events').where({ id: 'evt_forged' }).first()).toBeUndefined();
    });

    it('refuses one without the header', async () => {
      const answer = await shop.visit().post('/api/webhooks/stripe').send({ id: 'evt_forged' });
      expect(answer.status).toBe(400);
    });

    it('takes one that is 290 s old, and one of an unknown kind, and ignores what is not ours', async () => {
      const old = body('evt_slow');
      expect((await sendEvent(old, signed(old, { timestamp: now() - 290 }))).status).toBe(200);
      const odd = JSON.stringify({ id: 'evt_odd', type: 'moon.rose', data: { object: null } });
      expect((await sendEvent(odd)).status).toBe(200);
      await shop.work();
      const rows = await shop.db('payment_events').whereIn('id', ['evt_slow', 'evt_odd']);
      expect(rows.map((row) => row.outcome).sort()).toEqual(['not ours', 'nothing to do']);
    });
  });

  describe('when another amount was paid than the order’s total', () => {
    it('holds the order for the owner; a refund then frees its parts', async () => {
      const { ref, paymentUrl } = await placeOrder(shop.visit());
      await shop
        .db('payments')
        .where({ session_id: await sessionOf(ref) })
        .first();
      const [{ id }] = await shop.db('orders').where({ ref }).select('id');
      await shop
        .db('orders')
        .where({ id })
        .update({
          goods_minor: shop.db.raw('goods_minor + 100'),
          total_minor: shop.db.raw('total_minor + 100'),
        });
      await payByCard(paymentUrl);
      await shop.work();
      expect(await statusOf(shop, ref)).toBe('on_hold');
      expect(mailsAbout(ref)).toEqual([]);
      const owner = await signIn(shop, 'owner');
      const today = (await owner.get('/api/desk/today')).body;
      expect(today.decisions[0].text).toContain(ref);
      expect(await promisedTo(shop, ref)).toBeGreaterThan(5);
      const seen = (await owner.get(`/api/desk/orders/${ref}`)).body;
      expect(seen.stockNote).toMatch(/back on the shelf/);
      const reason = 'wrong amount was paid';
      await owner.post(`/api/desk/orders/${ref}/refund`).send({ reason }).expect(200);
      expect(await statusOf(shop, ref)).toBe('refunded');
      expect(await promisedTo(shop, ref)).toBe(0);
    });
  });
});

describe('a reservation', () => {
  describe('when nobody pays in time', () => {
    it('is swept: the order is cancelled, the page closed, the parts are free', async () => {
      const { ref, paymentUrl } = await placeOrder(shop.visit());
      shop.clock.pass(34);
      await releaseExpiredReservations(shop.deps);
      expect(await statusOf(shop, ref)).toBe('awaiting_payment');
      shop.clock.pass(2);
      await releaseExpiredReservations(shop.deps);
      expect(await statusOf(shop, ref)).toBe('cancelled');
      expect(await promisedTo(shop, ref)).toBe(0);
      expect((await payByCard(paymentUrl)).status).toBe(410);
      await shop.work();
      expect(await eventsOf(ref)).toEqual(['awaiting_payment', 'cancelled']);
    });
  });

  describe('when it was paid in the last second', () => {
    it('is honoured by the sweep', async () => {
      const { ref, paymentUrl } = await placeOrder(shop.visit());
      shop.payments.controls.hold();
      await payByCard(paymentUrl);
      shop.clock.pass(36);
      await releaseExpiredReservations(shop.deps);
      expect(await statusOf(shop, ref)).toBe('paid');
      await shop.payments.controls.release();
      await shop.work();
      expect(mailsAbout(ref)).toHaveLength(1);
    });
  });

  /** Lets the shop cancel an order whose payment is under way, as when its clock and the service's differ. */
  async function cancelledThenPaid(meanwhile: (ref: string) => Promise<void>): Promise<string> {
    const { ref, paymentUrl } = await placeOrder(shop.visit(), clockBrief);
    expect(await cancelUnpaidOrder(shop.deps, ref, 'Not paid in time')).toBe(true);
    await meanwhile(ref);
    await payByCard(paymentUrl);
    await shop.work();
    return ref;
  }

  describe('when the money comes after it lapsed', () => {
    it('is promised again while the parts are there', async () => {
      const ref = await cancelledThenPaid(() => Promise.resolve());
      expect(await statusOf(shop, ref)).toBe('paid');
      expect(await promisedTo(shop, ref)).toBeGreaterThan(5);
      expect(mailsAbout(ref)).toHaveLength(1);
    });

    it('is put on hold when they are gone', async () => {
      const ref = await cancelledThenPaid(async (lapsed) => {
        const lots = await shop
          .db('reservations')
          .join('orders', 'orders.id', 'reservations.order_id')
          .join('lots', 'lots.id', 'reservations.lot_id')
          .where('orders.ref', lapsed)
          .select('lots.part_id');
        const parts = await shop.db('lots').where('part_id', lots[0].part_id);
        for (const lot of parts.filter((one) => one.on_hand > one.reserved)) {
          await shop.db('stock_ledger').insert({
            lot_id: lot.id,
            delta: lot.reserved - lot.on_hand,
            balance: 0,
            reason: 'lost',
            actor_name: 'Test',
          });
        }
      });
      expect(await statusOf(shop, ref)).toBe('on_hold');
      expect(await promisedTo(shop, ref)).toBe(0);
      expect(mailsAbout(ref)).toEqual([]);
    });
  });
});

describe('the mail', () => {
  it('is tried again when the mail server was away, and sent once', async () => {
    const { ref, paymentUrl } = await placeOrder(shop.visit(), {
      target: { value: 4.1, unit: 'kHz' },
    });
    const mail = { send: () => Promise.reject(new Error('connection refused')) };
    await payByCard(paymentUrl);
    await settleCheckout(shop.deps, await sessionOf(ref));
    const row = await shop
      .db('mail_outbox')
      .where({ message_key: `confirmation-${ref}` })
      .first();
    const sendMail = tasks({ ...shop.deps, mail })['send-mail']!;
    await expect(sendMail({ outboxId: row.id }, {} as never)).rejects.toThrow('connection refused');
    const failed = await shop.db('mail_outbox').where({ id: row.id }).first();
    expect(failed).toMatchObject({ attempts: 1, last_error: 'connection refused', sent_at: null });
    await shop.work();
    await shop.work();
    expect(mailsAbout(ref)).toHaveLength(1);
  });
});

describe('after all of this', () => {
  it('the ledger, the reservations and the lots agree', async () => {
    expect(await stockDisagreements(shop)).toEqual([]);
  });
});
