import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { analyseResponseSchema } from '../../server/contracts/circuits.ts';
import { packPageSchema, solveResponseSchema, type Pack } from '../../server/contracts/packs.ts';
import { circuitOf, referenceRows, type Row } from '../engine/reference-rows.ts';
import { openTestShop, type TestShop, type Visit } from '../support/test-shop.ts';
import { signIn, solve } from '../support/shopping.ts';

let shop: TestShop;
let guest: Visit;
let owner: Visit;
beforeAll(async () => {
  shop = await openTestShop();
  guest = shop.visit();
  owner = await signIn(shop, 'owner');
});
afterAll(() => shop.close());

const partOf = (pack: Pack, role: string) => pack.parts.find((part) => part.role === role);

/** Sets what is on hand of a part in all, by the owner's own call, lot by lot. */
async function setStock(sku: string, onHand: number): Promise<void> {
  const { body } = await owner.get(`/api/desk/parts?search=${sku}`);
  const part = body.items.find((item: { part: { sku: string } }) => item.part.sku === sku);
  for (const [k, lot] of part.lots.entries()) {
    const change = { lotId: lot.id, onHand: k === 0 ? onHand : 0, reason: 'counted', note: 'test' };
    await owner.post(`/api/desk/parts/${part.id}/stock`).send(change).expect(200);
  }
}

async function availableOf(sku: string): Promise<number> {
  const [row] = await shop
    .db('lots')
    .join('parts', 'parts.id', 'lots.part_id')
    .where('parts.sku', sku)
    .sum({ left: shop.db.raw('on_hand - reserved') as unknown as string });
  return Number(row?.left);
}

