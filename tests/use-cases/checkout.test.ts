import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { basketSchema } from '../../server/contracts/basket.ts';
import { orderSchema, quoteSchema } from '../../server/contracts/orders.ts';
import { openTestShop, type TestShop } from '../support/test-shop.ts';
import {
  address,
  checkoutBody,
  clockBrief,
  flashBrief,
  placeOrder,
  promisedTo,
  putIn,
  signIn,
  solve,
  stockDisagreements,
} from '../support/shopping.ts';

let shop: TestShop;
beforeAll(async () => {
  shop = await openTestShop();
});
afterAll(async () => {
  const disagreements = await stockDisagreements(shop);
  await shop.close();
  if (disagreements.length > 0) throw new Error('Ledger, reservations and lots disagree.');
});

const ordersCount = async () => Number((await shop.db('orders').count({ n: '*' }))[0]!.n);

describe('the basket', () => {
  it('is empty for a new guest and needs no cookie to be looked at', async () => {
    const answer = await shop.visit().get('/api/basket').expect(200);
    expect(answer.get('Set-Cookie')).toBeUndefined();
    expect(basketSchema.parse(answer.body).lines).toEqual([]);
  });

  it('adds up, changes and empties', async () => {
    const guest = shop.visit();
    const [pack] = (await solve(guest, { ...clockBrief, quantity: 5 })).packs;
    const { token } = pack!;
    await guest.post('/api/basket/lines').send({ token, quantity: 2 }).expect(201);
    const added = await guest.post('/api/basket/lines').send({ token }).expect(201);
    const basket = basketSchema.parse(added.body);
    expect(basket.kits).toBe(3);
    expect(basket.total.amount).toBe(3 * basket.lines[0]!.unitPrice.amount);
    const line = `/api/basket/lines/${basket.lines[0]!.id}`;
    const changed = await guest.patch(line).send({ quantity: 5 }).expect(200);
    expect(changed.body.kits).toBe(5);
    for (const quantity of [0, 501, 1.5, -1]) {
      expect((await guest.patch(line).send({ quantity })).status).toBe(422);
    }
    const emptied = await guest.delete(line).expect(200);
    expect(emptied.body.lines).toEqual([]);
    expect((await guest.delete(line)).status).toBe(404);
  });

  it('never counts one piece for two lines', async () => {
    const guest = shop.visit();
    const [pack] = (await solve(guest, { ...clockBrief, rank: 'closest' })).packs;
    const { token, makeable } = pack!;
    await guest.post('/api/basket/lines').send({ token, quantity: makeable }).expect(201);
    const same = (await solve(guest, { ...clockBrief, rank: 'closest', band: 0.06 })).packs.find(
      (other) => JSON.stringify(other.parts) === JSON.stringify(pack!.parts),
    );
    const { body } = await guest
      .post('/api/basket/lines')
      .send({ token: same!.token, quantity: 1 })
      .expect(201);
    expect(body.lines[0].problem).toBeNull();
    expect(body.lines[1].problem).toMatch(/left for this line and \d+ needed/);
    const answer = await guest.post('/api/checkout').send(checkoutBody());
    expect(answer.status).toBe(409);
    expect(answer.body.type).toMatch(/out-of-stock$/);
  });

  it('refuses more kits than the shelves can make', async () => {
    const guest = shop.visit();
    const [pack] = (await solve(guest, clockBrief)).packs;
    const quantity = pack!.makeable + 1;
    const answer = await guest.post('/api/basket/lines').send({ token: pack!.token, quantity });
    expect(answer.status).toBe(quantity > 500 ? 422 : 409);
  });
});

