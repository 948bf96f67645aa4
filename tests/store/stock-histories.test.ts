import fc from 'fast-check';
import type { Knex } from 'knex';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { allocate } from '../../server/domain/stock.ts';
import {
  holdShares,
  lockLotsOfParts,
  moveReservations,
  postToLedger,
} from '../../server/store/stock.ts';
import { inTransaction } from '../../server/store/transaction.ts';
import { openTestDatabase, type TestDatabase } from '../support/database.ts';
import { addBin, addLot, addOrderRow, addResistor, post } from '../support/rows.ts';

let test: TestDatabase;
let db: Knex;
beforeAll(async () => {
  test = await openTestDatabase();
  db = test.db;
  await addBin(db);
});
afterAll(() => test.drop());

type Step =
  | { kind: 'receive'; lot: number; pieces: number }
  | { kind: 'correct'; lot: number; pieces: number }
  | { kind: 'hold'; pieces: number }
  | { kind: 'allocate' | 'release' | 'ship'; order: number };

const step: fc.Arbitrary<Step> = fc.oneof(
  fc.record({
    kind: fc.constantFrom('receive' as const, 'correct' as const),
    lot: fc.nat(2),
    pieces: fc.integer({ min: 1, max: 9 }),
  }),
  fc.record({ kind: fc.constant('hold' as const), pieces: fc.integer({ min: 1, max: 12 }) }),
  fc.record({
    kind: fc.constantFrom('allocate' as const, 'release' as const, 'ship' as const),
    order: fc.nat(5),
  }),
);

const actor = { id: null, name: 'Test' };

/** Buys pieces of a part as checkout does; the order's id, or null when the shelf is short. */
async function buy(partId: number, quantity: number): Promise<number | null> {
  const orderId = await addOrderRow(db);
  return inTransaction(db, async (trx) => {
    const lots = await lockLotsOfParts(trx, [partId]);
    const allocation = allocate([{ partId, quantity }], lots);
    if (allocation.kind === 'short') return null;
    await holdShares(trx, orderId, allocation.shares);
    return orderId;
  });
}

async function ship(orderId: number): Promise<void> {
  await inTransaction(db, async (trx) => {
    const rows = await trx('reservations').where({ order_id: orderId, state: 'allocated' });
    await moveReservations(trx, orderId, 'consumed');
    await postToLedger(
      trx,
      rows
        .filter((row) => row.state === 'allocated')
        .map((row) => ({
          lotId: row.lot_id,
          delta: -row.quantity,
          reason: 'shipped' as const,
          actor,
          at: new Date(),
          orderId,
        })),
    );
  });
}

/** What a careful clerk would have noted beside each step. */
class Clerk {
  onHand = [0, 0, 0];
  reserved = [0, 0, 0];
}

async function lotsNow(lots: readonly { id: number }[]) {
  const rows = await db('lots')
    .whereIn(
      'lots.id',
      lots.map(({ id }) => id),
    )
    .orderBy('lots.id')
    .select('on_hand', 'reserved')
    .select(
      db.raw('(select coalesce(sum(delta), 0) from stock_ledger where lot_id = lots.id) as ledger'),
    )
    .select(
      db.raw(`(select coalesce(sum(quantity), 0) from reservations
        where lot_id = lots.id and state in ('held', 'allocated')) as promised`),
    );
  return rows as { on_hand: number; reserved: number; ledger: number; promised: number }[];
}

describe('the shelf', () => {
  describe('when anything happens to it in any order', () => {
    it('has on hand what the ledger sums to, and reserved what is promised', async () => {
      await fc.assert(
        fc.asyncProperty(fc.array(step, { minLength: 4, maxLength: 16 }), async (steps) => {
          const partId = await addResistor(db);
          const lots = [
            await addLot(db, partId),
            await addLot(db, partId),
            await addLot(db, partId),
          ];
          const clerk = new Clerk();
          const orders: number[] = [];
          const states = new Map<number, string>();
          for (const one of steps) {
            await take(one, partId, lots, clerk, orders, states);
            const rows = await lotsNow(lots);
            for (const row of rows) {
              expect(row.on_hand).toBe(row.ledger);
              expect(row.reserved).toBe(row.promised);
              expect(row.reserved).toBeLessThanOrEqual(row.on_hand);
            }
            expect(rows.map((row) => row.on_hand)).toEqual(clerk.onHand);
            expect(rows.map((row) => row.reserved)).toEqual(clerk.reserved);
          }
        }),
        { numRuns: 30, seed: 12 },
      );
    });
  });
});