describe('solving a brief', () => {
  describe('when only the target is given', () => {
    it('fills in what api says and answers by its contract', async () => {
      const answer = solveResponseSchema.parse(
        await solve(guest, { target: { value: 90, unit: 'per_minute' } }),
      );
      expect(answer.brief).toMatchObject({
        targetHz: 1.5,
        duty: 0.5,
        band: 0.05,
        supply: { volts: 5 },
        load: { kind: 'led', colour: 'red', amps: 0.002 },
        ambient: { minCelsius: 0, maxCelsius: 40 },
        mounting: 'through-hole',
        careLevel: 'as-stocked',
        quantity: 1,
      });
      expect(answer.packs[0]!.wins).toContain('best-value');
      expect(answer.packs[0]!.promise.yieldWithinBand).toBeGreaterThanOrEqual(0.99);
      expect(answer.packs.length).toBeLessThanOrEqual(10);
    });

    it('takes a rate above twenty a second for a clock', async () => {
      const { brief } = await solve(guest, { target: { value: 21, unit: 'Hz' } });
      expect(brief.load.kind).toBe('logic');
    });
  });

  describe('when the closest is asked over six decades', () => {
    const rates = Array.from({ length: 25 }, (_, k) => 0.05 * (5e4 / 0.05) ** (k / 24));

    it.each(rates)('comes within 0.1 % of %s Hz, from what is on the shelf', async (value) => {
      const brief = { target: { value, unit: 'Hz' as const }, load: { kind: 'logic' as const } };
      const { packs } = await solve(guest, { ...brief, rank: 'closest', limit: 1 });
      const [pack] = packs;
      expect(Math.abs(pack!.promise.frequencyHz / value - 1)).toBeLessThan(1e-3);
      expect(pack!.promise.error).toBeCloseTo(pack!.promise.frequencyHz / value - 1, 12);
      expect(pack!.wins).toContain('closest');
    });
  });

  describe('when many kits are asked for', () => {
    it('offers only packs that the shelves can make that often', async () => {
      for (const quantity of [1, 8, 40]) {
        const { packs } = await solve(guest, {
          target: { value: 440, unit: 'Hz' },
          quantity,
          rank: 'closest',
          limit: 20,
        });
        for (const pack of packs) {
          expect(pack.makeable).toBeGreaterThanOrEqual(quantity);
          expect(pack.price.total.amount).toBe(pack.price.unit.amount * quantity);
          const uses = new Map<string, number>();
          for (const { sku } of pack.parts) uses.set(sku, (uses.get(sku) ?? 0) + 1);
          const kits = await Promise.all(
            [...uses].map(async ([sku, count]) => Math.floor((await availableOf(sku)) / count)),
          );
          expect(pack.makeable).toBe(Math.min(...kits));
        }
      }
    });
  });

  describe('when a part that a pack uses runs low', () => {
    it('counts a value used by several roles once for each', async () => {
      const brief = {
        target: { value: 700, unit: 'Hz' as const },
        load: { kind: 'logic' as const },
      };
      const [pack] = (await solve(guest, { ...brief, rank: 'closest' })).packs;
      const threshold = partOf(pack!, 'R1')!.sku;
      const uses = pack!.parts.filter((part) => part.sku === threshold).length;
      expect(uses).toBeGreaterThanOrEqual(3);
      const before = await availableOf(threshold);
      await setStock(threshold, 2 * uses + 1);
      const page = packPageSchema.parse((await guest.get(`/api/packs/${pack!.token}`)).body);
      expect(page.pack.makeable).toBe(2);
      await setStock(threshold, uses - 1);
      const { packs } = await solve(guest, { ...brief, rank: 'closest', limit: 20 });
      expect(packs.every((other) => other.token !== pack!.token)).toBe(true);
      await setStock(threshold, before);
      const again = await solve(guest, { ...brief, rank: 'closest' });
      expect(again.packs[0]!.token).toBe(pack!.token);
    });
  });

  describe('when the owner changes a price', () => {
    it('asks the new one at once, on packs and on links to them', async () => {
      const brief = { target: { value: 310, unit: 'Hz' as const }, rank: 'closest' as const };
      const [before] = (await solve(guest, brief)).packs;
      const sku = partOf(before!, 'C1')!.sku;
      const { body } = await owner.get(`/api/desk/parts?search=${sku}`);
      const part = body.items.find((item: { part: { sku: string } }) => item.part.sku === sku);
      const amount = part.part.unitPrice.amount + 100;
      const change = { unitPrice: { amount, currency: 'EUR' }, reason: 'dearer now' };
      await owner.patch(`/api/desk/parts/${part.id}/price`).send(change).expect(200);
      const [after] = (await solve(guest, brief)).packs;
      expect(after!.token).toBe(before!.token);
      expect(after!.price.unit.amount - before!.price.unit.amount).toBeGreaterThanOrEqual(122);
      expect(after!.price.unit.amount - before!.price.unit.amount).toBeLessThanOrEqual(124);
      const page = packPageSchema.parse((await guest.get(`/api/packs/${before!.token}`)).body);
      expect(page.pack.price.unit).toEqual(after!.price.unit);
      const lines = page.priceLines.reduce((sum, line) => sum + line.amount.amount, 0);
      expect(lines).toBe(after!.price.unit.amount);
    });
  });

  describe('when a link to a pack was altered', () => {
    it('leads to no pack', async () => {
      const [pack] = (await solve(guest, { target: { value: 5, unit: 's' } })).packs;
      const [body, tag] = pack!.token.split('.');
      for (const token of [`${body}x.${tag}`, `${body}.${tag!.slice(1)}a`, body!]) {
        expect((await guest.get(`/api/packs/${token}`)).status).toBe(404);
      }
    });
  });

  describe('when no physics can do it', () => {
    it('says which colours work from the supply', async () => {
      const body = {
        target: { value: 1, unit: 'Hz' },
        supply: { volts: 2.5 },
        load: { kind: 'led', colour: 'blue' },
      };
      const answer = await guest.post('/api/packs/solve').send(body);
      expect(answer.status).toBe(422);
      expect(answer.body.type).toMatch(/\/impossible-brief$/);
      expect(answer.body.errors[0].path).toBe('load.colour');
      expect(answer.body.detail).toMatch(/one of these colours: .*red/);
    });
  });

  describe('when the shelves cannot hold it', () => {
    it('advises a change that then works', async () => {
      const brief = { target: { value: 60, unit: 'per_minute' as const }, band: 0.001 };
      const { advice } = await solve(guest, brief);
      const wider = advice.find(({ code }) => code === 'band');
      expect(wider?.change).toBeTruthy();
      const helped = await solve(guest, { ...brief, ...wider!.change });
      expect(helped.advice).toEqual([]);
      expect(helped.packs[0]!.wins).toContain('best-value');
    });

    it('lowers a quantity to what the shelves hold', async () => {
      const brief = { target: { value: 60, unit: 'per_minute' as const }, quantity: 500 };
      const { packs, advice } = await solve(guest, brief);
      expect(packs).toEqual([]);
      const most = advice.find(({ code }) => code === 'quantity')!.change!.quantity as number;
      expect((await solve(guest, { ...brief, quantity: most })).packs.length).toBeGreaterThan(0);
      expect((await solve(guest, { ...brief, quantity: most + 1 })).packs).toEqual([]);
    });
  });
});

