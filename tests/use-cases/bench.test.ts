import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { benchOrderSchema, queuePageSchema } from '../../server/contracts/bench.ts';
import { deskOrderSchema } from '../../server/contracts/desk.ts';
import { buildSheetSchema, orderSchema } from '../../server/contracts/orders.ts';
import { openTestShop, type TestShop, type Visit } from '../support/test-shop.ts';
import {
  clockBrief,
  flashBrief,
  paidOrder,
  pickAll,
  placeOrder,
  promisedTo,
  signIn,
  statusOf,
  stockDisagreements,
} from '../support/shopping.ts';

let shop: TestShop;
let packer: Visit;
let second: Visit;
let owner: Visit;
beforeAll(async () => {
  shop = await openTestShop();
  packer = await signIn(shop, 'packer');
  second = await signIn(shop, 'second-packer');
  owner = await signIn(shop, 'owner');
});
afterAll(() => shop.close());

const at = (ref: string, verb: string) => `/api/bench/orders/${ref}/${verb}`;
const parcel = { carrier: 'Quay Post', tracking: 'QP7730IE' };
const onHand = async () => Number((await shop.db('lots').sum({ n: 'on_hand' }))[0]!.n);
const mailsAbout = (ref: string, words: RegExp) =>
  shop.mail.mails().filter((mail) => mail.subject.includes(ref) && words.test(mail.subject));

describe('the queue', () => {
  it('lists paid orders by the day they must leave, with how many stops each has', async () => {
    const { ref } = await paidOrder(shop);
    const unpaid = await shop.db('orders').where({ status: 'awaiting_payment' }).pluck('ref');
    const queue = queuePageSchema.parse((await packer.get('/api/bench/queue')).body);
    const days = queue.items.map((item) => item.shipBy);
    expect([...days].sort()).toEqual(days);
    expect(queue.items.find((item) => item.ref === ref)).toMatchObject({
      status: 'paid',
      mine: false,
      late: false,
    });
    expect(queue.items.every((item) => item.stops > 0 && !unpaid.includes(item.ref))).toBe(true);
    shop.clock.pass(6 * 24 * 60);
    packer = await signIn(shop, 'packer');
    second = await signIn(shop, 'second-packer');
    owner = await signIn(shop, 'owner');
    const later = queuePageSchema.parse((await packer.get('/api/bench/queue')).body);
    expect(later.items.find((item) => item.ref === ref)!.late).toBe(true);
    expect((await owner.get('/api/desk/today')).body.late).toBeGreaterThan(0);
  });
});

describe('claiming', () => {
  it('gives an order to one of two packers who try at once', async () => {
    const { ref } = await paidOrder(shop);
    const answers = await Promise.all([packer, second].map((one) => one.post(at(ref, 'claim'))));
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    const refused = answers.find(({ status }) => status === 409)!;
    expect(refused.body.type).toMatch(/already-claimed$/);
    expect(refused.body.detail).toMatch(/Ivo Brandreth|Sanne Quill/);
  });

  it('does no harm when said twice, and can be undone by the one who did it', async () => {
    const { ref } = await paidOrder(shop);
    await packer.post(at(ref, 'claim')).expect(200);
    await packer.post(at(ref, 'claim')).expect(200);
    expect((await second.post(at(ref, 'release'))).status).toBe(409);
    const [pick] = (await packer.get(`/api/bench/orders/${ref}`)).body.picks;
    await packer.post(at(ref, 'picks')).send({ id: pick.id, quantity: pick.quantity }).expect(200);
    const released = benchOrderSchema.parse(
      (await packer.post(at(ref, 'release')).expect(200)).body,
    );
    expect(released.claimedBy).toBeNull();
    expect(released.picks.every((one) => one.picked === 0)).toBe(true);
    await second.post(at(ref, 'claim')).expect(200);
  });

  it('is refused for an order that is not on the bench', async () => {
    expect((await packer.post(at('TQ-0001', 'claim'))).status).toBe(404);
  });
});

