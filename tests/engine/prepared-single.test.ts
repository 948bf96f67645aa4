import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createCircuit, type Circuit } from '../../server/engine/circuit.ts';
import { analyseCycle, solveCircuit, type SolvedCircuit } from '../../server/engine/cycle.ts';
import { periodAt, prepareSingle, splitAt } from '../../server/engine/prepared-single.ts';
import { circuitOf, referenceRows } from './reference-rows.ts';

const between = (low: number, high: number) =>
  fc.double({ min: Math.log(low), max: Math.log(high), noNaN: true }).map(Math.exp);
const signed = (limit: number) => fc.double({ min: -limit, max: limit, noNaN: true });

const anyCircuit = fc
  .record({
    supplyVolts: between(1.8, 12),
    r1Ohms: between(1e4, 1e6),
    r2Ohms: between(1e4, 1e6),
    r3Ohms: between(1e4, 1e6),
    ohms: between(1e3, 1e6),
    farads: between(1e-10, 1e-5),
    celsius: signed(60),
    openDrain: fc.boolean(),
    highOhms: between(1, 2000),
    lowOhms: between(1, 500),
    delayLowHighSeconds: between(1e-9, 1e-5),
    delayHighLowSeconds: between(1e-9, 1e-5),
    invertingBiasAmps: signed(1e-7),
    nonInvertingBiasAmps: signed(1e-7),
    offsetVolts: signed(0.01),
    hysteresisVolts: between(1e-4, 1e-2),
    leakageOhms: between(1e7, 1e10),
  })
  .map((draw) =>
    createCircuit({
      ...draw,
      timing: { kind: 'single', ohms: draw.ohms },
      resistorTemperatureCoefficientPerKelvin: 1e-4,
      timingTemperatureCoefficientPerKelvin: 5e-5,
      capacitor: {
        farads: draw.farads,
        leakageOhms: draw.leakageOhms,
        temperatureCoefficientPerKelvin: -2e-4,
      },
      comparator: {
        output: draw.openDrain ? 'open-drain' : 'push-pull',
        pullUpOhms: draw.openDrain ? 4700 : null,
        highOhms: draw.highOhms,
        lowOhms: draw.lowOhms,
        delayLowHighSeconds: draw.delayLowHighSeconds,
        delayHighLowSeconds: draw.delayHighLowSeconds,
        invertingBiasAmps: draw.invertingBiasAmps,
        nonInvertingBiasAmps: draw.nonInvertingBiasAmps,
        offsetVolts: draw.offsetVolts,
        hysteresisVolts: draw.hysteresisVolts,
      },
      load: { volts: 1.9, ohms: 1500 },
    }),
  );

const bench = createCircuit({
  supplyVolts: 5,
  r1Ohms: 1e5,
  r2Ohms: 1e5,
  r3Ohms: 1e5,
  timing: { kind: 'single', ohms: 1e5 },
  capacitor: { farads: 1e-7 },
});

function timingOhms(circuit: Circuit): number {
  if (circuit.timing.kind !== 'single') throw new Error('A single timing resistor was expected.');
  return circuit.timing.ohms;
}

/** How much rounding grows where thresholds lie close to one another or to where the run settles. */
function lostDigits({ high, low }: SolvedCircuit, supplyVolts: number): number {
  const gaps = [
    high.tripVolts - low.tripVolts,
    high.settlingVolts - high.tripVolts,
    low.tripVolts - low.settlingVolts,
  ];
  return gaps.reduce((sum, gap) => sum + supplyVolts / gap, 0);
}

describe('periodAt', () => {
  it('agrees with analyseCycle for any single-resistor circuit, and is NaN where that refuses', () => {
    let oscillating = 0;
    fc.assert(
      fc.property(anyCircuit, (circuit) => {
        const solved = solveCircuit(circuit);
        const period = periodAt(prepareSingle(circuit), timingOhms(circuit));
        if (solved.kind === 'no-oscillation') {
          expect(period).toBeNaN();
          return;
        }
        const lost = lostDigits(solved, circuit.supplyVolts);
        fc.pre(lost < 1e6);
        oscillating++;
        const allowed = 1e-14 * lost;
        expect(Math.abs(period / solved.cycle.periodSeconds - 1)).toBeLessThan(allowed);
      }),
      { numRuns: 2000, seed: 1 },
    );
    expect(oscillating).toBeGreaterThan(1000);
  });

  it('agrees to 1e-13 in the reference cases', () => {
    const rows = referenceRows('cases_public.csv').filter(
      (row) => row('timing') === 'r4' && Number(row('c_v50_v')) === 0,
    );
    expect(rows.length).toBeGreaterThan(25);
    for (const circuit of rows.map(circuitOf)) {
      const cycle = analyseCycle(circuit);
      if (cycle.kind !== 'oscillates') throw new Error(cycle.reason);
      const period = periodAt(prepareSingle(circuit), timingOhms(circuit));
      expect(Math.abs(period / cycle.periodSeconds - 1)).toBeLessThan(1e-13);
    }
  });

  it('takes another resistance and capacitance without preparing again', () => {
    const prepared = prepareSingle(bench);
    expect(periodAt(prepared, 2e5, 3e-7)).toBeCloseTo(0.06 * Math.log(4), 14);
    expect(prepared).toEqual(prepareSingle(bench));
  });

  it('splits the period into its high and low time', () => {
    const prepared = prepareSingle({ ...bench, r1Ohms: 2.2e5 });
    const split = { highSeconds: 0, lowSeconds: 0 };
    splitAt(prepared, 1e5, 1e-7, split);
    expect(split.highSeconds).toBeCloseTo(0.01 * Math.log(2), 14);
    expect(split.lowSeconds).toBeCloseTo(0.01 * Math.log(3.2), 14);
    expect(periodAt(prepared, 1e5)).toBe(split.highSeconds + split.lowSeconds);
    splitAt(prepared, -1, 1e-7, split);
    expect(split).toEqual({ highSeconds: NaN, lowSeconds: NaN });
  });

  it('is NaN for values no part has', () => {
    const prepared = prepareSingle(bench);
    expect([0, -1, NaN].map((ohms) => periodAt(prepared, ohms))).toEqual([NaN, NaN, NaN]);
    expect(periodAt(prepared, 1e5, 0)).toBeNaN();
  });
});

describe('prepareSingle', () => {
  it('refuses what only the full analysis can treat', () => {
    const diode = {
      saturationAmps: 2.5e-9,
      emissionCoefficient: 1.75,
      energyGapElectronVolts: 1.11,
      saturationTemperatureExponent: 3,
    };
    const steered = { kind: 'steered', chargeOhms: 1e4, dischargeOhms: 1e4, diode } as const;
    const biased = { ...bench.capacitor, biasHalvingVolts: 6 };
    const melted = { celsius: 1000, timingTemperatureCoefficientPerKelvin: -0.004 };
    expect(() => prepareSingle({ ...bench, timing: steered })).toThrow(/single timing resistor/);
    expect(() => prepareSingle({ ...bench, capacitor: biased })).toThrow(/depend on voltage/);
    expect(() => prepareSingle({ ...bench, ...melted })).toThrow(/negative at 1000 °C/);
  });
});
