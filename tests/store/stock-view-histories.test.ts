import { setImmediate as nextTurn } from 'node:timers/promises';
import fc from 'fast-check';
import type { Knex } from 'knex';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { CataloguePart } from '../../server/domain/catalogue.ts';
import { loadCatalogue, setPrice } from '../../server/store/parts.ts';
import { createStockView } from '../../server/store/stock-view.ts';
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

const changes = {
  receive: (trx: Knex, { lots }: Shelves, k: number) =>
    post(trx, lots[k % lots.length]!, (k % 7) + 1, 'received'),
  hold: async (trx: Knex, { lots }: Shelves, k: number) => {
    const lot_id = lots[k % lots.length]!;
    const lot = await trx('lots').where({ id: lot_id }).first();
    if (lot.on_hand === lot.reserved) return;
    const order_id = await addOrderRow(trx);
    await trx('reservations').insert({ order_id, lot_id, quantity: 1, state: 'held' });
  },
  release: (trx: Knex, { lots }: Shelves, k: number) =>
    trx('reservations')
      .where({ lot_id: lots[k % lots.length]!, state: 'held' })
      .update({ state: 'released' }),
  measure: (trx: Knex, { lots }: Shelves, k: number) =>
    trx('lots')
      .where({ id: lots[k % lots.length]! })
      .update({ measured_mean: 990 + k, measured_deviation: 2, measured_count: 10 }),
  moveLot: (trx: Knex, { lots, parts }: Shelves, k: number) =>
    trx('lots')
      .where({ id: lots[k % lots.length]! })
      .update({ part_id: parts[(k * 5) % parts.length]! }),
  newLot: async (trx: Knex, shelves: Shelves, k: number) => {
    shelves.lots.push((await addLot(trx, shelves.parts[k % shelves.parts.length]!)).id);
  },
  price: (trx: Knex, { parts }: Shelves, k: number) => setPrice(trx, parts[k % parts.length]!, k),
  retireOrRevive: (trx: Knex, { parts }: Shelves, k: number) =>
    trx('parts')
      .where({ id: parts[k % parts.length]! })
      .update({ active: trx.raw('not active') }),
  newPart: async (trx: Knex, { parts }: Shelves) => {
    parts.push(await addResistor(trx));
  },
};

interface Shelves {
  parts: number[];
  lots: number[];
}
type Change = [keyof typeof changes, number];

const change: fc.Arbitrary<Change> = fc.tuple(
  fc.constantFrom(...(Object.keys(changes) as (keyof typeof changes)[])),
  fc.nat(20),
);
/** Transactions of one or more changes, some rolled back; and losses of the connection. */
const step = fc.oneof(
  { weight: 12, arbitrary: fc.array(change, { minLength: 1, maxLength: 4 }) },
  { weight: 3, arbitrary: fc.constant('rollback' as const) },
  { weight: 1, arbitrary: fc.constant('cut' as const) },
);

async function take(one: 'rollback' | 'cut' | Change[], shelves: Shelves): Promise<void> {
  if (one === 'cut') {
    await db.raw(`select pg_terminate_backend(pid) from pg_stat_activity
      where application_name = 'tockwell-shelves' and datname = current_database()`);
    return;
  }
  const trx = await db.transaction();
  if (one === 'rollback') {
    await setPrice(trx, shelves.parts[0]!, 999);
    return void (await trx.rollback());
  }
  for (const [kind, k] of one) await changes[kind](trx, shelves, k);
  await trx.commit();
}

describe('the stock view', () => {
  describe('after any history of the shelves', () => {
    it('is at every step what a direct read finds', async () => {
      const view = createStockView(test.url, db);
      await fc.assert(
        fc.asyncProperty(fc.array(step, { minLength: 3, maxLength: 12 }), async (steps) => {
          const parts = [await addResistor(db), await addResistor(db), await addResistor(db)];
          const lots: number[] = [];
          for (const partId of parts) lots.push((await addLot(db, partId)).id);
          for (const lot of lots) await post(db, lot, 5, 'received');
          for (const one of steps) {
            const before = await view.current();
            await take(one, { parts, lots });
            const after = await view.current();
            expect(after).toEqual(await loadCatalogue(db));
            // Nobody who still works with the picture before sees it change.
            expect(after === before).toBe(sameFigures(after, before));
          }
        }),
        { numRuns: 40, seed: 21 },
      );
      await view.close();
    });
  });

  describe('when many ask while others buy', () => {
    it('never answers with less than was committed before the question', async () => {
      const views = [createStockView(test.url, db), createStockView(test.url, db)];
      const partId = await addResistor(db);
      const priceIn = (parts: readonly CataloguePart[]) =>
        parts.find((part) => part.id === partId)!.priceMinor;
      let committed = 4;
      let asked = 0;
      let writing = true;
      const ask = async (k: number) => {
        while (writing) {
          const least = committed;
          asked += 1;
          expect(priceIn(await views[k % 2]!.current())).toBeGreaterThanOrEqual(least);
          await nextTurn();
        }
      };
      const write = async () => {
        for (let price = 5; price <= 300; price += 1) {
          await setPrice(db, partId, price);
          committed = price;
        }
        writing = false;
      };
      await Promise.all([write(), ...Array.from({ length: 50 }, (_, k) => ask(k))]);
      expect(asked).toBeGreaterThan(1000);
      for (const view of views) {
        expect(priceIn(await view.current())).toBe(300);
        await view.close();
      }
    });
  });

  describe('when two parts always change together', () => {
    it('shows both changes or neither', async () => {
      const view = createStockView(test.url, db);
      const [one, two] = [await addResistor(db), await addResistor(db)];
      let writing = true;
      const write = async () => {
        for (let price = 5; price <= 200; price += 1) {
          await db.transaction(async (trx) => {
            await setPrice(trx, one, price);
            await setPrice(trx, two, price);
          });
        }
        writing = false;
      };
      const ask = async () => {
        while (writing) {
          const parts = await view.current();
          const prices = parts
            .filter(({ id }) => id === one || id === two)
            .map((part) => part.priceMinor);
          expect(prices[0]).toBe(prices[1]);
          await nextTurn();
        }
      };
      await Promise.all([write(), ask(), ask()]);
      await view.close();
    });
  });
});

function sameFigures(after: readonly CataloguePart[], before: readonly CataloguePart[]): boolean {
  return JSON.stringify(after) === JSON.stringify(before);
}