describe('picking', () => {
  it('walks the bins in order and wants every piece before the bag is closed', async () => {
    const { ref, pack } = await paidOrder(shop, shop.visit(), clockBrief, 2);
    expect((await packer.post(at(ref, 'picks')).send({ id: '1', quantity: 1 })).status).toBe(409);
    await packer.post(at(ref, 'claim')).expect(200);
    const order = benchOrderSchema.parse((await packer.get(`/api/bench/orders/${ref}`)).body);
    const walk = await shop.db('bins').orderBy('walk_order').pluck<string[]>('code');
    const stops = order.picks.map((pick) => walk.indexOf(pick.bin));
    expect([...stops].sort((a, b) => a - b)).toEqual(stops);
    expect(order.picks.reduce((sum, pick) => sum + pick.quantity, 0)).toBe(2 * pack.parts.length);
    expect(order.address.at(-1)).toBe('IRELAND');
    const early = await packer.post(at(ref, 'pack'));
    expect(early.status).toBe(409);
    expect(early.body.detail).toMatch(/Bin [A-Z]-\d\d still wants/);
    const [first] = order.picks;
    const send = (quantity: number) =>
      packer.post(at(ref, 'picks')).send({ id: first!.id, quantity });
    expect((await send(first!.quantity + 1)).status).toBe(422);
    expect((await second.post(at(ref, 'picks')).send({ id: first!.id, quantity: 1 })).status).toBe(
      409,
    );
    expect((await packer.post(at(ref, 'picks')).send({ id: '999999', quantity: 1 })).status).toBe(
      404,
    );
    await pickAll(packer, ref);
    await send(first!.quantity - 1);
    expect((await packer.post(at(ref, 'pack'))).status).toBe(409);
    await send(first!.quantity);
    const packed = benchOrderSchema.parse((await packer.post(at(ref, 'pack')).expect(200)).body);
    expect(packed.status).toBe('packed');
    expect((await send(0)).status).toBe(409);
  });
});

async function packedOrder(brief = clockBrief): Promise<string> {
  const { ref } = await paidOrder(shop, shop.visit(), brief);
  await packer.post(at(ref, 'claim')).expect(200);
  await pickAll(packer, ref);
  await packer.post(at(ref, 'pack')).expect(200);
  return ref;
}

describe('shipping', () => {
  it('moves the parts out of the ledger, mails the maker once, and can be said twice', async () => {
    const ref = await packedOrder(flashBrief);
    const before = await onHand();
    const promised = await promisedTo(shop, ref);
    const send = () =>
      packer.post(at(ref, 'ship')).set('idempotency-key', 'ship-once-key').send(parcel);
    const shipped = benchOrderSchema.parse((await send().expect(200)).body);
    expect(shipped.shipment).toEqual(parcel);
    expect((await send().expect(200)).body).toEqual(shipped);
    expect((await packer.post(at(ref, 'ship')).send(parcel)).status).toBe(409);
    expect(before - (await onHand())).toBe(promised);
    expect(await promisedTo(shop, ref)).toBe(0);
    const entries = await shop
      .db('stock_ledger')
      .join('orders', 'orders.id', 'stock_ledger.order_id')
      .where('orders.ref', ref)
      .select('reason', 'delta', 'actor_name');
    expect(entries.every((entry) => entry.reason === 'shipped' && entry.delta < 0)).toBe(true);
    expect(entries.every((entry) => entry.actor_name === 'Ivo Brandreth')).toBe(true);
    await shop.work();
    const [mail, ...more] = mailsAbout(ref, /on its way/);
    expect(more).toEqual([]);
    for (const body of [mail!.text, mail!.html!]) {
      expect(body).toContain('QP7730IE');
      expect(body).toMatch(/photosensitive epilepsy/);
    }
  });

  it('is refused before the bag is closed, and to another packer', async () => {
    const { ref } = await paidOrder(shop);
    await packer.post(at(ref, 'claim')).expect(200);
    expect((await packer.post(at(ref, 'ship')).send(parcel)).status).toBe(409);
    await pickAll(packer, ref);
    await packer.post(at(ref, 'pack')).expect(200);
    expect((await second.post(at(ref, 'ship')).send(parcel)).status).toBe(409);
    expect(await statusOf(shop, ref)).toBe('packed');
  });

  it('shows the buyer the parcel, the history and a build sheet, on paper too', async () => {
    const ref = await packedOrder();
    await packer.post(at(ref, 'ship')).send(parcel).expect(200);
    const token = shop.deps.signer.orderToken(ref);
    const guest = shop.visit();
    const order = orderSchema.parse((await guest.get(`/api/orders/${ref}?token=${token}`)).body);
    expect(order.shipment).toMatchObject(parcel);
    expect(order.events.map((event) => event.to)).toEqual([
      'awaiting_payment',
      'paid',
      'picking',
      'packed',
      'shipped',
    ]);
    const path = `/api/orders/${ref}/lines/${order.lines[0]!.id}/build-sheet`;
    const sheet = buildSheetSchema.parse((await guest.get(`${path}?token=${token}`)).body);
    expect(sheet.parts).toEqual(order.lines[0]!.parts);
    const pdf = await guest.get(`${path}.pdf?token=${token}`).buffer(true).expect(200);
    expect(pdf.type).toBe('application/pdf');
    expect(pdf.body.subarray(0, 5).toString()).toBe('%PDF-');
  });
});

