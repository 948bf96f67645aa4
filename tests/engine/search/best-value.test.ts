import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Candidate } from '../../../server/engine/search/candidate.ts';
import { findPacks } from '../../../server/engine/search/find-packs.ts';
import { guaranteedBand, worseEnd } from '../../../server/engine/search/guaranteed-band.ts';
import { kitYield } from '../../../server/engine/search/kit-yield.ts';
import { prepareShelf } from '../../../server/engine/search/prepared-shelf.ts';
import type { SearchBrief } from '../../../server/engine/search/shelf.ts';
import { candidatesOf } from './engine-candidates.ts';
import { everyKit } from './exhaustive-search.ts';
import { anyCase, type Case } from './random-shelves.ts';

const met = { found: 0, none: 0, notClosest: 0, notSure: 0, pairs: 0, singles: 0, refused: 0 };

/** Room for a machine that is busy with something else. */
const slow = { timeout: 120_000 };

/** The cheapest of all that hold the band, the nearest of these. Yields of dear ones are not needed. */
function cheapest({ shelf, brief }: Case): Candidate | null {
  const prepared = prepareShelf(shelf);
  const candidates = candidatesOf(everyKit(shelf, brief), brief);
  candidates.sort((a, b) => a.priceMinor - b.priceMinor || a.distance - b.distance);
  for (const candidate of candidates) {
    const band = guaranteedBand(candidate, brief, prepared);
    if (isOutside(band.minHz, band.maxHz, brief)) continue;
    if (kitYield(candidate, brief, prepared, band).yieldWithinBand >= 0.99) return candidate;
    met.refused += 1;
  }
  return null;
}

/** No kit between these rates holds the band. */
function isOutside(minHz: number, maxHz: number, { targetHz, band }: SearchBrief): boolean {
  return maxHz < targetHz * (1 - band) || minHz > targetHz * (1 + band);
}

/**
 * The case with a band about as wide as the steadiest pack's, so that whether any pack holds it hangs
 * on the search; as it was where that would be no band at all.
 */
function narrowed({ shelf, brief }: Case, share: number): Case {
  const [steadiest] = findPacks(prepareShelf(shelf), brief, 'steadiest', 1).packs;
  if (!steadiest) return { shelf, brief };
  const band = share * worseEnd(steadiest.guaranteed, brief.targetHz);
  return { shelf, brief: band < 0.5 ? { ...brief, band } : brief };
}

const share = fc.constantFrom(0.4, 0.55, 0.65, 0.75, 0.85, 1.05, 1.3, 2);

describe('findPacks', () => {
  describe('when asked for the best value on any small shelf', () => {
    it(
      'finds the cheapest pack that holds the band of all that the rules allow, and the nearest of that price',
      slow,
      () => {
        fc.assert(
          fc.property(anyCase, share, (one, width) => {
            const { shelf, brief } = narrowed(one, width);
            const { packs } = findPacks(prepareShelf(shelf), brief, 'best-value', 3);
            const winner = packs.find((pack) => pack.wins.includes('best-value')) ?? null;
            const best = cheapest({ shelf, brief });
            if (best === null) {
              if (packs.length > 0) met.none += 1;
              expect(winner).toBeNull();
              return;
            }
            met.found += 1;
            expect(winner).not.toBeNull();
            expect(winner!.yieldWithinBand).toBeGreaterThanOrEqual(0.99);
            expect(winner!.priceMinor).toBe(best.priceMinor);
            expect(winner!.distance).toBeCloseTo(best.distance, 11);
            if (winner!.timing.kind === 'single' && winner!.timing.second) met.pairs += 1;
            else met.singles += 1;
            if (!winner!.wins.includes('closest')) met.notClosest += 1;
            if (winner!.yieldWithinBand < 1) met.notSure += 1;
          }),
          { numRuns: 650, seed: 43 },
        );
        expect(met.found + met.none).toBeGreaterThan(200);
        for (const [what, count] of Object.entries(met)) expect(count, what).toBeGreaterThan(5);
      },
    );
  });
});
