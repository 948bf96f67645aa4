import type { Knex } from 'knex';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openTestDatabase, type TestDatabase } from '../support/database.ts';
import { addBin, addLot, addOrderRow, addResistor, post } from '../support/rows.ts';

let test: TestDatabase;
let db: Knex;
let lot: { id: number; partId: number };
let orderId: number;
beforeAll(async () => {
  test = await openTestDatabase();
  db = test.db;
  await addBin(db);
  lot = await addLot(db, await addResistor(db));
  await post(db, lot.id, 10, 'received');
  orderId = await addOrderRow(db);
  await db('audit').insert({
    actor_name: 'Test',
    action: 'look',
    subject_kind: 'part',
    subject_id: 'X',
  });
  await db('order_events').insert({
    order_id: orderId,
    at: new Date(),
    who: 'Test',
    what: 'Placed',
  });
  await db('packs').insert(packRow());
});
afterAll(() => test.drop());

const packRow = (change = {}) => ({
  identifier: 'TQ-9999-1',
  token: 't',
  topology: 'equal-thresholds',
  sentence: 's',
  brief: '{}',
  parts: '[]',
  promise: '{}',
  cautions: '[]',
  strip: '{}',
  circuit: '{}',
  ...change,
});

describe('the schema', () => {
  describe('when somebody goes round the ledger', () => {
    it.each([
      ['sets what is on hand', () => db('lots').where({ id: lot.id }).update({ on_hand: 99 })],
      ['sets what is reserved', () => db('lots').where({ id: lot.id }).update({ reserved: 1 })],
      [
        'opens a lot that is full already',
        () =>
          db('lots').insert({
            part_id: lot.partId,
            bin_id: 1,
            code: 'FULL',
            received_on: '2026-01-01',
            on_hand: 5,
          }),
      ],
    ])('refuses who %s', async (_, act: () => PromiseLike<unknown>) => {
      await expect(Promise.resolve(act())).rejects.toThrow(/ledger/);
      expect(await db('lots').where({ id: lot.id }).first('on_hand', 'reserved')).toEqual({
        on_hand: 10,
        reserved: 0,
      });
    });

    it('moves the lot with each entry and writes the balance itself', async () => {
      await post(db, lot.id, 5, 'found');
      await post(db, lot.id, -5, 'lost');
      const entries = await db('stock_ledger')
        .where({ lot_id: lot.id })
        .orderBy('id')
        .select('delta', 'balance');
      expect(entries).toEqual([
        { delta: 10, balance: 10 },
        { delta: 5, balance: 15 },
        { delta: -5, balance: 10 },
      ]);
    });
  });

  describe('when stock would not add up', () => {
    it.each([
      ['an entry below zero', () => post(db, lot.id, -11, 'lost')],
      ['an entry of nothing', () => post(db, lot.id, 0, 'counted')],
      ['an entry for no reason of the list', () => post(db, lot.id, 1, 'borrowed')],
      ['a shipment without an order', () => post(db, lot.id, -1, 'shipped')],
      ['a shipment that adds', () => post(db, lot.id, 1, 'shipped', orderId)],
      ['a reservation of more than there is', () => reserve({ quantity: 11 })],
      ['a reservation of none', () => reserve({ quantity: 0 })],
      ['a reservation in no known state', () => reserve({ state: 'dreamt' })],
      ['a pick of more than was reserved', () => reserve({ picked: 2 })],
    ])('refuses %s', async (_, act: () => PromiseLike<unknown>) => {
      await expect(Promise.resolve(act())).rejects.toThrow();
    });

    it('refuses to take pieces that are promised off the lot', async () => {
      await reserve({ quantity: 8 });
      await expect(post(db, lot.id, -3, 'lost')).rejects.toThrow(/lots_reserved_within_on_hand/);
      await db('reservations').where({ order_id: orderId }).update({ state: 'released' });
      await db('reservations').where({ order_id: orderId }).delete();
      expect(await db('lots').where({ id: lot.id }).first('reserved')).toEqual({ reserved: 0 });
    });

    it('refuses to move a reservation to another lot', async () => {
      const other = await addLot(db, lot.partId);
      await reserve({ quantity: 1 });
      await expect(db('reservations').update({ lot_id: other.id })).rejects.toThrow(/cannot move/);
      await db('reservations').delete();
    });
  });

  describe('when history would be rewritten', () => {
    it.each(['stock_ledger', 'audit', 'order_events', 'packs'])(
      'lets %s only grow',
      async (table) => {
        expect(Number((await db(table).count({ n: '*' }))[0]!.n)).toBeGreaterThan(0);
        const columns: Record<string, object> = {
          stock_ledger: { delta: 1 },
          audit: { note: 'changed' },
          order_events: { what: 'changed' },
          packs: { token: 'changed' },
        };
        await expect(db(table).update(columns[table]!)).rejects.toThrow(/append-only/);
        await expect(db(table).delete()).rejects.toThrow(/append-only/);
        await expect(db.raw(`truncate ${table} cascade`)).rejects.toThrow(/append-only/);
      },
    );
  });

  describe('when something would be there twice', () => {
    it('keeps one event of the payment service, one mail of a key and one account of an address', async () => {
      const event = { id: 'evt_1', type: 't', payload: '{}' };
      const mail = {
        message_key: 'k',
        recipient: 'r',
        subject: 's',
        body_text: 't',
        body_html: 'h',
      };
      const user = { email: 'a@b.example', name: 'A', password_hash: 'x' };
      for (const [table, row] of [
        ['payment_events', event],
        ['mail_outbox', mail],
        ['users', user],
        ['packs', packRow()],
      ] as const) {
        if (table !== 'packs') await db(table).insert(row);
        await expect(db(table).insert(row)).rejects.toThrow(/duplicate key/);
      }
    });
  });

  describe('when a row says what cannot be', () => {
    it.each([
      ['an order whose total does not add up', () => addOrderRow(db, { total_minor: 1 })],
      ['an order with more tax than total', () => addOrderRow(db, { tax_minor: 5000 })],
      ['an order in no known state', () => addOrderRow(db, { status: 'lost' })],
      ['an order that waits for payment for ever', () => addOrderRow(db, { reserved_until: null })],
      ['an order that is picked by nobody', () => addOrderRow(db, { status: 'picking' })],
      ['an order in another currency', () => addOrderRow(db, { currency: 'USD' })],
      ['half a cent', () => addOrderRow(db, { goods_minor: 0.5, total_minor: '290.5' })],
      ['a negative price', () => addResistor(db, { price_minor: -1 })],
      ['a resistor of no ohms', () => addResistor(db, { ohms: 0 })],
      ['a resistor without a tolerance', () => addResistor(db, { tolerance: null })],
      ['a part of no known kind', () => addResistor(db, { kind: 'magnet' })],
      ['an SKU in small letters', () => addResistor(db, { sku: 'tw-small' })],
      [
        'a user of no known role',
        () =>
          db('users').insert({ email: 'x@y.example', name: 'X', password_hash: 'x', role: 'king' }),
      ],
      [
        'an address in capitals',
        () => db('users').insert({ email: 'X@Y.example', name: 'X', password_hash: 'x' }),
      ],
      ['a basket of nobody', () => db('baskets').insert({})],
      [
        'a payment captured without an intent',
        () =>
          db('payments').insert({
            order_id: orderId,
            session_id: 'cs',
            payment_url: 'u',
            amount_minor: 5,
            currency: 'EUR',
            status: 'captured',
          }),
      ],
      [
        'a pack of no known topology',
        () => db('packs').insert(packRow({ identifier: 'X', topology: 'magic' })),
      ],
    ])('refuses %s', async (_, act: () => PromiseLike<unknown>) => {
      await expect(Promise.resolve(act())).rejects.toThrow(/violates|null value|invalid input/);
    });

    it('takes the same rows when they say what can be', async () => {
      await expect(addOrderRow(db)).resolves.toBeGreaterThan(0);
      await expect(addResistor(db)).resolves.toBeGreaterThan(0);
    });
  });
});

function reserve(change: object): PromiseLike<unknown> {
  const row = { order_id: orderId, lot_id: lot.id, quantity: 1, state: 'held', ...change };
  return db('reservations').insert(row);
}
