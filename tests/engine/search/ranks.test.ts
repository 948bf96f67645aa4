import { describe, expect, it } from 'vitest';
import { aimFrame, nearestCandidates } from '../../../server/engine/search/candidates.ts';
import { formTimingTables } from '../../../server/engine/search/composites.ts';
import {
  findPacks,
  findSteadiestPack,
  isSamePack,
  promise,
} from '../../../server/engine/search/find-packs.ts';
import { framesFor } from '../../../server/engine/search/frame.ts';
import { worseEnd } from '../../../server/engine/search/guaranteed-band.ts';
import { briefAt, redLed, workshop } from './workshop-shelf.ts';

const tables = formTimingTables(workshop.resistors);
const rates = [0.5, 120, 33_000];
const ranks = ['best-value', 'closest', 'steadiest'] as const;

describe('findPacks', () => {
  describe.each(rates)('when %s Hz is asked by best value', (hertz) => {
    const brief = briefAt(hertz, { band: 0.07 });
    const [first] = findPacks(workshop, brief, 'best-value', 3, tables).packs;

    it('puts first a pack of which at least 99 % hold the band', () => {
      expect(first!.wins).toContain('best-value');
      expect(first!.yieldWithinBand).toBeGreaterThanOrEqual(0.99);
    });

    it('finds none cheaper among four singles and the nearest pair on each side of every frame', () => {
      const cheaper = framesFor(workshop, brief)
        .map((frame) => aimFrame(frame, brief))
        .flatMap((aimed) => [
          ...nearestCandidates(aimed, tables.singles, brief, 4),
          ...nearestCandidates(aimed, tables.all, brief, 1),
        ])
        .filter((candidate) => candidate.priceMinor < first!.priceMinor)
        .map((candidate) => promise(candidate, brief));
      // Frames whose capacitor alone spoils the band are passed over at 98 %.
      for (const pack of cheaper) expect(pack.yieldWithinBand).toBeLessThan(0.99);
    });
  });

  describe.each(rates)('when %s Hz is asked by steadiness', (hertz) => {
    const brief = briefAt(hertz, { band: 0.02 });
    const { packs } = findPacks(workshop, brief, 'steadiest', 12, tables);
    const [first] = packs;

    it('puts first the pack whose worse end is nearest to the target of all it shows', () => {
      const ends = packs.map((pack) => worseEnd(pack.guaranteed, hertz));
      expect(first!.wins).toContain('steadiest');
      expect(Math.min(...ends)).toBe(ends[0]);
    });

    it('names the same pack as the coverage map does', () => {
      const alone = findSteadiestPack(workshop, brief, tables);
      expect(isSamePack(alone, first!)).toBe(true);
    });
  });

  describe.each(rates)('when %s Hz is asked by each rank', (hertz) => {
    const brief = briefAt(hertz, { band: 0.07 });

    it('shows the three winners first, each marked, whatever the rank', () => {
      for (const rank of ranks) {
        const { packs } = findPacks(workshop, brief, rank, 8, tables);
        expect(packs[0]!.wins).toContain(rank);
        for (const name of ranks) {
          const winners = packs.filter((pack) => pack.wins.includes(name));
          expect(winners).toHaveLength(1);
          expect(packs.indexOf(winners[0]!)).toBeLessThan(3);
        }
      }
    });

    it('shows no pack twice, and capacitors that differ after the winners', () => {
      const { packs } = findPacks(workshop, brief, 'best-value', 8, tables);
      packs.forEach((pack, k) =>
        packs.slice(0, k).forEach((other) => expect(isSamePack(other, pack)).toBe(false)),
      );
      const kinds = new Set(packs.map((pack) => pack.frame.capacitor.id));
      expect(kinds.size).toBeGreaterThan(packs.length / 2);
    });

    it('counts every combination it considered', () => {
      const { considered } = findPacks(workshop, brief, 'closest', 1, tables);
      expect(considered).toBe(framesFor(workshop, brief).length * tables.all.ohms.length);
    });
  });

  describe('when only the steadiest pack holds the band', () => {
    it('is best value too', () => {
      const [steadiest] = findPacks(workshop, briefAt(120), 'steadiest', 1, tables).packs;
      const brief = briefAt(120, { band: worseEnd(steadiest!.guaranteed, 120) + 1e-6 });
      const [best] = findPacks(workshop, brief, 'best-value', 1, tables).packs;
      expect(best!.wins).toContain('best-value');
      expect(best!.yieldWithinBand).toBeGreaterThanOrEqual(0.99);
    });
  });

  describe('when two parts are alike but for their price or place', () => {
    const twin = (priceMinor: number) => {
      const { resistors, capacitors, comparators } = workshop;
      const twins = capacitors.map((part) => ({ ...part, id: part.id + 100, priceMinor }));
      return { resistors, comparators, capacitors: [...capacitors, ...twins] };
    };

    it('takes the cheaper one', () => {
      const [pack] = findPacks(twin(1), briefAt(60), 'closest', 1, tables).packs;
      expect(pack!.frame.capacitor.id).toBeGreaterThan(100);
      const [other] = findPacks(twin(900), briefAt(60), 'closest', 1, tables).packs;
      expect(other!.frame.capacitor.id).toBeLessThan(100);
    });

    it('takes the one with the lower id when they cost the same', () => {
      const shelf = twin(0);
      shelf.capacitors.forEach((part) => (part.priceMinor = 5));
      const [pack] = findPacks(shelf, briefAt(60), 'closest', 1, tables).packs;
      expect(pack!.frame.capacitor.id).toBeLessThan(100);
    });
  });

  describe('when nothing on the shelf can run the brief', () => {
    it('answers with no pack for a supply above every comparator', () => {
      const brief = briefAt(1, { supplyVolts: 30, minSupplyVolts: 28, maxSupplyVolts: 32 });
      expect(findPacks(workshop, brief, 'closest', 5, tables)).toEqual({
        packs: [],
        considered: 0,
      });
      expect(findSteadiestPack(workshop, brief, tables)).toBeNull();
    });

    it('answers with no pack for an LED where only open-drain outputs are left', () => {
      const shelf = { ...workshop, comparators: workshop.comparators.slice(1) };
      expect(findPacks(shelf, briefAt(1, { load: redLed }), 'closest', 5, tables).packs).toEqual(
        [],
      );
    });

    it('answers with no pack for an LED that needs more than the supply', () => {
      const load = { ...redLed, forwardVolts: 5.2 };
      expect(findPacks(workshop, briefAt(1, { load }), 'closest', 5, tables).packs).toEqual([]);
    });
  });

  describe('when an electrolytic would do', () => {
    it('is offered only from a band of 20 %', () => {
      const dielectrics = (band: number) =>
        findPacks(workshop, briefAt(0.02, { band }), 'closest', 20, tables).packs.map(
          (pack) => pack.frame.capacitor.dielectric,
        );
      expect(dielectrics(0.19)).not.toContain('electrolytic');
      expect(dielectrics(0.2)).toContain('electrolytic');
    });
  });
});
