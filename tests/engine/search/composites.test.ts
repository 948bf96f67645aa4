import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  firstNotBelow,
  formComposites,
  formTimingTables,
  restock,
} from '../../../server/engine/search/composites.ts';
import type { StockedResistor } from '../../../server/engine/search/shelf.ts';

const resistors = fc
  .array(fc.constantFrom(470, 1e3, 2.2e3, 1e4, 1e4, 1e5, 9.1e6), { minLength: 1, maxLength: 10 })
  .map((values) =>
    values.map((ohms, k): StockedResistor => ({
      id: k + 1,
      available: 5,
      priceMinor: 4,
      ohms,
      tolerance: [0.05, 0.01, 0.001][k % 3]!,
      temperatureCoefficientPerKelvin: 1e-4,
    })),
  );

/** Every combination as "first-second-join", formed by plain loops. */
function everyWay(parts: readonly StockedResistor[]): Map<string, number> {
  const ways = new Map<string, number>();
  parts.forEach((a, i) => {
    ways.set(`${i}`, a.ohms);
    for (let j = i; j < parts.length; j += 1) {
      const b = parts[j]!;
      ways.set(`${i}+${j}`, a.ohms + b.ohms);
      ways.set(`${i}|${j}`, 1 / (1 / a.ohms + 1 / b.ohms));
    }
  });
  for (const [way, ohms] of ways) if (ohms < 1e3 - 1e-9 || ohms > 1e7 + 1e-6) ways.delete(way);
  return ways;
}

describe('formComposites', () => {
  describe('when given any resistors, values repeated or not', () => {
    it('lists each resistor and each pair, in series and parallel, once and in order of ohms', () => {
      fc.assert(
        fc.property(resistors, (parts) => {
          const table = formComposites(parts);
          const ways = everyWay(parts);
          const listed = Array.from(table.ohms, (_, k) => {
            const second = table.second[k]!;
            return second < 0
              ? `${table.first[k]}`
              : `${table.first[k]}${table.parallel[k] ? '|' : '+'}${second}`;
          });
          expect(new Set(listed).size).toBe(listed.length);
          expect([...listed].sort()).toEqual([...ways.keys()].sort());
          listed.forEach((way, k) => expect(table.ohms[k]! / ways.get(way)!).toBeCloseTo(1, 12));
          expect([...table.ohms]).toEqual([...table.ohms].sort((a, b) => a - b));
        }),
        { numRuns: 100, seed: 3 },
      );
    });
  });

  describe('when a resistance is looked up in it', () => {
    it('points at the first entry that is not below', () => {
      fc.assert(
        fc.property(resistors, fc.double({ min: 500, max: 2e7, noNaN: true }), (parts, wanted) => {
          const table = formComposites(parts);
          const at = firstNotBelow(table, wanted);
          const plain = [...table.ohms].findIndex((ohms) => ohms >= wanted);
          expect(at).toBe(plain < 0 ? table.ohms.length : plain);
        }),
        { numRuns: 100, seed: 4 },
      );
    });
  });
});

describe('formTimingTables', () => {
  describe('when resistors of several tolerances are stocked', () => {
    it('keeps singles, and pairs of which both parts are good enough', () => {
      fc.assert(
        fc.property(resistors, (parts) => {
          const tables = formTimingTables(parts);
          const worst = (k: number) =>
            Math.max(
              parts[tables.all.first[k]!]!.tolerance,
              parts[tables.all.second[k]!]?.tolerance ?? 0,
            );
          const count = (passes: (k: number) => boolean) =>
            [...tables.all.ohms.keys()].filter(passes).length;
          expect(tables.singles.ohms.length).toBe(count((k) => tables.all.second[k]! < 0));
          expect(tables.good.ohms.length).toBe(count((k) => worst(k) <= 0.01));
          expect(tables.precise.ohms.length).toBe(count((k) => worst(k) <= 0.001));
        }),
        { numRuns: 50, seed: 5 },
      );
    });
  });

  describe('when the quantities change and the values do not', () => {
    it('is restocked without being formed anew', () => {
      const parts = [1e3, 2.2e3].map((ohms, k) => ({
        id: k + 1,
        available: 5,
        priceMinor: 4,
        ohms,
        tolerance: 0.01,
        temperatureCoefficientPerKelvin: 0,
      }));
      const tables = formTimingTables(parts);
      const soldOut = parts.map((part) => ({ ...part, available: 0 }));
      const after = restock(tables, soldOut);
      for (const name of ['all', 'singles', 'good', 'precise'] as const) {
        expect(after[name].ohms).toBe(tables[name].ohms);
        expect(after[name].resistors).toBe(soldOut);
      }
    });
  });
});
