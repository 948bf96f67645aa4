import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  eSeriesMantissas,
  isPreferred,
  nearestPreferred,
  preferredAtLeast,
  preferredBetween,
  type ESeries,
} from '../../server/engine/e-series.ts';
import { referenceRows } from './reference-rows.ts';

const allSeries: readonly ESeries[] = ['E3', 'E6', 'E12', 'E24', 'E48', 'E96', 'E192'];
const isSeries = (name: string): name is ESeries => allSeries.some((series) => series === name);
const invariants = referenceRows('e_series_invariants.csv').map((row) => {
  const series = row('series');
  if (!isSeries(series)) throw new Error(`${series} is no series.`);
  return { series, row };
});

function worstNearestPercent(series: ESeries): number {
  const values = preferredBetween(1, 10, series);
  const worst = values.slice(1).map((above, index) => {
    const below = values[index] ?? above;
    const target = (below + above) / 2;
    return Math.abs(nearestPreferred(target, series, 'difference') - target) / target;
  });
  return 100 * Math.max(...worst);
}

describe('eSeriesMantissas', () => {
  it('holds every value of IEC 60063, in order', () => {
    const rows = referenceRows('e_series.csv');
    const listed = rows.map((row) => `${row('series')} ${Number(row('mantissa'))}`);
    const generated = allSeries.flatMap((series) =>
      eSeriesMantissas(series).map(
        (mantissa) => `${series} ${mantissa / (mantissa > 99 ? 100 : 10)}`,
      ),
    );
    expect(generated.sort()).toEqual(listed.sort());
    expect(generated).toHaveLength(381);
  });

  it('takes 9.20 and never 9.19, and the eight historic values of E24', () => {
    for (const row of referenceRows('e24_vs_formula.csv')) {
      const series = row('series');
      if (!isSeries(series)) throw new Error(`${series} is no series.`);
      expect(isPreferred(Number(row('standard_value')), series)).toBe(true);
      expect(isPreferred(Number(row('rounded_2sf')), series)).toBe(false);
      const mantissas = eSeriesMantissas(series);
      const scale = series === 'E192' ? 100 : 10;
      const index = Number(row('index_k'));
      expect(mantissas[index]).toBe(Math.round(Number(row('standard_value')) * scale));
      const exact = 10 ** (index / mantissas.length);
      expect(exact).toBeCloseTo(Number(row('10^(k/n)')), 4);
    }
  });

  it('follows the rounded formula everywhere else', () => {
    const apart = allSeries.flatMap((series) => {
      const mantissas = eSeriesMantissas(series);
      const scale = mantissas.length > 24 ? 100 : 10;
      return mantissas.flatMap((mantissa, index) => {
        const rounded = Math.round(scale * 10 ** (index / mantissas.length));
        return rounded === mantissa ? [] : [`${series} ${index}`];
      });
    });
    const listed = referenceRows('e24_vs_formula.csv').map(
      (row) => `${row('series')} ${row('index_k')}`,
    );
    expect(apart).toEqual(listed);
  });

  it.each(invariants)('has the count, sum, ends and steps of $series', ({ series, row }) => {
    const values = eSeriesMantissas(series);
    expect(values).toHaveLength(Number(row('count')));
    expect(values.reduce((sum, value) => sum + value, 0)).toBe(Number(row('sum_of_mantissas_x')));
    const decade = preferredBetween(1, 10, series);
    expect(decade[0]).toBe(Number(row('first')));
    expect(decade.at(-2)).toBe(Number(row('last')));
    const steps = decade.slice(1).map((value, index) => value / (decade[index] ?? value));
    expect(Math.max(...steps)).toBeCloseTo(Number(row('max_step_ratio')), 5);
    const worst = row('worst_nearest_error_pct(arith nearest, rel. to target)');
    expect(worstNearestPercent(series)).toBeCloseTo(Number(worst), 3);
  });
});

describe('nearestPreferred', () => {
  it('gives the very value in any decade', () => {
    expect(nearestPreferred(887_000, 'E96')).toBe(887_000);
    expect(nearestPreferred(8.21e-7, 'E24')).toBe(8.2e-7);
  });

  it('crosses into the next decade', () => {
    expect(nearestPreferred(9.9, 'E24')).toBe(10);
    expect(nearestPreferred(0.995, 'E3')).toBe(1);
  });

  describe('when ratio and difference disagree', () => {
    it('follows the one that was asked for', () => {
      // Between 4.7 and 10 the geometric mean is 6.86, the arithmetic 7.35.
      expect(nearestPreferred(7, 'E3', 'ratio')).toBe(10);
      expect(nearestPreferred(7, 'E3', 'difference')).toBe(4.7);
    });
  });

  it('finds nothing nearer by looking through all values', () => {
    for (const series of allSeries) {
      for (let value = 0.9; value < 120; value *= 1.0037) {
        const all = preferredBetween(0.1, 1000, series);
        const nearest = (measure: (one: number) => number) =>
          Math.min(...all.map((one) => measure(one)));
        const ratio = (one: number) => Math.abs(Math.log(one / value));
        const difference = (one: number) => Math.abs(one - value);
        expect(ratio(nearestPreferred(value, series))).toBeCloseTo(nearest(ratio), 12);
        expect(difference(nearestPreferred(value, series, 'difference'))).toBeCloseTo(
          nearest(difference),
          12,
        );
      }
    }
  });

  it('refuses a value that has no decade', () => {
    for (const value of [0, -1, NaN, Infinity]) {
      expect(() => nearestPreferred(value, 'E24')).toThrow(RangeError);
    }
  });
});

