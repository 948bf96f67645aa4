import { beforeAll, describe, expect, it } from 'vitest';
import { analyseCycle } from '../../../server/engine/cycle.ts';
import { formTimingTables } from '../../../server/engine/search/composites.ts';
import { findPacks, type RankedPack } from '../../../server/engine/search/find-packs.ts';
import { frameCircuit } from '../../../server/engine/search/frame.ts';
import { guaranteedBand, worseEnd } from '../../../server/engine/search/guaranteed-band.ts';
import { holdsBand, kitYield } from '../../../server/engine/search/kit-yield.ts';
import type { SearchBrief } from '../../../server/engine/search/shelf.ts';
import { createRandom } from '../../../server/engine/random.ts';
import { briefAt, redLed, workshop } from './workshop-shelf.ts';

const tables = formTimingTables(workshop.resistors);

type Draw = (low: number, high: number) => number;

/**
 * The rate of one kit drawn from everything that the band's sentence names. Each part keeps its
 * tolerance at 25 °C and drifts from there by its own coefficient; the further temperature spread
 * of a capacitor counts wholly or not at all by `draw`.
 */
function kitHz(pack: RankedPack, brief: SearchBrief, draw: Draw): number {
  const { comparator, capacitor, thresholds } = pack.frame;
  const kelvin = draw(brief.minCelsius, brief.maxCelsius) - 25;
  const resistor = (part: RankedPack['first']) =>
    part.ohms *
    (1 + part.tolerance * draw(-1, 1)) *
    (1 + part.temperatureCoefficientPerKelvin * kelvin);
  const first = resistor(pack.first);
  const second = pack.second === null ? null : resistor(pack.second);
  const timing =
    second === null
      ? first
      : pack.join === 'parallel'
        ? (first * second) / (first + second)
        : first + second;
  const circuit = frameCircuit(pack.frame, brief, timing);
  circuit.supplyVolts = draw(brief.minSupplyVolts, brief.maxSupplyVolts);
  circuit.r1Ohms = resistor(thresholds.r1);
  circuit.r2Ohms = resistor(thresholds.r2);
  circuit.r3Ohms = resistor(thresholds.r3);
  circuit.capacitor.farads =
    capacitor.farads *
      (1 + capacitor.tolerance * draw(-1, 1)) *
      (1 + capacitor.temperatureCoefficientPerKelvin * kelvin) *
      (1 + capacitor.temperatureSpread * draw(-1, 1)) +
    draw(0, 5e-12);
  const output = draw(0.5, 2);
  const bias = comparator.maxInputBiasAmps * draw(-1, 1);
  const delayShare = draw(0, 1);
  const delay = (typical: number) =>
    typical / 2 + delayShare * (comparator.maxDelaySeconds - typical / 2);
  circuit.comparator = {
    ...circuit.comparator,
    highOhms: comparator.highOhms * output,
    lowOhms: comparator.lowOhms * output,
    offsetVolts: comparator.maxOffsetVolts * draw(-1, 1),
    invertingBiasAmps: bias,
    nonInvertingBiasAmps: bias,
    delayLowHighSeconds: delay(comparator.delayLowHighSeconds),
    delayHighLowSeconds: delay(comparator.delayHighLowSeconds),
  };
  if (circuit.load && brief.load) {
    const { minForwardVolts, maxForwardVolts } = brief.load;
    circuit.load = { ...circuit.load, volts: draw(minForwardVolts, maxForwardVolts) };
  }
  const cycle = analyseCycle(circuit);
  return cycle.kind === 'oscillates' ? cycle.frequencyHz : 0;
}

const briefs: [string, SearchBrief][] = [
  ['a blinker at 1.5 Hz with an LED', briefAt(1.5, { load: redLed })],
  [
    'a slow LED on two cells from full to empty',
    briefAt(0.2, {
      load: redLed,
      supplyVolts: 3,
      minSupplyVolts: 2.2,
      maxSupplyVolts: 3.2,
      band: 0.25,
    }),
  ],
  ['a clock at 1 kHz in the cold and the heat', briefAt(1e3, { minCelsius: -20, maxCelsius: 70 })],
  ['a fast clock at 40 kHz', briefAt(4e4)],
  [
    'a clock at 9 V by an open-drain output',
    briefAt(440, {
      supplyVolts: 9,
      minSupplyVolts: 8.5,
      maxSupplyVolts: 9.5,
    }),
  ],
  ['a third of each beat at 100 Hz', briefAt(100, { duty: 1 / 3 })],
];

