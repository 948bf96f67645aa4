import { describe, expect, it } from 'vitest';
import { createNormal, createRandom } from '../../../server/engine/random.ts';
import { findPacks } from '../../../server/engine/search/find-packs.ts';
import type { RankedPack } from '../../../server/engine/search/promise.ts';
import { prepareShelf } from '../../../server/engine/search/prepared-shelf.ts';
import type { SearchBrief, StockedResistor } from '../../../server/engine/search/shelf.ts';
import { drawKit, kitHz, type Draw, type Kit } from './drawn-kits.ts';
import { drawTrimmedKit, neededOhms } from './serviced-kits.ts';
import { briefAt, redLed, workshop, workshopWith } from './workshop-shelf.ts';

const fitted = (hertz: number, change: Partial<SearchBrief> = {}) =>
  briefAt(hertz, { care: 'trimmer-fitted', ...change });
const cases = [
  { name: 'a blinker at 1.5 Hz', brief: fitted(1.5), shelf: workshop },
  { name: 'an LED at 4 Hz', brief: fitted(4, { load: redLed }), shelf: workshopWith(1) },
  { name: 'a clock at 700 Hz', brief: fitted(700), shelf: workshop },
  { name: 'two kits at 9 kHz', brief: fitted(9e3, { quantity: 2 }), shelf: workshop },
  {
    name: 'warm and cold',
    brief: fitted(60, { minCelsius: -20, maxCelsius: 70 }),
    shelf: workshop,
  },
];

/** A kit's timing resistance where the trimmer stands at `ohms` of its track, at 25 °C. */
function trimmedTo(kit: Kit, ohms: number): Kit {
  const [fixed, track] = [kit.timing[0]!, kit.timing[1]!];
  return { ...kit, timing: [fixed, { ...track, ohms }] };
}

/** By this much a kit's own thresholds and stray capacitance shift the trimmer's share in it. */
const ownShare = 2e-4;

describe('a trimmer', () => {
  describe.each(cases)('when fitted for $name', ({ brief, shelf }) => {
    const packs = findPacks(prepareShelf(shelf), brief, 'closest', 8).packs;
    const random = createRandom(23);
    const normal = createNormal(random);
    const anywhere: Draw = (low, high) => low + (high - low) * random();
    const ends: Draw = (low, high) => (random() < 0.5 ? low : high);

    it('has packs to fit', () => {
      expect(packs.length).toBeGreaterThan(2);
      expect(packs.every(({ timing }) => timing.kind === 'trimmed')).toBe(true);
    });

    it('reaches the target with every kit at every temperature and supply', () => {
      for (const pack of packs) {
        for (let k = 0; k < 300; k += 1) {
          const draw = k % 3 ? ends : anywhere;
          const kit = drawKit(pack, brief, draw, normal);
          const place = {
            celsius: draw(brief.minCelsius, brief.maxCelsius),
            volts: draw(brief.minSupplyVolts, brief.maxSupplyVolts),
          };
          const whole = kit.timing[1]!.ohms;
          expect(kitHz(trimmedTo(kit, 0), brief, place)).toBeGreaterThanOrEqual(brief.targetHz);
          expect(kitHz(trimmedTo(kit, whole), brief, place)).toBeLessThanOrEqual(brief.targetHz);
        }
      }
    });

    it('promises a band that kits set by their makers stay in', () => {
      for (const pack of packs) {
        for (let k = 0; k < 300; k += 1) {
          const draw = k % 2 ? ends : anywhere;
          const kit = drawTrimmedKit(pack, brief, draw, normal);
          const celsius = draw(brief.minCelsius, brief.maxCelsius);
          const volts = draw(brief.minSupplyVolts, brief.maxSupplyVolts);
          const hertz = kitHz(kit, brief, { celsius, volts });
          expect(hertz / pack.guaranteed.minHz).toBeGreaterThan(1 - ownShare);
          expect(hertz / pack.guaranteed.maxHz).toBeLessThan(1 + ownShare);
        }
      }
    });

    it('stands beside the largest resistor that is not too much for any kit', () => {
      for (const pack of packs) expect(largerFixed(pack, brief)).toEqual([]);
    });
  });
});

/** Larger resistors of 1 % that would not be too much for the kit that needs the least. */
function largerFixed(pack: RankedPack, brief: SearchBrief): StockedResistor[] {
  const { timing } = pack;
  if (timing.kind !== 'trimmed') throw new Error('A trimmed pack was expected.');
  const least = leastOhms(pack, brief);
  return workshop.resistors.filter(
    (part) =>
      part.tolerance <= 0.01 &&
      part.ohms > timing.fixed.ohms * 1.0001 &&
      part.ohms * (1 + part.tolerance) * (1 + part.temperatureCoefficientPerKelvin * 60) < least,
  );
}

/** The least timing resistance that any of 400 kits from the ends of their ranges needs. */
function leastOhms(pack: RankedPack, brief: SearchBrief): number {
  const random = createRandom(5);
  let least = Number.POSITIVE_INFINITY;
  for (let k = 0; k < 400; k += 1) {
    const draw: Draw = (low, high) => (random() < 0.5 ? low : high);
    const kit = drawKit(pack, brief, draw, () => 0);
    const place = {
      celsius: draw(brief.minCelsius, brief.maxCelsius),
      volts: draw(brief.minSupplyVolts, brief.maxSupplyVolts),
    };
    const bare: Kit = {
      ...kit,
      timing: [
        { ohms: 0, temperatureCoefficientPerKelvin: 0 },
        { ohms: 1, temperatureCoefficientPerKelvin: 0 },
      ],
    };
    const rateAt = (ohms: number) => kitHz(trimmedTo(bare, ohms), brief, place);
    least = Math.min(least, neededOhms(rateAt, 1e5, brief.targetHz));
  }
  return least;
}
