import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { analyseCycle } from '../../../server/engine/cycle.ts';
import { findPacks } from '../../../server/engine/search/find-packs.ts';
import type { RankedPack } from '../../../server/engine/search/promise.ts';
import { prepareShelf } from '../../../server/engine/search/prepared-shelf.ts';
import type { Shelf } from '../../../server/engine/search/shelf.ts';
import { everyKit, isOnTheShelf, priceOf, rateOf } from './exhaustive-search.ts';
import { recipeOf } from './engine-candidates.ts';
import { anyCase, type Case } from './random-shelves.ts';

/** Room for a machine that is busy with something else. */
const slow = { timeout: 120_000 };

function closestOf({ shelf, brief }: Case): RankedPack | null {
  return findPacks(prepareShelf(shelf), brief, 'closest', 1).packs[0] ?? null;
}

/** How often a run met what it is there for; a search that is never asked proves nothing. */
const met = {
  kits: 0,
  none: 0,
  single: 0,
  pairs: 0,
  tight: 0,
  many: 0,
  shifted: 0,
  extremeDuty: 0,
  steered: 0,
  steeredBeaten: 0,
  openDrain: 0,
  lit: 0,
  buffered: 0,
  idle: 0,
};

function note(pack: RankedPack | null, { brief }: Case): void {
  if (pack === null) {
    met.none += 1;
    return;
  }
  const { frame, timing } = pack;
  met.kits += 1;
  if (timing.kind === 'steered') met.steered += 1;
  else if (timing.kind === 'single') {
    if (timing.second) met.pairs += 1;
    else met.single += 1;
    if (frame.head.thresholds.r1.id === timing.first.id) met.tight += 1;
  }
  if (brief.quantity > 1) met.many += 1;
  if (pack.topology === 'shifted-thresholds') met.shifted += 1;
  if (brief.duty < 0.2 || brief.duty > 0.8) met.extremeDuty += 1;
  if (frame.head.comparator.output === 'open-drain') met.openDrain += 1;
  if (brief.load) met.lit += 1;
  if (frame.head.buffered) met.buffered += 1;
  if (frame.head.idle) met.idle += 1;
}

describe('findPacks', () => {
  describe('when asked for the closest pack on any small shelf', () => {
    it('finds exactly what an exhaustive search by the full model finds', slow, () => {
      fc.assert(
        fc.property(anyCase, (one) => {
          const kits = everyKit(one.shelf, one.brief);
          const pack = closestOf(one);
          note(pack, one);
          if (kits.length === 0) {
            expect(pack).toBeNull();
            return;
          }
          const best = Math.min(...kits.map((kit) => kit.distance));
          expect(pack).not.toBeNull();
          expect(pack!.distance).toBeGreaterThan(best - 1e-11);
          expect(pack!.distance).toBeLessThan(best + 1e-11);
          const steered = kits.some((kit) => kit.timing.kind === 'steered');
          if (steered && pack!.timing.kind !== 'steered') met.steeredBeaten += 1;
        }),
        { numRuns: 1600, seed: 20261201 },
      );
      expect(met.kits).toBeGreaterThan(400);
      for (const [what, count] of Object.entries(met)) expect(count, what).toBeGreaterThan(5);
    });

    it('offers only packs that lie on the shelf as often as asked, with the rate of the full model', () => {
      let packs = 0;
      fc.assert(
        fc.property(anyCase, ({ shelf, brief }) => {
          for (const pack of findPacks(prepareShelf(shelf), brief, 'closest', 8).packs) {
            packs += 1;
            const recipe = recipeOf(pack);
            expect(isOnTheShelf(recipe, brief.quantity)).toBe(true);
            expect(pack.priceMinor).toBe(priceOf(recipe));
            const rate = rateOf(recipe, brief)!;
            expect(pack.frequencyHz / rate).toBeCloseTo(1, 10);
            const cycle = analyseCycle(pack.circuit);
            expect(cycle.kind === 'oscillates' && cycle.frequencyHz / rate).toBeCloseTo(1, 10);
          }
        }),
        { numRuns: 300, seed: 7 },
      );
      expect(packs).toBeGreaterThan(150);
    });
  });

  describe('when the shelf is listed in another order', () => {
    it('finds the same packs in the same order', () => {
      const backwards = (shelf: Shelf): Shelf => ({
        resistors: [...shelf.resistors].reverse(),
        capacitors: [...shelf.capacitors].reverse(),
        comparators: [...shelf.comparators].reverse(),
        diodes: [...shelf.diodes].reverse(),
        trimmers: [...shelf.trimmers].reverse(),
      });
      let packs = 0;
      fc.assert(
        fc.property(anyCase, ({ shelf, brief }) => {
          for (const care of ['as-stocked', 'bench-tuned', 'trimmer-fitted'] as const) {
            for (const rank of ['closest', 'best-value', 'steadiest'] as const) {
              const found = (from: Shelf) =>
                findPacks(prepareShelf(from), { ...brief, care }, rank, 4).packs;
              const parts = (from: Shelf) =>
                found(from).map(({ frame, timing }) => [frame, timing]);
              expect(parts(backwards(shelf))).toEqual(parts(shelf));
              packs += parts(shelf).length;
            }
          }
        }),
        { numRuns: 60, seed: 11 },
      );
      expect(packs).toBeGreaterThan(100);
    });
  });
});
