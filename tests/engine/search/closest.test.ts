import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { analyseCycle } from '../../../server/engine/cycle.ts';
import { findPacks, type RankedPack } from '../../../server/engine/search/find-packs.ts';
import type { SearchBrief, Shelf } from '../../../server/engine/search/shelf.ts';
import { everyKit, isOnTheShelf, rateOf, type Recipe } from './exhaustive-search.ts';
import { anyBrief, smallShelf } from './random-shelves.ts';

function recipeOf(pack: RankedPack): Recipe {
  const { comparator, thresholds, pullUp, ledResistor, capacitor } = pack.frame;
  const { r1, r2, r3 } = thresholds;
  const timing = { first: pack.first, second: pack.second, ohms: pack.timingOhms };
  return { comparator, thresholds: [r1, r2, r3], pullUp, ledResistor, capacitor, timing };
}

function closestOf(shelf: Shelf, brief: SearchBrief): RankedPack | null {
  return findPacks(shelf, brief, 'closest', 1).packs[0] ?? null;
}

/** How often a run met what it is there for; a search that is never asked proves nothing. */
const met = { kits: 0, none: 0, pairs: 0, tight: 0, shifted: 0, openDrain: 0, lit: 0 };

function note(pack: RankedPack | null, brief: SearchBrief): void {
  if (pack === null) {
    met.none += 1;
    return;
  }
  met.kits += 1;
  if (pack.second) met.pairs += 1;
  if (pack.frame.thresholds.r1.id === pack.first.id) met.tight += 1;
  if (pack.topology === 'shifted-thresholds') met.shifted += 1;
  if (pack.frame.comparator.output === 'open-drain') met.openDrain += 1;
  if (brief.load) met.lit += 1;
}

describe('findPacks', () => {
  describe('when asked for the closest pack on any small shelf', () => {
    it('finds exactly what an exhaustive search by the full model finds', () => {
      fc.assert(
        fc.property(smallShelf, anyBrief, (shelf, brief) => {
          const kits = everyKit(shelf, brief);
          const pack = closestOf(shelf, brief);
          note(pack, brief);
          if (kits.length === 0) {
            expect(pack).toBeNull();
            return;
          }
          const best = Math.min(...kits.map((kit) => kit.distance));
          expect(pack).not.toBeNull();
          expect(pack!.distance).toBeGreaterThan(best - 1e-11);
          expect(pack!.distance).toBeLessThan(best + 1e-11);
        }),
        { numRuns: 1000, seed: 20261201 },
      );
      expect(met.kits).toBeGreaterThan(130);
      expect(Math.min(met.none, met.pairs, met.tight, met.openDrain, met.lit)).toBeGreaterThan(8);
      expect(met.shifted).toBeGreaterThan(0);
    });

    it('offers only packs that lie on the shelf as often as asked, with the rate of the full model', () => {
      fc.assert(
        fc.property(smallShelf, anyBrief, (shelf, brief) => {
          for (const pack of findPacks(shelf, brief, 'closest', 8).packs) {
            const recipe = recipeOf(pack);
            expect(isOnTheShelf(recipe, brief.quantity)).toBe(true);
            const rate = rateOf(recipe, brief)!;
            expect(pack.frequencyHz / rate).toBeCloseTo(1, 10);
            const cycle = analyseCycle(pack.circuit);
            expect(cycle.kind === 'oscillates' && cycle.frequencyHz / rate).toBeCloseTo(1, 10);
          }
        }),
        { numRuns: 150, seed: 7 },
      );
    });
  });

  describe('when the shelf is listed in another order', () => {
    it('finds the same packs in the same order', () => {
      const ids = (pack: RankedPack) =>
        [
          pack.frame.comparator.id,
          pack.frame.capacitor.id,
          pack.frame.thresholds.r3.id,
          ...[pack.first.id, pack.second?.id ?? 0].sort((a, b) => a - b),
          pack.join,
        ].join();
      fc.assert(
        fc.property(smallShelf, anyBrief, (shelf, brief) => {
          const backwards: Shelf = {
            resistors: [...shelf.resistors].reverse(),
            capacitors: [...shelf.capacitors].reverse(),
            comparators: [...shelf.comparators].reverse(),
          };
          for (const rank of ['closest', 'best-value'] as const) {
            const one = findPacks(shelf, brief, rank, 1).packs.map(ids);
            expect(findPacks(backwards, brief, rank, 1).packs.map(ids)).toEqual(one);
          }
        }),
        { numRuns: 150, seed: 11 },
      );
    });
  });
});