describe('a refund', () => {
  const refund = (ref: string, key?: string) =>
    owner
      .post(`/api/desk/orders/${ref}/refund`)
      .set(key ? { 'idempotency-key': key } : {})
      .send({ reason: 'withdrew in time' });

  it('before shipping gives the money and the parts back, mails, and is audited', async () => {
    const { ref } = await paidOrder(shop);
    await packer.post(at(ref, 'claim')).expect(200);
    const order = deskOrderSchema.parse((await refund(ref).expect(200)).body);
    expect(order.status).toBe('refunded');
    expect(order.refunded).toEqual(order.total);
    expect(order.refundable.amount).toBe(0);
    expect(await promisedTo(shop, ref)).toBe(0);
    await shop.work();
    expect(mailsAbout(ref, /^Refund/)).toHaveLength(1);
    expect((await packer.get(`/api/bench/orders/${ref}`)).status).toBe(404);
    const { items } = (await owner.get(`/api/desk/audit?search=${ref}`)).body;
    expect(items).toHaveLength(1);
    expect(items[0]).toMatchObject({
      who: 'Maud Tarrow',
      what: 'refund order',
      subject: `order ${ref}`,
      note: 'withdrew in time',
    });
  });

  it('after shipping gives the money back and moves no stock', async () => {
    const ref = await packedOrder();
    await packer.post(at(ref, 'ship')).send(parcel).expect(200);
    const before = await onHand();
    const seen = (await owner.get(`/api/desk/orders/${ref}`)).body;
    expect(seen.stockNote).toMatch(/moves no stock/);
    await refund(ref).expect(200);
    expect(await onHand()).toBe(before);
    expect(await statusOf(shop, ref)).toBe('refunded');
  });

  it('is given once, however often it is asked for', async () => {
    const { ref } = await paidOrder(shop);
    const answers = await Promise.all([refund(ref), refund(ref)]);
    expect(answers.some(({ status }) => status === 200)).toBe(true);
    expect((await refund(ref)).status).toBe(409);
    await shop.work();
    const refunds = await shop
      .db('refunds')
      .join('payments', 'payments.id', 'refunds.payment_id')
      .join('orders', 'orders.id', 'payments.order_id')
      .where('orders.ref', ref)
      .select('refunds.status');
    expect(refunds).toEqual([{ status: 'done' }]);
    expect(mailsAbout(ref, /^Refund/)).toHaveLength(1);
    expect((await owner.get(`/api/desk/audit?search=${ref}`)).body.items).toHaveLength(1);
  });

  it('is refused for an order that was never paid', async () => {
    const { ref } = await placeOrder(shop.visit());
    const answer = await refund(ref);
    expect(answer.status).toBe(409);
    expect(answer.body.detail).toMatch(/nothing to refund/);
  });
});

describe('after all of this', () => {
  it('the ledger, the reservations and the lots agree', async () => {
    expect(await stockDisagreements(shop)).toEqual([]);
  });
});
