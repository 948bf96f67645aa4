import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { groupByValue } from '../../../server/engine/search/resistor-values.ts';
import { idealThresholdOhms } from '../../../server/engine/search/rules.ts';
import type { StockedResistor } from '../../../server/engine/search/shelf.ts';
import { thresholdSets } from '../../../server/engine/search/threshold-sets.ts';
import { thresholdChoices } from './exhaustive-search.ts';
import { briefAt, workshop } from './workshop-shelf.ts';

const resistor = fc.record({
  mantissa: fc.integer({ min: 10, max: 99 }),
  decade: fc.constantFrom(1e2, 1e3, 1e4),
  available: fc.constantFrom(2, 3, 6, 40, 40),
  priceMinor: fc.constantFrom(4, 6, 48),
  tolerance: fc.constantFrom(0.05, 0.01, 0.01, 0.001),
});
const shelf = fc.array(resistor, { minLength: 4, maxLength: 60 }).map((parts) =>
  parts.map(({ mantissa, decade, ...part }, k): StockedResistor => ({
    ...part,
    id: k + 1,
    ohms: mantissa * decade,
    temperatureCoefficientPerKelvin: 5e-5,
    ratedWatts: 0.25,
  })),
);
const wish = fc.record({
  duty: fc.oneof(
    fc.constantFrom(0.5, 0.495, 0.505, 0.05, 0.95, 0.049, 0.951),
    fc.double({ min: 0.05, max: 0.95, noNaN: true }),
  ),
  quantity: fc.integer({ min: 1, max: 2 }),
  targetHz: fc.constantFrom(1, 440, 9e3),
});
const comparators = fc.constantFrom(...workshop.comparators);

describe('thresholdSets', () => {
  it('are those that plain loops over the shelf find by the written rule', () => {
    const met = { none: 0, one: 0, several: 0, equal: 0, shifted: 0 };
    fc.assert(
      fc.property(shelf, comparators, wish, (parts, comparator, change) => {
        const brief = briefAt(change.targetHz, change);
        const expected = thresholdChoices(parts, comparator, brief);
        const sets = thresholdSets(groupByValue(parts), comparator, brief);
        expect(sets.map(({ r1, r2, r3 }) => [r1.id, r2.id, r3.id])).toEqual(
          expected.map((set) => set.map(({ id }) => id)),
        );
        met[sets.length === 0 ? 'none' : sets.length === 1 ? 'one' : 'several'] += 1;
        const [set] = sets;
        if (set) met[set.r1 === set.r2 && set.r2 === set.r3 ? 'equal' : 'shifted'] += 1;
      }),
      { numRuns: 1500, seed: 9 },
    );
    expect(Math.min(...Object.values(met))).toBeGreaterThan(80);
  });

  it('are looked up again where the ideal value is the same', () => {
    const values = groupByValue(workshop.resistors);
    const known = new Map();
    const [first] = workshop.comparators;
    const sets = thresholdSets(values, first!, briefAt(1), known);
    expect(thresholdSets(values, { ...first!, id: 9 }, briefAt(1), known)).toBe(sets);
  });
});

describe('idealThresholdOhms', () => {
  const [pushPull, openDrain] = workshop.comparators;
  const at = (change: Partial<NonNullable<typeof pushPull>>, hertz = 1) =>
    idealThresholdOhms({ ...pushPull!, ...change }, briefAt(hertz));

  it('is a megohm for a comparator without bias', () => {
    expect(at({ maxInputBiasAmps: 0 })).toBe(1e6);
  });

  it('falls with bias, of either sign, and with speed', () => {
    expect(at({ maxInputBiasAmps: 1e-7 })).toBeCloseTo((0.006 * 4.75) / 1e-7, 3);
    expect(at({ maxInputBiasAmps: -1e-7 })).toBe(at({ maxInputBiasAmps: 1e-7 }));
    expect(at({}, 1e4)).toBeCloseTo(0.006 / (1e4 * 1e-11), 3);
  });

  it('stays above output resistance and pull-up, and at 10 kΩ at least', () => {
    expect(at({ maxInputBiasAmps: 1e-4 })).toBe(1e4);
    expect(at({ maxInputBiasAmps: 1e-4, highOhms: 150 })).toBe(1.5e4);
    expect(idealThresholdOhms({ ...openDrain!, maxInputBiasAmps: 1e-4 }, briefAt(1))).toBe(2e5);
  });
});
