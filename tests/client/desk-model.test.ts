import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  heightOf,
  holesOf,
  placeOf,
  rateWords,
  widestHole,
} from '../../client/features/desk/coverage.ts';
import { centsFrom, eurosText, priceFormSchema } from '../../client/features/desk/euros.ts';
import { readPartsQuery } from '../../client/features/desk/parts-query.ts';
import { narrow } from '../../client/lib/spaces.ts';

describe('centsFrom', () => {
  it.each([
    ['0.24', 24],
    ['0,24', 24],
    ['€ 1.5', 150],
    ['12', 1200],
    ['0.07', 7],
    ['1 250.00', 125_000],
  ])('reads %j as %i cents', (typed, cents) => {
    expect(centsFrom(typed)).toBe(cents);
  });
  it.each(['', '0.255', '1.2.3', '-1', '1e3', '.5', 'free', '1,250.00'])('refuses %j', (typed) => {
    expect(centsFrom(typed)).toBeNull();
  });
  it('reads back every amount it writes, to the cent', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 10_000_000 }), (cents) => {
        expect(centsFrom(eurosText(cents))).toBe(cents);
      }),
    );
  });
});

describe('priceFormSchema', () => {
  const problemsOf = (euros: string, reason: string) =>
    priceFormSchema.safeParse({ euros, reason }).error?.issues.map((issue) => issue.message);

  it('gives the server whole cents and the trimmed reason', () => {
    expect(priceFormSchema.parse({ euros: '0,26', reason: ' Film went up ' })).toEqual({
      unitPrice: { amount: 26, currency: 'EUR' },
      reason: 'Film went up',
    });
  });
  it('says how to write a price that cannot be read', () => {
    expect(problemsOf('0.255', 'Film went up')).toEqual([
      'Give the price in euros and cents, like 0.24.',
    ]);
  });
  it('refuses a price that the contract refuses, in its words', () => {
    expect(problemsOf('100000.01', 'Film went up')).toEqual(['The price is above 100,000.']);
  });
  it('wants a reason', () => {
    expect(problemsOf('0.26', '')).toHaveLength(1);
  });
});

describe('coverage', () => {
  const coverage = {
    band: 0.05,
    covered: 0.4,
    points: [
      { frequencyHz: 0.01, halfBand: null },
      { frequencyHz: 0.1, halfBand: 0.09 },
      { frequencyHz: 1, halfBand: 0.04 },
      { frequencyHz: 10, halfBand: 0.05 },
      { frequencyHz: 100, halfBand: 0.07 },
    ],
  };

  it('joins neighbouring rates that are not held into one hole', () => {
    expect(holesOf(coverage)).toEqual([
      { fromHz: 0.01, toHz: 0.1, worst: null, points: 2 },
      { fromHz: 100, toHz: 100, worst: 0.07, points: 1 },
    ]);
    expect(widestHole(coverage)?.fromHz).toBe(0.01);
  });
  it('has no hole where every rate is held', () => {
    const points = coverage.points.map((point) => ({ ...point, halfBand: 0.05 }));
    expect(holesOf({ ...coverage, points })).toEqual([]);
    expect(widestHole({ ...coverage, points })).toBeNull();
  });
  it('stands higher the tighter the band, by the same step for each halving', () => {
    const step = heightOf(0.05) - heightOf(0.1);
    expect(heightOf(0.025) - heightOf(0.05)).toBeCloseTo(step, 12);
    expect(step).toBeGreaterThan(0);
    expect(heightOf(0.0001)).toBe(1);
  });
  it('spaces the decades evenly', () => {
    expect([0.01, 0.1, 1, 10, 100].map((rate) => placeOf(rate, coverage))).toEqual([
      0,
      expect.closeTo(0.25, 12),
      expect.closeTo(0.5, 12),
      expect.closeTo(0.75, 12),
      1,
    ]);
  });
  it('says slow rates in hertz, not in millihertz', () => {
    expect(rateWords(0.6309573)).toBe(`0.63${narrow}Hz`);
    expect(rateWords(12_589)).toBe(`13${narrow}kHz`);
  });
});

describe('readPartsQuery', () => {
  const read = (values: Record<string, string>) => readPartsQuery((name) => values[name] ?? '', 2);

  it('takes what the address gives', () => {
    expect(read({ search: '820 nF', kind: 'capacitor', sort: 'price', direction: 'down' })).toEqual(
      {
        search: '820 nF',
        kind: 'capacitor',
        mounting: undefined,
        stock: 'all',
        sort: 'price',
        direction: 'down',
        page: 2,
        pageSize: 50,
      },
    );
  });
  it('counts what it cannot read as not given', () => {
    expect(read({ kind: 'spoon', sort: 'mood', stock: 'some' })).toMatchObject({
      kind: undefined,
      sort: 'sku',
      stock: 'all',
    });
  });
});
