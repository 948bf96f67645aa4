import { execFile } from 'node:child_process';
import { setTimeout as sleep } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import type { Knex } from 'knex';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { CataloguePart } from '../../server/domain/catalogue.ts';
import { openDatabase } from '../../server/store/connection.ts';
import { loadCatalogue, setPrice } from '../../server/store/parts.ts';
import { createStockView } from '../../server/store/stock-view.ts';
import { openTestDatabase, type TestDatabase } from '../support/database.ts';
import { addBin, addLot, addOrderRow, addResistor, post } from '../support/rows.ts';

let test: TestDatabase;
/** Another process, as far as the view can tell: a pool of its own. */
let db: Knex;
let view: ReturnType<typeof createStockView>;
let losses: Error[];
beforeAll(async () => {
  test = await openTestDatabase();
  db = test.db;
  await addBin(db);
  for (let k = 0; k < 6; k += 1) await stocked();
});
afterAll(() => test.drop());
beforeEach(() => {
  losses = [];
  view = createStockView(test.url, db, (error) => losses.push(error));
});
afterEach(() => view.close());

/** A new resistor with a lot of ten. */
async function stocked(): Promise<{ id: number; lotId: number }> {
  const id = await addResistor(db);
  const lot = await addLot(db, id);
  await post(db, lot.id, 10, 'received');
  return { id, lotId: lot.id };
}

const partIn = (parts: readonly CataloguePart[], id: number) =>
  parts.find((part) => part.id === id);

async function listeners(): Promise<{ pid: number; wait: string | null }[]> {
  return db('pg_stat_activity')
    .where({ application_name: 'tockwell-shelves' })
    .whereRaw('datname = current_database()')
    .select('pid', 'wait_event_type as wait');
}

async function endListeners(): Promise<void> {
  for (const { pid } of await listeners()) await db.raw('select pg_terminate_backend(?)', [pid]);
}

async function until(reached: () => boolean | Promise<boolean>): Promise<void> {
  for (const end = Date.now() + 5000; Date.now() < end; await sleep(5)) {
    if (await reached()) return;
  }
  throw new Error('It did not come about within five seconds.');
}

