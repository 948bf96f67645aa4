import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { eSeriesMantissas } from '../../../server/engine/e-series.ts';
import {
  firstNotBelow,
  formTimingTable,
  groupByValue,
  type TimingTable,
} from '../../../server/engine/search/resistor-values.ts';
import type { StockedResistor } from '../../../server/engine/search/shelf.ts';

function resistorOf(ohms: number, k: number): StockedResistor {
  return {
    id: k + 1,
    available: 5,
    priceMinor: [4, 6, 4][k % 3]!,
    ohms,
    tolerance: [0.05, 0.01, 0.001][k % 3]!,
    temperatureCoefficientPerKelvin: 1e-4,
    ratedWatts: 0.25,
  };
}

const shelf = fc
  .array(fc.constantFrom(470, 1e3, 2.2e3, 1e4, 1e4, 3.3e4, 1e5, 9.1e6), {
    minLength: 1,
    maxLength: 10,
  })
  .map((values) => values.map(resistorOf));

interface Way {
  name: string;
  ohms: number;
}

/** Every way to make a resistance from distinct values, by plain loops: 3, 3+4 or 3|4. */
function everyWay(values: readonly number[], pairs: readonly boolean[]): Way[] {
  const ways: Way[] = [];
  values.forEach((a, i) => {
    ways.push({ name: `${i}`, ohms: a });
    for (let j = i; j < values.length; j += 1) {
      if (!pairs[i] || !pairs[j]) continue;
      const b = values[j]!;
      ways.push({ name: `${i}+${j}`, ohms: a + b });
      ways.push({ name: `${i}|${j}`, ohms: (a * b) / (a + b) });
    }
  });
  return ways.filter(({ ohms }) => ohms >= 1e3 && ohms <= 1e7);
}

function waysOf(table: TimingTable): Way[] {
  return Array.from(table.ohms, (ohms, k) => {
    const second = table.second[k]!;
    const join = table.parallel[k] === 1 ? '|' : '+';
    return { name: second < 0 ? `${table.first[k]}` : `${table.first[k]}${join}${second}`, ohms };
  });
}

const byName = (a: Way, b: Way) => (a.name < b.name ? -1 : 1);
const ascends = (ohms: ArrayLike<number>) =>
  Array.from(ohms).every((value, k) => k === 0 || value >= ohms[k - 1]!);

/** Values of a made-up series, so that few of them are preferred ones. */
function manyValues(count: number): StockedResistor[] {
  return Array.from({ length: count }, (_, k) => resistorOf(1e3 * 1.0027 ** k, k));
}

describe('groupByValue', () => {
  it('lists each value once, in order, with all its parts by price, then id', () => {
    fc.assert(
      fc.property(shelf, (parts) => {
        const { ohms, parts: groups } = groupByValue(parts);
        expect([...ohms]).toEqual(
          [...new Set(parts.map((part) => part.ohms))].sort((a, b) => a - b),
        );
        groups.forEach((group, k) => {
          const own = parts.filter((part) => part.ohms === ohms[k]);
          own.sort((a, b) => a.priceMinor - b.priceMinor || a.id - b.id);
          expect(group).toEqual(own);
        });
      }),
      { numRuns: 100, seed: 6 },
    );
  });
});

describe('formTimingTable', () => {
  describe('when given any resistors, values repeated or not', () => {
    it('lists each value and each pair, in series and parallel, once and in order of ohms', () => {
      fc.assert(
        fc.property(shelf, (parts) => {
          const values = groupByValue(parts);
          const listed = waysOf(formTimingTable(values));
          const expected = everyWay(
            [...values.ohms],
            [...values.ohms].map(() => true),
          );
          expect([...listed].sort(byName)).toEqual(expected.sort(byName));
          expect(ascends(listed.map(({ ohms }) => ohms))).toBe(true);
        }),
        { numRuns: 200, seed: 3 },
      );
    });
  });

  describe('when values lie closer together than a part in a thousand million', () => {
    it('still sorts them exactly', () => {
      const close = Array.from({ length: 60 }, (_, k) => 1e4 * (1 + ((k * 37) % 60) * 3e-11));
      const values = groupByValue(close.map(resistorOf));
      expect(values.ohms).toHaveLength(60);
      const table = formTimingTable(values);
      expect(table.ohms).toHaveLength(60 * 62);
      expect(ascends(table.ohms)).toBe(true);
      expect(new Set(waysOf(table).map(({ name }) => name)).size).toBe(60 * 62);
    });
  });

  describe('when the shelf has E96 over five decades', () => {
    it('agrees with plain loops in all of its quarter of a million entries', () => {
      const mantissas = eSeriesMantissas('E96');
      const ohms = [1e3, 1e4, 1e5].flatMap((decade) =>
        mantissas.map((mantissa) => (mantissa * decade) / mantissas[0]!),
      );
      const values = groupByValue([...ohms, 1e6, 1.1e6].map(resistorOf));
      const listed = waysOf(formTimingTable(values));
      const expected = everyWay(
        [...values.ohms],
        [...values.ohms].map(() => true),
      );
      expect(listed).toHaveLength(expected.length);
      expect(ascends(listed.map(({ ohms: each }) => each))).toBe(true);
      const found = new Map(listed.map(({ name, ohms: each }) => [name, each]));
      expect(expected.every(({ name, ohms: each }) => found.get(name) === each)).toBe(true);
    });
  });

  describe('when the shelf has more than 2000 values', () => {
    it('pairs only those of E24 and E192, and lists all others alone', () => {
      const preferred = [1e3, 1.01e3, 2.2e4, 2.4e4, 3.09e5, 4.7e5, 9.88e5, 9.1e5];
      const odd = manyValues(2100).filter(({ ohms }) => ohms < 3e5);
      const parts = [...odd, ...preferred.map((ohms, k) => resistorOf(ohms, 5000 + k))];
      const values = groupByValue(parts);
      expect(values.ohms.length).toBeGreaterThan(2000);
      const isPreferred = (ohms: number) =>
        preferred.some((one) => Math.abs(one / ohms - 1) < 1e-9);
      const pairs = [...values.ohms].map(isPreferred);
      expect([...values.pairs].map((flag) => flag === 1)).toEqual(pairs);
      const listed = waysOf(formTimingTable(values));
      const expected = everyWay([...values.ohms], pairs);
      expect([...listed].sort(byName)).toEqual(expected.sort(byName));
      expect(ascends(listed.map(({ ohms }) => ohms))).toBe(true);
    });
  });
});

describe('firstNotBelow', () => {
  it('points at the first entry that is not below', () => {
    fc.assert(
      fc.property(shelf, fc.double({ min: 500, max: 2e7, noNaN: true }), (parts, wanted) => {
        const { ohms } = formTimingTable(groupByValue(parts));
        const plain = [...ohms].findIndex((value) => value >= wanted);
        expect(firstNotBelow(ohms, wanted)).toBe(plain < 0 ? ohms.length : plain);
      }),
      { numRuns: 100, seed: 4 },
    );
  });
});