describe('preferredAtLeast', () => {
  it('keeps a preferred value and rounds any other up', () => {
    expect(preferredAtLeast(180, 'E24')).toBe(180);
    expect(preferredAtLeast(700, 'E24')).toBe(750);
    expect(preferredAtLeast(9200, 'E24')).toBe(10_000);
  });
});

describe('isPreferred', () => {
  it('knows that the two families do not nest', () => {
    const foreign = eSeriesMantissas('E24').filter((value) => !isPreferred(value, 'E192'));
    expect(foreign).toEqual([22, 27, 30, 33, 36, 39, 43, 51, 56, 62, 68, 82, 91]);
    expect(eSeriesMantissas('E24').filter((value) => !isPreferred(value, 'E96'))).toHaveLength(18);
    expect(eSeriesMantissas('E24').filter((value) => isPreferred(value, 'E48'))).toEqual([
      10, 11, 75,
    ]);
  });

  it('is false for what has no decade', () => {
    expect([-47, 0, NaN, Infinity].map((value) => isPreferred(value, 'E24'))).toEqual([
      false,
      false,
      false,
      false,
    ]);
  });
});

// No package on the npm registry holds these series; the table and the formula judge them above.
describe('every series, in every decade', () => {
  const anySeries = fc.constantFrom(...allSeries);
  const anyDecade = fc.integer({ min: -14, max: 12 });
  const anyMember = fc.tuple(anySeries, anyDecade, fc.nat(191)).map(([series, decade, place]) => {
    const mantissas = eSeriesMantissas(series);
    const mantissa = mantissas[place % mantissas.length] ?? 0;
    return { series, value: Number(`${mantissa}e${decade - (mantissas.length > 24 ? 2 : 1)}`) };
  });
  const anyValue = fc
    .tuple(fc.double({ min: 1, max: 9.999, noNaN: true }), anyDecade)
    .map(([mantissa, decade]) => mantissa * 10 ** decade);

  it('knows its own values, and gives them back as the nearest and as the least', () => {
    fc.assert(
      fc.property(anyMember, ({ series, value }) => {
        expect(isPreferred(value, series)).toBe(true);
        expect(nearestPreferred(value, series)).toBe(value);
        expect(nearestPreferred(value, series, 'difference')).toBe(value);
        expect(preferredAtLeast(value, series)).toBe(value);
        expect(preferredBetween(value, value, series)).toEqual([value]);
      }),
      { numRuns: 1000 },
    );
  });

  it('knows no value a millionth beside its own', () => {
    fc.assert(
      fc.property(anyMember, fc.constantFrom(1 - 1e-6, 1 + 1e-6), ({ series, value }, factor) => {
        expect(isPreferred(value * factor, series)).toBe(false);
        expect(nearestPreferred(value * factor, series)).toBe(value);
      }),
    );
  });

  it('takes as nearest a value of its own that no other undercuts', () => {
    fc.assert(
      fc.property(anySeries, anyValue, (series, value) => {
        const nearest = nearestPreferred(value, series, 'difference');
        expect(isPreferred(nearest, series)).toBe(true);
        const distance = Math.abs(nearest - value) * (1 - 1e-3);
        fc.pre(distance > 1e-5 * value);
        expect(preferredBetween(value - distance, value + distance, series)).toEqual([]);
      }),
      { numRuns: 1000 },
    );
  });

  it('takes as least a value of its own with none between', () => {
    fc.assert(
      fc.property(anySeries, anyValue, (series, value) => {
        const least = preferredAtLeast(value, series);
        expect(isPreferred(least, series)).toBe(true);
        expect(least).toBeGreaterThanOrEqual(value * (1 - 1e-9));
        expect(preferredBetween(value, least, series)).toEqual([least]);
      }),
      { numRuns: 1000 },
    );
  });

  it('is listed whole, in order and without repeats between any two ends', () => {
    fc.assert(
      fc.property(anyMember, fc.integer({ min: 1, max: 4 }), ({ series, value }, decades) => {
        const listed = preferredBetween(value, value * 10 ** decades, series);
        expect(listed).toHaveLength(decades * eSeriesMantissas(series).length + 1);
        expect(listed).toEqual([...new Set(listed)].sort((a, b) => a - b));
      }),
      { numRuns: 200 },
    );
  });
});