describe('the stock view', () => {
  describe('before anybody asks', () => {
    it('holds no connection', async () => {
      expect(await listeners()).toHaveLength(0);
      await view.current();
      expect(await listeners()).toHaveLength(1);
    });
  });

  describe('while nothing changes', () => {
    it('is the same frozen array, ascending by id, as a direct read has it', async () => {
      const first = await view.current();
      expect(first).toEqual(await loadCatalogue(db));
      expect(first.length).toBeGreaterThan(5);
      expect(first.map((part) => part.id)).toEqual(
        first.map((part) => part.id).toSorted((a, b) => a - b),
      );
      expect(Object.isFrozen(first) && first.every((part) => Object.isFrozen(part))).toBe(true);
      expect(await view.current()).toBe(first);
    });

    it('stays the same array when a notice comes for what is as it was', async () => {
      const { lotId } = await stocked();
      const before = await view.current();
      await db('lots')
        .where({ id: lotId })
        .update({ code: `again-${lotId}` });
      expect(await view.current()).toBe(before);
    });
  });

  describe('when somebody else changes the shelves', () => {
    it('shows it to the next call, and nothing before it is committed', async () => {
      const { id, lotId } = await stocked();
      expect(partIn(await view.current(), id)?.available).toBe(10);
      const trx = await db.transaction();
      await post(trx, lotId, -4, 'lost');
      expect(partIn(await view.current(), id)?.available).toBe(10);
      await trx.commit();
      expect(partIn(await view.current(), id)?.available).toBe(6);
    });

    it('shows nothing of what is rolled back', async () => {
      const { lotId } = await stocked();
      const before = await view.current();
      const trx = await db.transaction();
      await post(trx, lotId, 5, 'found');
      await trx.rollback();
      expect(await view.current()).toBe(before);
    });

    it('reads the changed parts alone, and keeps every other as the same object', async () => {
      const [one, two] = [await stocked(), await stocked()];
      const before = await view.current();
      const read: unknown[] = [];
      const listen = ({ sql, bindings }: { sql: string; bindings: unknown[] }) => {
        if (sql.includes('json_agg')) read.push(bindings[0]);
      };
      db.on('query', listen);
      await post(db, one.lotId, -1, 'lost');
      await setPrice(db, two.id, 9);
      const after = await view.current();
      db.off('query', listen);
      expect(read).toEqual([[one.id, two.id]]);
      expect(after).not.toBe(before);
      expect(after.filter((part, k) => part !== before[k]).map((part) => part.id)).toEqual([
        one.id,
        two.id,
      ]);
      expect(before.find((part) => part.id === one.id)?.available).toBe(10);
    });

    it('shows a new price, a new part in its place, and a retired part no more', async () => {
      const [old, kept] = [await stocked(), await stocked()];
      await view.current();
      await setPrice(db, kept.id, 77);
      await db('parts').where({ id: old.id }).update({ active: false });
      const fresh = await stocked();
      const parts = await view.current();
      expect(partIn(parts, kept.id)?.priceMinor).toBe(77);
      expect(partIn(parts, old.id)).toBeUndefined();
      expect(partIn(parts, fresh.id)?.onHand).toBe(10);
      await db('parts').where({ id: old.id }).update({ active: true });
      expect(await view.current()).toEqual(await loadCatalogue(db));
    });

    it('shows both of two parts that change together while one of them is read', async () => {
      const [one, two] = [await stocked(), await stocked()];
      await view.current();
      await post(db, one.lotId, 1, 'found');
      const trx = await db.transaction();
      await trx.raw('lock table lots in access exclusive mode');
      const answer = view.current();
      await until(async () => (await listeners()).some(({ wait }) => wait === 'Lock'));
      await db.transaction(async (both) => {
        await setPrice(both, one.id, 55);
        await setPrice(both, two.id, 55);
      });
      await trx.rollback();
      const parts = await answer;
      expect(partIn(parts, one.id)?.priceMinor).toBe(55);
      expect(partIn(parts, two.id)?.priceMinor).toBe(55);
    });

    it('shows a change of very many parts in one statement', async () => {
      await db.raw(`
        insert into parts (sku, kind, name, mounting, cost_minor, price_minor, ohms, tolerance,
          temperature_coefficient_per_kelvin, rated_watts)
        select 'MANY-' || k, 'resistor', 'Resistor', 'surface-mount', 1, 2, k, 0.01, 5e-5, 0.1
        from generate_series(1, 700) k`);
      await view.current();
      await db('parts').whereLike('sku', 'MANY-%').update({ price_minor: 3 });
      const parts = await view.current();
      expect(parts.filter((part) => part.priceMinor === 3)).toHaveLength(700);
      await db('parts').whereLike('sku', 'MANY-%').delete();
      expect(await view.current()).toEqual(await loadCatalogue(db));
    });
  });

  describe('when two processes keep one each', () => {
    it('shows the change in both', async () => {
      const other = createStockView(test.url, db);
      const { id, lotId } = await stocked();
      await Promise.all([view.current(), other.current()]);
      await post(db, lotId, 3, 'found');
      const both = await Promise.all([view.current(), other.current()]);
      expect(both.map((parts) => partIn(parts, id)?.available)).toEqual([13, 13]);
      await other.close();
    });
  });

  describe('when a part lies in several lots', () => {
    it('names those with unreserved pieces, by day then id, with what was measured', async () => {
      const id = await addResistor(db);
      const late = await addLot(db, id);
      const sold = await addLot(db, id);
      const early = await addLot(db, id);
      await post(db, late.id, 3, 'received');
      await post(db, sold.id, 4, 'received');
      await post(db, early.id, 5, 'received');
      await db('lots').where({ id: early.id }).update({ received_on: '2025-12-01' });
      const measured = { measured_mean: 998.4, measured_deviation: 1.7, measured_count: 20 };
      await db('lots').where({ id: early.id }).update(measured);
      const order = await addOrderRow(db);
      await db('reservations').insert([
        { order_id: order, lot_id: sold.id, quantity: 4, state: 'held' },
        { order_id: order, lot_id: late.id, quantity: 1, state: 'held' },
      ]);
      const part = partIn(await view.current(), id);
      expect(part).toMatchObject({ onHand: 12, reserved: 5, available: 7 });
      const none = { measuredMean: null, measuredDeviation: null, measuredCount: null };
      expect(part?.lots).toEqual([
        {
          id: early.id,
          available: 5,
          measuredMean: 998.4,
          measuredDeviation: 1.7,
          measuredCount: 20,
        },
        { id: late.id, available: 2, ...none },
      ]);
    });
  });

  describe('when its connection is lost', () => {
    it('opens another and misses nothing of what happened meanwhile', async () => {
      const { id, lotId } = await stocked();
      const before = await view.current();
      await endListeners();
      await post(db, lotId, 2, 'found');
      const after = await view.current();
      expect(partIn(after, id)?.available).toBe(12);
      expect(after[0]).toBe(before[0]);
      expect(await listeners()).toHaveLength(1);
      await post(db, lotId, 1, 'found');
      expect(partIn(await view.current(), id)?.available).toBe(13);
    });

    it('keeps the array when nothing happened meanwhile', async () => {
      const before = await view.current();
      await endListeners();
      await until(async () => (await listeners()).length === 0);
      expect(await view.current()).toBe(before);
    });

    it('answers a read that was under way from a new one', async () => {
      const { id, lotId } = await stocked();
      await view.current();
      const trx = await db.transaction();
      await trx.raw('lock table parts in access exclusive mode');
      await post(db, lotId, 5, 'found');
      const answer = view.current();
      await until(async () => (await listeners()).some(({ wait }) => wait === 'Lock'));
      await endListeners();
      await until(() => losses.length > 0);
      await trx.rollback();
      expect(partIn(await answer, id)?.available).toBe(15);
    });
  });

  describe('when no connection can be opened for it', () => {
    it('reads everything at each call, and says why', async () => {
      const lone = createStockView('postgres://nobody@127.0.0.1:1/none', db, (error) =>
        losses.push(error),
      );
      const { id, lotId } = await stocked();
      expect(partIn(await lone.current(), id)?.available).toBe(10);
      await post(db, lotId, 1, 'found');
      expect(partIn(await lone.current(), id)?.available).toBe(11);
      expect(losses.map(({ message }) => message).join()).toMatch(/ECONNREFUSED/);
      await lone.close();
    });

    it('hands the caller the error when the other way is shut too', async () => {
      const pool = openDatabase('postgres://nobody@127.0.0.1:1/none', 1);
      const lone = createStockView('postgres://nobody@127.0.0.1:1/none', pool);
      await expect(lone.current()).rejects.toThrow(/ECONNREFUSED/);
      await expect(lone.current()).rejects.toThrow(/ECONNREFUSED/);
      await lone.close();
      await pool.destroy();
    });
  });

  describe('when it is closed', () => {
    it('ends its connection and refuses further calls', async () => {
      await view.current();
      await view.close();
      await until(async () => (await listeners()).length === 0);
      await expect(view.current()).rejects.toThrow('The stock view is closed.');
    });

    it('does not wait for a read under way; the reader is told', async () => {
      const { lotId } = await stocked();
      await view.current();
      await post(db, lotId, 5, 'found');
      const trx = await db.transaction();
      await trx.raw('lock table parts in access exclusive mode');
      const answer = expect(view.current()).rejects.toThrow('The stock view is closed.');
      await until(async () => (await listeners()).some(({ wait }) => wait === 'Lock'));
      await view.close();
      await answer;
      await trx.rollback();
    });

    it('lets the process end', async () => {
      const at = (file: string) =>
        JSON.stringify(fileURLToPath(new URL(`../../server/store/${file}`, import.meta.url)));
      const script = `
        import { openDatabase } from ${at('connection.ts')};
        import { createStockView } from ${at('stock-view.ts')};
        const db = openDatabase(process.env.URL, 1);
        const view = createStockView(process.env.URL, db);
        console.log((await view.current()).length);
        await view.close();
        await db.destroy();`;
      const args = ['--import', 'tsx', '--input-type=module', '-e', script];
      const options = { env: { ...process.env, URL: test.url }, timeout: 20_000 };
      const { stdout } = await promisify(execFile)(process.execPath, args, options);
      expect(Number(stdout)).toBeGreaterThan(5);
    });
  });
});