/** A reference case as a request. */
function requestOf(row: Row) {
  const { r1Ohms, r2Ohms, r3Ohms, ...rest } = circuitOf(row);
  return { ...rest, thresholds: { r1Ohms, r2Ohms, r3Ohms } };
}

const cases = (file: string, pred?: string) =>
  referenceRows(file)
    .filter((row) => pred === undefined || row('pred') === pred)
    .map((row) => [row('case_id'), row] as const);

describe('analysing a circuit', () => {
  it.each(cases('cases_public.csv'))(
    'agrees with the reference for case %s (outside truth: circuit equations and simulator)',
    async (_, row) => {
      const answer = await guest.post('/api/circuits/analyse').send(requestOf(row)).expect(200);
      const cycle = analyseResponseSchema.parse(answer.body);
      const away = (value: number, column: string) => Math.abs(value / Number(row(column)) - 1);
      expect(away(cycle.periodSeconds, 'pred_period_s')).toBeLessThan(1e-8);
      expect(away(cycle.duty, 'pred_duty')).toBeLessThan(1e-8);
    },
  );

  it.each(cases('cases_nonosc_public.csv', 'refused'))(
    'refuses case %s, which cannot oscillate, with a reason',
    async (_, row) => {
      const answer = await guest.post('/api/circuits/analyse').send(requestOf(row));
      expect(answer.status).toBe(422);
      expect(answer.body.type).toMatch(/\/no-oscillation$/);
      expect(answer.body.detail).toMatch(/\. (Lower|Raise|Choose)|choose/);
    },
  );

  const good = {
    supplyVolts: 5,
    thresholds: { r1Ohms: 1e6, r2Ohms: 1e6, r3Ohms: 1e6 },
    timing: { kind: 'single', ohms: 880000 },
    capacitor: { farads: 8.2e-7 },
  };

  it('spreads it over tolerances, repeatably by its seed', async () => {
    const tolerances = {
      thresholds: 0.01,
      timing: 0.01,
      capacitor: 0.05,
      targetHz: 1,
      samples: 20000,
    };
    const body = { ...good, tolerances: { ...tolerances, seed: 7 } };
    const [one, other] = [
      await guest.post('/api/circuits/analyse').send(body).expect(200),
      await guest.post('/api/circuits/analyse').send(body).expect(200),
    ];
    const { spread } = analyseResponseSchema.parse(one.body);
    expect(other.body.spread).toEqual(spread);
    // Model section 5: S(R1) = S(R2) = −0.3607, S(R3) = 0.7213, S(R4) = S(C) = −1.
    const rss = Math.hypot(0.003607, 0.003607, 0.007213, 0.01, 0.05);
    expect(spread!.rssFraction).toBeCloseTo(rss, 5);
    expect(spread!.worstCase.minHz).toBeLessThan(one.body.frequencyHz * 0.94);
    expect(spread!.worstCase.maxHz).toBeGreaterThan(one.body.frequencyHz * 1.06);
    expect(spread!.yieldWithinBand).toBeGreaterThan(0.7);
    expect(spread!.yieldWithinBand).toBeLessThan(1);
  });

  it.each([
    ['a supply of nothing', { supplyVolts: 0 }, 'supplyVolts'],
    ['a negative resistance', { timing: { kind: 'single', ohms: -5 } }, 'timing.ohms'],
    ['no capacitance', { capacitor: { farads: 0 } }, 'capacitor.farads'],
    ['1e308 ohms', { thresholds: { r1Ohms: 1e308, r2Ohms: 1, r3Ohms: 1 } }, 'thresholds.r1Ohms'],
    ['text for a number', { supplyVolts: 'NaN' }, 'supplyVolts'],
    [
      'an open drain without a pull-up',
      { comparator: { output: 'open-drain' } },
      'comparator.pullUpOhms',
    ],
    ['timing of another kind', { timing: { kind: 'magic' } }, 'timing.kind'],
  ])('answers %s with a sentence at its field', async (_, change, path) => {
    const answer = await guest.post('/api/circuits/analyse').send({ ...good, ...change });
    expect(answer.status).toBe(422);
    expect(answer.body.errors[0].path).toBe(path);
    expect(answer.body.errors[0].message).toMatch(/must be|needs|give/);
  });
});
