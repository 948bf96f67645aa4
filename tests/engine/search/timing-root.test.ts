import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createCircuit } from '../../../server/engine/circuit.ts';
import { analyseCycle } from '../../../server/engine/cycle.ts';
import { prepareSingle } from '../../../server/engine/prepared-single.ts';
import { timingRoot } from '../../../server/engine/search/timing-root.ts';

const effects = fc.record({
  highOhms: fc.constantFrom(0, 40, 150),
  lowOhms: fc.constantFrom(0, 36, 130),
  delayLowHighSeconds: fc.double({ min: 0, max: 2e-6, noNaN: true }),
  delayHighLowSeconds: fc.double({ min: 0, max: 2e-6, noNaN: true }),
  invertingBiasAmps: fc.double({ min: -1e-8, max: 1e-8, noNaN: true }),
  offsetVolts: fc.double({ min: -5e-3, max: 5e-3, noNaN: true }),
  hysteresisVolts: fc.constantFrom(0, 2e-3),
});

function circuitWith(comparator: object, farads: number, ohms: number) {
  return createCircuit({
    supplyVolts: 5,
    r1Ohms: 1e5,
    r2Ohms: 1e5,
    r3Ohms: 1e5,
    timing: { kind: 'single', ohms },
    capacitor: { farads, leakageOhms: 1e10 },
    comparator,
  });
}

describe('timingRoot', () => {
  describe('when the target lies between the limits of timing resistance', () => {
    it('finds the resistance that gives the period to one part in 10¹⁰', () => {
      fc.assert(
        fc.property(
          effects,
          fc.constantFrom(1e-9, 1e-8, 1e-6),
          fc.double({ min: Math.log(3e3), max: Math.log(3e6), noNaN: true }),
          (comparator, farads, logOhms) => {
            const period = 2 * Math.LN2 * farads * Math.exp(logOhms);
            const root = timingRoot(prepareSingle(circuitWith(comparator, farads, 1)), period);
            const cycle = analyseCycle(circuitWith(comparator, farads, root));
            if (root <= 1000.001) return;
            expect(cycle.kind === 'oscillates' && cycle.periodSeconds / period - 1).toBeCloseTo(
              0,
              10,
            );
          },
        ),
        { numRuns: 300, seed: 8 },
      );
    });
  });

  describe('when the target is out of reach', () => {
    const prepared = prepareSingle(circuitWith({}, 1e-8, 1));

    it('stops at the lowest resistance for a rate that is too high', () => {
      expect(timingRoot(prepared, 1e-9)).toBe(1e3);
    });

    it('stops at the highest for a rate that is too low', () => {
      expect(timingRoot(prepared, 1e6)).toBe(1e7);
    });
  });

  describe('when bias stops the circuit long before the limit of resistance', () => {
    it('stays below the resistance that would stick, and hits the target there', () => {
      const comparator = { invertingBiasAmps: 1e-6 };
      const period = 2 * Math.LN2 * 1e-6 * 1e6;
      const root = timingRoot(prepareSingle(circuitWith(comparator, 1e-6, 1)), period);
      const cycle = analyseCycle(circuitWith(comparator, 1e-6, root));
      expect(cycle.kind === 'oscillates' && cycle.periodSeconds / period).toBeCloseTo(1, 10);
      expect(analyseCycle(circuitWith(comparator, 1e-6, 5e6)).kind).toBe('no-oscillation');
    });
  });
});
