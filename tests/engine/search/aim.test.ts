import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createCircuit } from '../../../server/engine/circuit.ts';
import { analyseCycle, type Cycle, type NoOscillation } from '../../../server/engine/cycle.ts';
import { aimFrame, framePeriod, type Frame } from '../../../server/engine/search/aim.ts';
import { completeHead } from '../../../server/engine/search/heads.ts';
import type {
  SearchBrief,
  StockedCapacitor,
  StockedComparator,
} from '../../../server/engine/search/shelf.ts';
import { briefAt, workshop } from './workshop-shelf.ts';

const figures = fc.record({
  openDrain: fc.boolean(),
  highOhms: fc.constantFrom(0, 40, 150),
  lowOhms: fc.constantFrom(0, 36, 130),
  delayLowHighSeconds: fc.double({ min: 0, max: 2e-6, noNaN: true }),
  delayHighLowSeconds: fc.double({ min: 0, max: 2e-6, noNaN: true }),
  inputBiasAmps: fc.double({ min: -1e-8, max: 1e-8, noNaN: true }),
  hysteresisVolts: fc.constantFrom(0, 2e-3),
});
const storage = fc.record({
  farads: fc.constantFrom(1e-10, 1e-9, 1e-8, 1e-6),
  insulationSeconds: fc.constantFrom(null, 500, 1e4),
  leakageAmps: fc.constantFrom(0, 1e-9),
});
const ratios = fc.constantFrom<[number, number][]>([1, 1], [0.4, 1.8], [2.5, 0.15]);

const [hundredKilohms] = workshop.resistors.filter(({ ohms }) => ohms === 1e5);
const tenKilohms = workshop.resistors.find(({ ohms }) => ohms === 1e4)!;

function frameOf(
  { openDrain, ...figure }: Partial<StockedComparator> & { openDrain?: boolean },
  capacitor: Partial<StockedCapacitor>,
  [x1, x2]: [number, number],
  brief: SearchBrief,
): Frame {
  const threshold = (ratio: number) => ({ ...hundredKilohms!, ohms: 1e5 * ratio });
  const output = openDrain ? 'open-drain' : 'push-pull';
  const parts = {
    comparator: { ...workshop.comparators[0]!, ...figure, output } as const,
    thresholds: { r1: threshold(x1), r2: threshold(x2), r3: threshold(1) },
    pullUp: openDrain ? tenKilohms : null,
    ledResistor: null,
    buffered: false,
    idle: null,
  };
  return {
    head: completeHead(parts, brief),
    capacitor: { ...workshop.capacitors[0]!, ...capacitor },
  };
}

/** The frame's nominal circuit by the full model, written out here once more. */
function cycleOf(
  { head, capacitor }: Frame,
  ohms: number,
  brief: SearchBrief,
): Cycle | NoOscillation {
  const { comparator, thresholds, pullUp } = head;
  const { insulationSeconds, farads, leakageAmps } = capacitor;
  const leakageOhms = insulationSeconds === null ? null : insulationSeconds / farads;
  return analyseCycle(
    createCircuit({
      supplyVolts: brief.supplyVolts,
      r1Ohms: thresholds.r1.ohms,
      r2Ohms: thresholds.r2.ohms,
      r3Ohms: thresholds.r3.ohms,
      timing: { kind: 'single', ohms },
      capacitor: { farads, leakageOhms, leakageAmps },
      comparator: {
        output: comparator.output,
        pullUpOhms: pullUp?.ohms ?? null,
        highOhms: comparator.highOhms,
        lowOhms: comparator.lowOhms,
        hysteresisVolts: comparator.hysteresisVolts,
        invertingBiasAmps: comparator.inputBiasAmps,
        nonInvertingBiasAmps: comparator.inputBiasAmps,
        delayLowHighSeconds: comparator.delayLowHighSeconds,
        delayHighLowSeconds: comparator.delayHighLowSeconds,
      },
    }),
  );
}

const logOhms = fc.double({ min: Math.log(2e3), max: Math.log(8e6), noNaN: true });

describe('framePeriod', () => {
  it('is the period of the full model, or NaN where that refuses', () => {
    const brief = briefAt(1);
    fc.assert(
      fc.property(figures, storage, ratios, logOhms, (figure, capacitor, ratio, log) => {
        const frame = frameOf(figure, capacitor, ratio, brief);
        const cycle = cycleOf(frame, Math.exp(log), brief);
        const period = framePeriod(frame, Math.exp(log));
        if (cycle.kind === 'oscillates') expect(period / cycle.periodSeconds).toBeCloseTo(1, 10);
        else expect(period).toBeNaN();
      }),
      { numRuns: 500, seed: 5 },
    );
  });
});

describe('aimFrame', () => {
  describe('when some resistance between the limits gives the target', () => {
    it('finds it to one part in ten thousand million', () => {
      let aimed = 0;
      fc.assert(
        fc.property(figures, storage, ratios, logOhms, (figure, capacitor, ratio, log) => {
          const frame = frameOf(figure, capacitor, ratio, briefAt(1));
          const cycle = cycleOf(frame, Math.exp(log), briefAt(1));
          // Under twenty times the pull-up, which the rules forbid, the period need not rise with R4.
          if (cycle.kind !== 'oscillates' || (figure.openDrain && log < Math.log(2e5))) return;
          const { ohms, reaches } = aimFrame(frame, briefAt(cycle.frequencyHz));
          aimed += 1;
          expect(reaches).toBe(true);
          expect(framePeriod(frame, ohms) * cycle.frequencyHz).toBeCloseTo(1, 10);
          expect(ohms / Math.exp(log)).toBeCloseTo(1, 6);
        }),
        { numRuns: 1000, seed: 8 },
      );
      expect(aimed).toBeGreaterThan(600);
    });
  });

  describe('when the target is out of reach', () => {
    const frame = frameOf({}, { farads: 1e-8 }, [1, 1], briefAt(1));

    it('stops at the lowest resistance for a rate that is too high', () => {
      const { ohms, reaches } = aimFrame(frame, briefAt(1e6));
      expect(ohms).toBeCloseTo(1e3, 6);
      expect(reaches).toBe(false);
    });

    it('stops at the highest for a rate that is too low', () => {
      const { ohms, reaches } = aimFrame(frame, briefAt(0.1));
      expect(ohms / 1e7).toBeCloseTo(1, 9);
      expect(reaches).toBe(false);
    });
  });

  describe('when bias stops the circuit long before the limit of resistance', () => {
    it('stays below the resistance that would stick, and hits the target there', () => {
      const brief = briefAt(1 / (2 * Math.LN2 * 1e-6 * 1e6));
      const frame = frameOf({ inputBiasAmps: 1e-6 }, { farads: 1e-6 }, [1, 1], brief);
      const { ohms, reaches } = aimFrame(frame, brief);
      expect(reaches).toBe(true);
      expect(framePeriod(frame, ohms) * brief.targetHz).toBeCloseTo(1, 10);
      expect(framePeriod(frame, 5e6)).toBeNaN();
    });
  });
});
