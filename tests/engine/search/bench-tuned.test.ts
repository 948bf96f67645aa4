import { describe, expect, it } from 'vitest';
import { createNormal, createRandom } from '../../../server/engine/random.ts';
import { findPacks } from '../../../server/engine/search/find-packs.ts';
import type { RankedPack } from '../../../server/engine/search/promise.ts';
import { prepareShelf } from '../../../server/engine/search/prepared-shelf.ts';
import type { SearchBrief } from '../../../server/engine/search/shelf.ts';
import { kitHz, type Draw } from './drawn-kits.ts';
import { recipeOf } from './engine-candidates.ts';
import { rateOf } from './exhaustive-search.ts';
import { benchGrid, drawTunedKit, nearestWay, ohmsForReading } from './serviced-kits.ts';
import { briefAt, workshop } from './workshop-shelf.ts';

const prepared = prepareShelf(workshop);
const tuned = (hertz: number, change: Partial<SearchBrief> = {}) =>
  briefAt(hertz, { care: 'bench-tuned', ...change });
const briefs: [string, SearchBrief][] = [
  ['a blinker at 1.5 Hz', tuned(1.5)],
  ['a clock at 700 Hz', tuned(700)],
  ['a slow kit with an electrolytic', tuned(0.05, { band: 0.25 })],
  ['ten kits at 9 kHz with a poor meter', tuned(9e3, { quantity: 10, meterUncertainty: 0.02 })],
];

function packsFor(brief: SearchBrief): RankedPack[] {
  return findPacks(prepared, brief, 'closest', 6).packs;
}

/** The nominal rate of a pack with another capacitance and the R4 that the bench takes for it. */
function rateWith(pack: RankedPack, brief: SearchBrief, farads: number, ohms: number): number {
  const { frame, timing } = recipeOf(pack);
  if (timing.kind !== 'single') throw new Error('Only a single timing resistance is tuned.');
  const { insulationSeconds } = frame.capacitor;
  const scaled = insulationSeconds && (insulationSeconds * farads) / frame.capacitor.farads;
  const capacitor = { ...frame.capacitor, farads, insulationSeconds: scaled };
  return rateOf({ frame: { ...frame, capacitor }, timing: { ...timing, ohms } }, brief)!;
}

describe('bench tuning', () => {
  describe.each(briefs)('when %s is made', (_, brief) => {
    const packs = packsFor(brief);

    it('has packs of several capacitors', () => {
      expect(packs.length).toBeGreaterThan(2);
    });

    it('finds on the shelf an R4 for every capacitor within its tolerance that keeps the promise', () => {
      for (const pack of packs) {
        const grid = benchGrid(pack, workshop, brief);
        const { tolerance, farads: middle } = pack.frame.capacitor;
        for (let k = -40; k <= 40; k += 1) {
          const farads = middle * (1 + (k / 40) * tolerance);
          const { ohms } = nearestWay(grid, ohmsForReading(pack, farads, brief));
          const hertz = rateWith(pack, brief, farads, ohms);
          expect(hertz).toBeGreaterThanOrEqual(pack.guaranteed.minHz);
          expect(hertz).toBeLessThanOrEqual(pack.guaranteed.maxHz);
        }
      }
    });

    it('promises a band that 2000 tuned kits stay in', () => {
      const random = createRandom(17);
      const normal = createNormal(random);
      const draws: Draw[] = [
        (low, high) => low + (high - low) * random(),
        (low, high) => (random() < 0.5 ? low : high),
      ];
      for (const pack of packs) {
        const grid = benchGrid(pack, workshop, brief);
        for (let k = 0; k < 2000 / packs.length; k += 1) {
          const draw = draws[k % 2]!;
          const kit = drawTunedKit(pack, grid, brief, draw, normal);
          const celsius = draw(brief.minCelsius, brief.maxCelsius);
          const volts = draw(brief.minSupplyVolts, brief.maxSupplyVolts);
          const hertz = kitHz(kit, brief, { celsius, volts });
          expect(hertz / pack.guaranteed.minHz).toBeGreaterThan(1);
          expect(hertz / pack.guaranteed.maxHz).toBeLessThan(1);
        }
      }
    });
  });

  describe('when the shelf cannot reach over all that a capacitor may need', () => {
    it('offers that capacitor as stocked and not tuned', () => {
      // 2 MΩ is the most that two resistors make; a capacitor 5 % short would need more.
      const hertz = 1 / (2 * Math.LN2 * 4.7e-7 * 1.95e6);
      const tolerances = (brief: SearchBrief) =>
        findPacks(prepared, brief, 'closest', 40)
          .packs.filter(({ frame }) => frame.capacitor.farads === 4.7e-7)
          .map(({ frame }) => frame.capacitor.tolerance)
          .sort();
      expect(new Set(tolerances(briefAt(hertz)))).toEqual(new Set([0.01, 0.05]));
      expect(new Set(tolerances(tuned(hertz)))).toEqual(new Set([0.01]));
    });
  });

  describe('when a capacitor of 5 % is measured to half a percent', () => {
    it('narrows the band by more than its tolerance', () => {
      const width = ({ guaranteed }: RankedPack) => Math.log(guaranteed.maxHz / guaranteed.minHz);
      const of = (care: SearchBrief['care']) =>
        findPacks(prepared, briefAt(70, { care }), 'closest', 12).packs.find(
          ({ frame }) => frame.capacitor.tolerance === 0.05,
        )!;
      expect(width(of('bench-tuned'))).toBeLessThan(width(of('as-stocked')) - 0.05);
    });
  });
});