async function take(
  one: Step,
  partId: number,
  lots: readonly { id: number }[],
  clerk: Clerk,
  orders: number[],
  states: Map<number, string>,
): Promise<void> {
  if (one.kind === 'receive' || one.kind === 'correct') {
    const delta = one.kind === 'receive' ? one.pieces : -one.pieces;
    const possible = clerk.onHand[one.lot]! + delta >= clerk.reserved[one.lot]!;
    const posted = post(db, lots[one.lot]!.id, delta, one.kind === 'receive' ? 'received' : 'lost');
    if (!possible) return expect(posted).rejects.toThrow(/violates check/);
    await posted;
    clerk.onHand[one.lot]! += delta;
    return;
  }
  if (one.kind === 'hold') {
    const free = clerk.onHand.reduce((sum, count, k) => sum + count - clerk.reserved[k]!, 0);
    const orderId = await buy(partId, one.pieces);
    expect(orderId !== null).toBe(one.pieces <= free);
    if (orderId === null) return;
    orders.push(orderId);
    states.set(orderId, 'held');
    let left = one.pieces;
    clerk.onHand.forEach((count, k) => {
      const taken = Math.min(left, count - clerk.reserved[k]!);
      clerk.reserved[k]! += taken;
      left -= taken;
    });
    return;
  }
  const orderId = orders[one.order];
  if (orderId === undefined) return;
  const state = states.get(orderId)!;
  if (one.kind === 'allocate' && state === 'held') {
    await moveReservations(db, orderId, 'allocated');
    states.set(orderId, 'allocated');
    return;
  }
  const ends =
    one.kind === 'ship' ? state === 'allocated' : state === 'held' || state === 'allocated';
  if (one.kind === 'allocate' || (one.kind === 'ship' && !ends)) return;
  const rows = await db('reservations').where({ order_id: orderId });
  if (one.kind === 'ship') await ship(orderId);
  else await moveReservations(db, orderId, 'released');
  if (!ends) return;
  states.set(orderId, 'ended');
  for (const row of rows) {
    const k = lots.findIndex(({ id }) => id === row.lot_id);
    clerk.reserved[k]! -= row.quantity;
    if (one.kind === 'ship') clerk.onHand[k]! -= row.quantity;
  }
}

describe('reserving stock', () => {
  describe('when many buyers want the last pieces at the same moment', () => {
    it('grants as many as there are, and no buyer half', async () => {
      const partId = await addResistor(db);
      const lots = [await addLot(db, partId), await addLot(db, partId)];
      await post(db, lots[0]!.id, 3, 'received');
      await post(db, lots[1]!.id, 4, 'received');
      const bought = await Promise.all([1, 2, 3, 4, 5].map(() => buy(partId, 2)));
      expect(bought.filter((id) => id !== null)).toHaveLength(3);
      const rows = await lotsNow(lots);
      expect(rows.map((row) => row.reserved)).toEqual([3, 3]);
    });

    it('does not deadlock when they want the same two parts in opposite order', async () => {
      const parts = [await addResistor(db), await addResistor(db)];
      for (const partId of parts) await post(db, (await addLot(db, partId)).id, 100, 'received');
      const both = (partIds: number[]) =>
        inTransaction(db, async (trx) => {
          const orderId = await addOrderRow(trx as Knex);
          const lots = await lockLotsOfParts(trx, partIds);
          const found = allocate(
            partIds.map((partId) => ({ partId, quantity: 1 })),
            lots,
          );
          if (found.kind === 'allocated') await holdShares(trx, orderId, found.shares);
        });
      const tries = Array.from({ length: 12 }, (_, k) =>
        both(k % 2 ? parts : [...parts].reverse()),
      );
      await expect(Promise.all(tries)).resolves.toHaveLength(12);
    });
  });
});
