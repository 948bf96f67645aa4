import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { demandMakeable, demandOf, holdsMore } from '../../../server/engine/search/demand.ts';
import type { StockedResistor } from '../../../server/engine/search/shelf.ts';

const stock = fc
  .array(fc.integer({ min: 0, max: 12 }), { minLength: 3, maxLength: 3 })
  .map((counts) =>
    counts.map((available, k): StockedResistor => ({
      id: k + 1,
      available,
      priceMinor: 4,
      ohms: [1e4, 2.2e4, 4.7e4][k]!,
      tolerance: 0.01,
      temperatureCoefficientPerKelvin: 0,
      ratedWatts: 0.25,
    })),
  );
const uses = fc.array(fc.constantFrom(0, 1, 2, null), { maxLength: 7 });

const enough = (taken: readonly (StockedResistor | null)[], quantity: number) =>
  taken.every(
    (part) =>
      part === null ||
      part.available >= quantity * taken.filter((other) => other?.id === part.id).length,
  );

describe('demandOf', () => {
  it('counts a value once for each role that uses it', () => {
    fc.assert(
      fc.property(stock, uses, (parts, chosen) => {
        const list = chosen.map((k) => (k === null ? null : parts[k]!));
        const { ids, counts } = demandOf(list);
        const total = counts.reduce((sum, count) => sum + count, 0);
        expect(total).toBe(list.filter((part) => part !== null).length);
        ids.forEach((id, k) =>
          expect(counts[k]).toBe(list.filter((part) => part?.id === id).length),
        );
      }),
      { seed: 1 },
    );
  });
});

describe('demandMakeable and holdsMore', () => {
  it('agree with counting the pieces on the table', () => {
    fc.assert(
      fc.property(stock, uses, fc.integer({ min: 1, max: 3 }), (parts, chosen, quantity) => {
        const fixed = chosen.map((k) => (k === null ? null : parts[k]!));
        expect(demandMakeable(fixed, quantity)).toBe(enough(fixed, quantity));
        for (const part of parts) {
          for (const count of [1, 2]) {
            const more = [
              ...fixed.filter((one) => one?.id === part.id),
              ...Array(count).fill(part),
            ];
            const held = holdsMore(part, count, demandOf(fixed), quantity);
            expect(held).toBe(enough(more as StockedResistor[], quantity));
          }
        }
      }),
      { numRuns: 300, seed: 2 },
    );
  });
});