describe('the quote', () => {
  it('is what checkout then asks for, with the tax of the country', async () => {
    for (const country of ['IE', 'DE', 'HU', 'NO']) {
      const guest = shop.visit();
      await putIn(guest);
      const quote = quoteSchema.parse(
        (await guest.get(`/api/checkout/quote?country=${country}`)).body,
      );
      const body = checkoutBody({ shippingAddress: { ...address, country } });
      const { orderRef } = (await guest.post('/api/checkout').send(body).expect(201)).body;
      const token = shop.deps.signer.orderToken(orderRef);
      const order = orderSchema.parse(
        (await guest.get(`/api/orders/${orderRef}?token=${token}`)).body,
      );
      expect(order.total).toEqual(quote.total);
      expect(order.tax).toEqual(quote.tax);
      expect(order.goods.amount + order.shipping.amount).toBe(order.total.amount);
      const lines = order.lines.reduce((sum, line) => sum + line.total.amount, 0);
      expect(lines).toBe(order.goods.amount);
      const net = order.total.amount / (1 + quote.taxRate);
      expect(Math.abs(order.total.amount - order.tax.amount - net)).toBeLessThan(2);
      if (country === 'NO') expect(order.tax.amount).toBe(0);
    }
  });
});

describe('checkout', () => {
  describe('when something is wrong with it', () => {
    it.each([
      [
        'an unknown country',
        { shippingAddress: { ...address, country: 'AQ' } },
        'shippingAddress.country',
      ],
      ['an unknown way of shipping', { shippingMethod: 'pigeon' }, 'shippingMethod'],
      ['no e-mail address', { email: 'nowhere' }, 'email'],
      ['no town', { shippingAddress: { ...address, city: ' ' } }, 'shippingAddress.city'],
    ])('refuses %s at its field and takes nothing', async (_, change, path) => {
      const guest = shop.visit();
      await putIn(guest);
      const before = await ordersCount();
      const answer = await guest.post('/api/checkout').send(checkoutBody(change));
      expect(answer.status).toBe(422);
      expect(answer.body.errors[0].path).toBe(path);
      expect(await ordersCount()).toBe(before);
      expect((await guest.get('/api/basket')).body.kits).toBe(1);
    });

    it('refuses an empty basket', async () => {
      const answer = await shop.visit().post('/api/checkout').send(checkoutBody());
      expect(answer.status).toBe(409);
      expect(answer.body.type).toMatch(/basket-empty$/);
    });
  });

  describe('when a kit flashes between 3 and 60 Hz', () => {
    it('asks for the acknowledgement and keeps it with the order', async () => {
      const guest = shop.visit();
      const pack = await putIn(guest, flashBrief);
      expect(pack.cautions[0]).toMatchObject({ code: 'flash', mustAcknowledge: true });
      const { acknowledgements } = (await guest.get('/api/basket')).body;
      expect(acknowledgements[0].code).toBe('flash');
      const refused = await guest.post('/api/checkout').send(checkoutBody());
      expect(refused.status).toBe(422);
      expect(refused.body.type).toMatch(/acknowledgement-missing$/);
      const body = checkoutBody({ acknowledgements: ['flash'] });
      const { orderRef } = (await guest.post('/api/checkout').send(body).expect(201)).body;
      const order = await shop.db('orders').where({ ref: orderRef }).first('acknowledgements');
      expect(order.acknowledgements).toEqual(['flash']);
    });
  });

  describe('when it is sent again under its key', () => {
    it('gives the same answer and orders once', async () => {
      const guest = shop.visit();
      await putIn(guest);
      const send = (key: string, body = checkoutBody()) =>
        guest.post('/api/checkout').set('idempotency-key', key).send(body);
      const before = await ordersCount();
      const first = await send('order-key-one').expect(201);
      const again = await send('order-key-one').expect(201);
      expect(again.body).toEqual(first.body);
      expect(await ordersCount()).toBe(before + 1);
      const other = await send('order-key-one', checkoutBody({ email: 'else@where.example' }));
      expect(other.status).toBe(409);
      expect(other.body.type).toMatch(/idempotency-mismatch$/);
    });

    it('orders once even when both are sent at the same moment', async () => {
      const guest = shop.visit();
      await putIn(guest);
      const before = await ordersCount();
      const send = () =>
        guest.post('/api/checkout').set('idempotency-key', 'both-at-once').send(checkoutBody());
      const answers = await Promise.all([send(), send(), send()]);
      expect(await ordersCount()).toBe(before + 1);
      for (const { status } of answers) expect([201, 409]).toContain(status);
      expect(answers.filter(({ status }) => status === 201).length).toBeGreaterThan(0);
    });

    it('may be tried again under it after a refusal', async () => {
      const guest = shop.visit();
      await putIn(guest);
      const send = (body: object) =>
        guest.post('/api/checkout').set('idempotency-key', 'tried-again-key').send(body);
      const body = checkoutBody();
      const { id } = (await guest.get('/api/basket')).body.lines[0];
      const { token } = (await guest.get('/api/basket')).body.lines[0].pack;
      await guest.delete(`/api/basket/lines/${id}`);
      expect((await send(body)).status).toBe(409);
      await guest.post('/api/basket/lines').send({ token }).expect(201);
      expect((await send(body)).status).toBe(201);
    });
  });

  describe('when two buyers want the last kit at the same moment', () => {
    it('gives it to one and tells the other what is short', async () => {
      const [one, other] = [shop.visit(), shop.visit()];
      const brief = { target: { value: 3.3, unit: 'kHz' as const }, rank: 'closest' as const };
      const pack = await putIn(one, brief);
      await other.post('/api/basket/lines').send({ token: pack.token }).expect(201);
      const sku = pack.parts.find((part) => part.role === 'C1')!.sku;
      const owner = await signIn(shop, 'owner');
      const { body } = await owner.get(`/api/desk/parts?search=${sku}`);
      const part = body.items[0];
      for (const [k, lot] of part.lots.entries()) {
        const onHand = k === 0 ? lot.reserved + 1 : lot.reserved;
        await owner
          .post(`/api/desk/parts/${part.id}/stock`)
          .send({ lotId: lot.id, onHand, reason: 'counted', note: 'only one left' })
          .expect(200);
      }
      const answers = await Promise.all(
        [one, other].map((visit) => visit.post('/api/checkout').send(checkoutBody())),
      );
      expect(answers.map(({ status }) => status).sort()).toEqual([201, 409]);
      const refused = answers.find(({ status }) => status === 409)!;
      expect(refused.body.detail).toMatch(/0 (are )?left/);
      expect((await one.post('/api/packs/solve').send(brief)).body.packs[0].token).not.toBe(
        pack.token,
      );
    });
  });

  describe('when it went well', () => {
    it('promises the parts, keeps them, and empties the basket', async () => {
      const guest = shop.visit();
      const { ref, pack } = await placeOrder(guest, { ...clockBrief, quantity: 2 }, 2);
      expect(await promisedTo(shop, ref)).toBe(2 * pack.parts.length);
      expect((await guest.get('/api/basket')).body.lines).toEqual([]);
      const [row] = await shop.db('order_events').orderBy('id', 'desc').limit(1);
      expect(row.to_status).toBe('awaiting_payment');
    });

    it('freezes what was sold: later prices change nothing', async () => {
      const maker = await signIn(shop, 'maker');
      const { ref, pack } = await placeOrder(maker);
      const before = (await maker.get(`/api/orders/${ref}`).expect(200)).body;
      await shop.db('parts').update({ price_minor: shop.db.raw('price_minor + 50') });
      const after = orderSchema.parse((await maker.get(`/api/orders/${ref}`).expect(200)).body);
      expect(after).toEqual(before);
      expect(after.lines[0]!.promise).toEqual(pack.promise);
      const list = (await maker.get('/api/orders')).body;
      expect(list.items[0].ref).toBe(ref);
    });
  });

  describe('when the payment service is away', () => {
    it('says so, gives the parts back and keeps the basket', async () => {
      const guest = shop.visit();
      await putIn(guest);
      await shop.payments.close();
      const answer = await guest.post('/api/checkout').send(checkoutBody());
      expect(answer.status).toBe(502);
      expect(answer.body.type).toMatch(/payment-refused$/);
      const [order] = await shop.db('orders').orderBy('id', 'desc').limit(1);
      expect(order.status).toBe('cancelled');
      expect(await promisedTo(shop, order.ref)).toBe(0);
      expect((await guest.get('/api/basket')).body.kits).toBe(1);
    });
  });
});