describe('guaranteedBand', () => {
  describe.each(briefs)('when a pack is made for %s', (_, brief) => {
    const random = createRandom(99);
    const between: Draw = (low, high) => low + (high - low) * random();
    // Worst cases hide at the ends, so two draws of three sit on one.
    const mostlyEnds: Draw = (low, high) => {
      const where = random() * 3;
      return where < 1 ? low : where < 2 ? high : between(low, high);
    };
    let packs: RankedPack[];
    beforeAll(() => {
      packs = findPacks(workshop, brief, 'best-value', 3, tables).packs;
    });

    it('holds 2000 kits drawn from its ranges, and as many drawn from their ends', () => {
      expect(packs.length).toBeGreaterThan(1);
      for (const pack of packs) {
        for (let k = 0; k < 4000; k += 1) {
          const hertz = kitHz(pack, brief, k % 2 ? between : mostlyEnds);
          expect(hertz).toBeGreaterThanOrEqual(pack.guaranteed.minHz * (1 - 1e-12));
          expect(hertz).toBeLessThanOrEqual(pack.guaranteed.maxHz * (1 + 1e-12));
        }
      }
    });

    it('is no wider than twice what its kits fill', () => {
      for (const pack of packs) {
        const rates = Array.from({ length: 500 }, () => kitHz(pack, brief, mostlyEnds));
        const width = Math.log(Math.max(...rates) / Math.min(...rates));
        const promised = Math.log(pack.guaranteed.maxHz / pack.guaranteed.minHz);
        expect(promised / width).toBeLessThan(2);
      }
    });

    it('has the nominal rate inside', () => {
      for (const { guaranteed, frequencyHz } of packs) {
        expect(guaranteed.minHz).toBeLessThan(frequencyHz);
        expect(guaranteed.maxHz).toBeGreaterThan(frequencyHz);
      }
    });
  });
});

describe('kitYield', () => {
  describe('when compared with the early-ending count', () => {
    it('agrees with holdsBand on either side of the line', () => {
      const seen = new Set<boolean>();
      for (const hertz of [0.7, 333]) {
        for (const band of [0.01, 0.02, 0.03, 0.05, 0.06, 0.08, 0.1, 0.25]) {
          const brief = briefAt(hertz, { band });
          for (const pack of findPacks(workshop, brief, 'closest', 5, tables).packs) {
            const { yieldWithinBand } = kitYield(pack, brief, { minHz: 0, maxHz: Infinity });
            for (const share of [0.98, 0.99, 0.995]) {
              expect(holdsBand(pack, brief, share)).toBe(yieldWithinBand >= share - 1e-9);
              seen.add(yieldWithinBand >= share);
            }
          }
        }
      }
      expect(seen.size).toBe(2);
    });
  });

  describe('when the guaranteed band lies inside the asked one', () => {
    it('is exactly all kits', () => {
      const brief = briefAt(100, { band: 0.2 });
      const [pack] = findPacks(workshop, brief, 'steadiest', 1, tables).packs;
      expect(worseEnd(guaranteedBand(pack!, brief), brief.targetHz)).toBeLessThan(0.2);
      expect(pack!.yieldWithinBand).toBe(1);
      expect(pack!.yieldStandardError).toBe(0);
    });
  });

  describe('when kits are drawn one by one', () => {
    it('is within five standard errors of their share', () => {
      const brief = briefAt(250, { band: 0.03, minCelsius: 25, maxCelsius: 25 });
      for (const pack of findPacks(workshop, brief, 'closest', 3, tables).packs) {
        const { yieldWithinBand } = kitYield(pack, brief, { minHz: 0, maxHz: Infinity });
        const random = createRandom(5);
        const parts: Draw = (low, high) => (low === -1 ? 2 * random() - 1 : (low + high) / 2);
        const nominalComparator: RankedPack = {
          ...pack,
          frame: {
            ...pack.frame,
            capacitor: { ...pack.frame.capacitor, temperatureSpread: 0 },
            comparator: { ...pack.frame.comparator, maxOffsetVolts: 0, maxInputBiasAmps: 0 },
          },
        };
        const count = 8000;
        let inside = 0;
        for (let k = 0; k < count; k += 1) {
          const hertz = kitHz(nominalComparator, brief, parts);
          if (Math.abs(hertz / brief.targetHz - 1) <= brief.band) inside += 1;
        }
        const error = Math.sqrt(
          (2 * Math.max(yieldWithinBand * (1 - yieldWithinBand), 1e-3)) / count,
        );
        expect(Math.abs(inside / count - yieldWithinBand)).toBeLessThan(5 * error + 0.004);
      }
    });
  });
});
