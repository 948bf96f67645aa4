import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Candidate } from '../../../server/engine/search/candidate.ts';
import { findPacks } from '../../../server/engine/search/find-packs.ts';
import { guaranteedBand, worseEnd } from '../../../server/engine/search/guaranteed-band.ts';
import { prepareShelf, type PreparedShelf } from '../../../server/engine/search/prepared-shelf.ts';
import type { SearchBrief } from '../../../server/engine/search/shelf.ts';
import { candidatesOf } from './engine-candidates.ts';
import { everyKit } from './exhaustive-search.ts';
import { anyCase } from './random-shelves.ts';

/** With a worse end beyond this the shelf has no answer worth the name, and the nearest will do. */
const farOff = 0.3;

/** Packs so near to each other as this are told apart by an estimate. */
const estimate = 1e-4;

const met = {
  found: 0,
  estimated: 0,
  none: 0,
  farOff: 0,
  steered: 0,
  pairs: 0,
  singles: 0,
  notClosest: 0,
};

/** Room for a machine that is busy with something else. */
const slow = { timeout: 120_000 };

/**
 * The least worse end of all, nearest candidates first. The nominal rate lies inside the band, so no
 * candidate's worse end is less than its own distance from the target.
 */
function leastWorseEnd(
  candidates: readonly Candidate[],
  brief: SearchBrief,
  shelf: PreparedShelf,
): number {
  let least = Number.POSITIVE_INFINITY;
  for (const candidate of [...candidates].sort((a, b) => a.distance - b.distance)) {
    if (-Math.expm1(-candidate.distance) > least + 1e-3) break;
    least = Math.min(least, worseEnd(guaranteedBand(candidate, brief, shelf), brief.targetHz));
  }
  return least;
}

describe('findPacks', () => {
  describe('when asked for the steadiest pack on any small shelf', () => {
    it('finds none with a lesser worse end among every kit that the rules allow', slow, () => {
      fc.assert(
        fc.property(anyCase, ({ shelf, brief }) => {
          const prepared = prepareShelf(shelf);
          const { packs } = findPacks(prepared, brief, 'steadiest', 3);
          const candidates = candidatesOf(everyKit(shelf, brief), brief);
          const winner = packs.find((pack) => pack.wins.includes('steadiest'));
          if (candidates.length === 0) {
            met.none += 1;
            expect(winner).toBeUndefined();
            return;
          }
          met.found += 1;
          expect(winner).toBe(packs[0]);
          const end = worseEnd(winner!.guaranteed, brief.targetHz);
          const least = leastWorseEnd(candidates, brief, prepared);
          if (least > farOff) {
            met.farOff += 1;
            return;
          }
          expect(end / least).toBeLessThan(1 + estimate);
          if (Math.abs(end / least - 1) > 1e-9) met.estimated += 1;
          if (winner!.timing.kind === 'steered') met.steered += 1;
          else if (winner!.timing.kind === 'single' && winner!.timing.second) met.pairs += 1;
          else met.singles += 1;
          if (!winner!.wins.includes('closest')) met.notClosest += 1;
        }),
        { numRuns: 700, seed: 41 },
      );
      expect(met.found).toBeGreaterThan(200);
      const { estimated, ...others } = met;
      expect(estimated).toBeLessThan(3);
      for (const [what, count] of Object.entries(others)) expect(count, what).toBeGreaterThan(5);
    });
  });
});
