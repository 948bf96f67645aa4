import { describe, expect, it } from 'vitest';
import { createCircuit, type CircuitDraft } from '../../server/engine/circuit.ts';
import { analyseCycle, solveCircuit, type Cycle } from '../../server/engine/cycle.ts';
import { nearestPreferred } from '../../server/engine/e-series.ts';
import { sampleWaveform } from '../../server/engine/waveform.ts';

const equal: CircuitDraft = {
  supplyVolts: 5,
  r1Ohms: 1e5,
  r2Ohms: 1e5,
  r3Ohms: 1e5,
  timing: { kind: 'single', ohms: 1e5 },
  capacitor: { farads: 1e-7 },
};
const diode = {
  saturationAmps: 2.5e-9,
  emissionCoefficient: 1.75,
  energyGapElectronVolts: 1.11,
  saturationTemperatureExponent: 3,
};
const steered: CircuitDraft = {
  ...equal,
  timing: { kind: 'steered', chargeOhms: 1e4, dischargeOhms: 1e5, diode },
};
const tau = 0.01;

function cycleOf(draft: CircuitDraft): Cycle {
  const cycle = analyseCycle(createCircuit(draft));
  if (cycle.kind !== 'oscillates') throw new Error(cycle.reason);
  return cycle;
}

function refusalOf(draft: CircuitDraft) {
  const outcome = analyseCycle(createCircuit(draft));
  if (outcome.kind === 'oscillates') throw new Error('It oscillates.');
  return outcome;
}

describe('analyseCycle', () => {
  describe('when a 1 Hz blinker is worked out on the bench (common practice, no source)', () => {
    const wanted = 1 / (2 * Math.LN2);
    const capacitorEstimate = 1e-6 * Math.sqrt(wanted);
    const farads = nearestPreferred(capacitorEstimate, 'E24');
    const timingOhms = wanted / farads;
    const chosen = nearestPreferred(timingOhms, 'E96');
    const circuit = createCircuit({
      ...equal,
      timing: { kind: 'single', ohms: chosen },
      capacitor: { farads },
    });

    it('takes τ = 0.721 s, 0.82 µF and 887 kΩ', () => {
      expect(wanted).toBeCloseTo(0.7213, 4);
      expect(capacitorEstimate).toBeCloseTo(0.849e-6, 9);
      expect(farads).toBe(8.2e-7);
      expect(timingOhms).toBeCloseTo(879_700, -2);
      expect(chosen).toBe(887_000);
    });

    it('lands 0.8 % under 1 Hz with half of each beat lit', () => {
      const cycle = analyseCycle(circuit);
      expect(cycle).toMatchObject({ kind: 'oscillates', duty: expect.closeTo(0.5, 12) });
      expect(cycle).toMatchObject({ frequencyHz: expect.closeTo(879_700 / 887_000, 4) });
    });

    it('crosses the thresholds at 0.405 τ and 1.0986 τ from an empty capacitor', () => {
      const solved = solveCircuit(circuit);
      if (solved.kind !== 'solved') throw new Error(solved.reason);
      const own = solved.cycle.tauHighSeconds ?? NaN;
      const lower = solved.high.secondsBetween(0, solved.cycle.thresholdLowVolts) / own;
      const upper = solved.cycle.firstHighSeconds / own;
      expect(own).toBeCloseTo(887_000 * 8.2e-7, 14);
      expect(lower).toBeCloseTo(0.4055, 4);
      expect(upper).toBeCloseTo(1.0986, 4);
      expect(upper - lower).toBeCloseTo(Math.LN2, 12);
    });
  });

  describe('when everything is ideal', () => {
    it('follows the closed forms for any R1 to R3', () => {
      for (const [r1, r2, r3] of [
        [1, 1, 1],
        [2.2, 0.33, 1],
        [0.1, 5, 3],
      ] as const) {
        const cycle = cycleOf({ ...equal, r1Ohms: r1 * 1e5, r2Ohms: r2 * 1e5, r3Ohms: r3 * 1e5 });
        expect(cycle.highSeconds).toBeCloseTo(tau * Math.log(1 + r2 / r3), 14);
        expect(cycle.lowSeconds).toBeCloseTo(tau * Math.log(1 + r1 / r3), 14);
        expect(cycle.firstHighSeconds).toBeCloseTo(tau * Math.log(1 + r2 / r1 + r2 / r3), 14);
        const swing = cycle.thresholdHighVolts - cycle.thresholdLowVolts;
        expect(swing / 5).toBeCloseTo(1 / (1 + r3 / r1 + r3 / r2), 12);
      }
    });

    it('realises a duty that was designed for', () => {
      const [duty, span] = [0.2, 1.3];
      const cycle = cycleOf({
        ...equal,
        r1Ohms: 1e5 * Math.expm1((1 - duty) * span),
        r2Ohms: 1e5 * Math.expm1(duty * span),
      });
      expect(cycle.duty).toBeCloseTo(duty, 12);
      expect(cycle.periodSeconds).toBeCloseTo(tau * span, 14);
    });

    it('does not depend on the supply', () => {
      expect(cycleOf({ ...equal, supplyVolts: 1.8 }).periodSeconds).toBeCloseTo(
        cycleOf({ ...equal, supplyVolts: 18 }).periodSeconds,
        15,
      );
    });
  });

  describe('when the comparator is slow', () => {
    const delays = { delayLowHighSeconds: 3e-4, delayHighLowSeconds: 5e-4 };

    it('follows the closed form of equal resistors with delays', () => {
      const cycle = cycleOf({ ...equal, comparator: delays });
      expect(cycle.highSeconds).toBeCloseTo(5e-4 + tau * Math.log(3 - Math.exp(-0.03)), 14);
      expect(cycle.lowSeconds).toBeCloseTo(3e-4 + tau * Math.log(3 - Math.exp(-0.05)), 14);
    });

    it('costs about one and a half times the delay an edge', () => {
      const small = { delayLowHighSeconds: 1e-7, delayHighLowSeconds: 1e-7 };
      const added = cycleOf({ ...equal, comparator: small }).periodSeconds - tau * Math.log(4);
      expect(added / (1.5 * 2e-7)).toBeCloseTo(1, 4);
    });
  });

  it('sees offset and bias only as their sum in volts', () => {
    const bias = { invertingBiasAmps: 1e-7, nonInvertingBiasAmps: 1.5e-7 };
    const volts = 1e-7 * 1e5 - 1.5e-7 * (1e5 / 3);
    const one = cycleOf({ ...equal, comparator: bias });
    const other = cycleOf({ ...equal, comparator: { offsetVolts: volts } });
    expect(one.highSeconds).toBeCloseTo(other.highSeconds, 14);
    expect(one.lowSeconds).toBeCloseTo(other.lowSeconds, 14);
    const x = volts / 5;
    expect(one.periodSeconds / tau).toBeCloseTo(Math.log(4) + 6.75 * x * x, 6);
    expect(one.duty).toBeCloseTo(0.5 + (1.5 * x) / Math.log(4), 5);
  });

  describe('when the capacitance depends on voltage', () => {
    const v = 4;
    const biased = { ...equal, capacitor: { farads: 1e-7, biasHalvingVolts: v } };

    it('agrees with the integral in closed form', () => {
      // ∫ dV / ((1+V²/v²)(E−V)) by partial fractions.
      const primitive = (volts: number, end: number) =>
        (v ** 2 / (v ** 2 + end ** 2)) *
        (-Math.log(Math.abs(end - volts)) +
          Math.log(v ** 2 + volts ** 2) / 2 +
          (end / v) * Math.atan(volts / v));
      const cycle = cycleOf(biased);
      const { thresholdHighVolts: upper, thresholdLowVolts: lower } = cycle;
      expect(cycle.highSeconds / tau).toBeCloseTo(primitive(upper, 5) - primitive(lower, 5), 13);
      expect(cycle.lowSeconds / tau).toBeCloseTo(primitive(lower, 0) - primitive(upper, 0), 13);
    });

    it('gives the same from a finely tabulated curve, delays included', () => {
      const volts = Array.from({ length: 2001 }, (_, k) => k / 400);
      const fractions = volts.map((each) => 1 / (1 + (each / v) ** 2));
      const comparator = { delayLowHighSeconds: 2e-4, delayHighLowSeconds: 3e-4 };
      const smooth = cycleOf({ ...biased, comparator });
      const biasCurve = { volts, fractions };
      const table = cycleOf({ ...equal, comparator, capacitor: { farads: 1e-7, biasCurve } });
      expect(table.periodSeconds / smooth.periodSeconds).toBeCloseTo(1, 6);
      expect(table.peakVolts / smooth.peakVolts).toBeCloseTo(1, 6);
    });

    it('takes a flat table for the constant it is, and the last value beyond its end', () => {
      for (const curve of [
        { volts: [1, 2, 9], fractions: [0.5, 0.5, 0.5] },
        { volts: [0, 0.5], fractions: [0.5, 0.5] },
      ]) {
        const cycle = cycleOf({ ...equal, capacitor: { farads: 2e-7, biasCurve: curve } });
        expect(cycle.periodSeconds / (tau * Math.log(4))).toBeCloseTo(1, 13);
      }
    });

    it('integrates a steered run over the same curve, and over a constant one as in closed form', () => {
      const flat = { volts: [0], fractions: [1] };
      const closed = cycleOf(steered);
      const table = cycleOf({ ...steered, capacitor: { farads: 1e-7, biasCurve: flat } });
      expect(table.periodSeconds / closed.periodSeconds).toBeCloseTo(1, 12);
      const derated = cycleOf({ ...steered, capacitor: { farads: 1e-7, biasHalvingVolts: v } });
      expect(derated.periodSeconds).toBeLessThan(closed.periodSeconds);
    });
  });

  describe('when the timing is steered', () => {
    it('comes to the exponential as the diodes vanish', () => {
      const faint = { ...diode, saturationAmps: 1e-7, emissionCoefficient: 1e-4 };
      const cycle = cycleOf({
        ...equal,
        timing: { kind: 'steered', chargeOhms: 1e5, dischargeOhms: 1e5, diode: faint },
      });
      expect(cycle.periodSeconds / (tau * Math.log(4))).toBeCloseTo(1, 2);
    });

    it('states the headroom in units of n·V_t', () => {
      const cycle = cycleOf(steered);
      // 1/3 of 5 V over 1.75 · 25.69 mV.
      expect(cycle.steeringHeadroom).toBeCloseTo(5 / 3 / (1.75 * 0.025693), 2);
      expect(cycle.tauHighSeconds).toBeNull();
    });

    it('stops where the current ends when a delay outlasts it', () => {
      const late = { delayHighLowSeconds: 5, delayLowHighSeconds: 5 };
      const open = cycleOf({ ...steered, comparator: late });
      expect(open.peakVolts).toBeCloseTo(5, 9);
      expect(open.valleyVolts).toBeCloseTo(0, 9);
      const drained = cycleOf({ ...steered, comparator: { ...late, invertingBiasAmps: 1e-7 } });
      expect(drained.peakVolts).toBeLessThan(4.9);
      expect(drained.peakVolts).toBeGreaterThan(drained.thresholdHighVolts);
      const pulled = cycleOf({ ...steered, comparator: { ...late, invertingBiasAmps: 1e-10 } });
      expect(pulled.peakVolts).toBeCloseTo(5, 6);
    });
  });

  describe('when an indicator hangs on the output', () => {
    const load = { volts: 1.9, ohms: 1000 };

    it('changes nothing for an output without resistance', () => {
      expect(cycleOf({ ...equal, load })).toEqual(cycleOf(equal));
    });

    it('acts as the divider that it forms with the output resistance', () => {
      const loaded = cycleOf({ ...equal, load, comparator: { highOhms: 1000 } });
      // 5 V through 1 kΩ against 1.9 V through 1 kΩ: 3.45 V behind 500 Ω.
      const alike = cycleOf({ ...equal, comparator: { highVolts: 3.45, highOhms: 500 } });
      expect(loaded.periodSeconds).toBeCloseTo(alike.periodSeconds, 14);
      expect(loaded.duty).toBeCloseTo(alike.duty, 12);
    });
  });

  it('takes a pull-up beside a push-pull output with resistance as one source', () => {
    const both = cycleOf({
      ...equal,
      comparator: { highOhms: 1e3, highVolts: 4, pullUpOhms: 1e3 },
    });
    const one = cycleOf({ ...equal, comparator: { highOhms: 500, highVolts: 4.5 } });
    expect(both.periodSeconds).toBeCloseTo(one.periodSeconds, 14);
  });

  it('lets thresholds and timing drift by coefficients of their own', () => {
    const cycle = cycleOf({
      ...equal,
      celsius: 75,
      thresholdTemperatureCoefficientPerKelvin: 1e-3,
      timingTemperatureCoefficientPerKelvin: -2e-4,
    });
    expect(cycle.periodSeconds).toBeCloseTo(0.99 * tau * Math.log(4), 14);
  });

  describe('when the circuit cannot oscillate', () => {
    it.each<[string, CircuitDraft]>([
      ['threshold-not-positive', { ...equal, comparator: { offsetVolts: -4 } }],
      ['thresholds-inverted', { ...equal, comparator: { highVolts: 0 } }],
      ['stuck-high', { ...equal, comparator: { highVolts: 2 } }],
      ['stuck-low', { ...equal, comparator: { lowVolts: 3.4 } }],
      ['stuck-high', { ...steered, supplyVolts: 0.1, comparator: { highVolts: 0.04 } }],
      ['stuck-low', { ...steered, comparator: { offsetVolts: -1.7 } }],
      [
        'outside-temperature-range',
        { ...equal, celsius: 300, resistorTemperatureCoefficientPerKelvin: -0.004 },
      ],
      [
        'beyond-numbers',
        { ...equal, capacitor: { farads: 1e-300 }, timing: { kind: 'single', ohms: 1e-30 } },
      ],
    ])('refuses as %s with a sentence that says what to change', (code, draft) => {
      const refusal = refusalOf(draft);
      expect(refusal.code).toBe(code);
      expect(refusal.reason).toMatch(/\. (Lower|Raise|Give|Choose) .*\.$/);
    });
  });

  describe('when a number is impossible', () => {
    const part = (change: Partial<CircuitDraft>): CircuitDraft => ({ ...equal, ...change });
    it.each<[string, CircuitDraft]>([
      ['The supply', part({ supplyVolts: 0 })],
      ['The temperature', part({ celsius: -300 })],
      ['The temperature', part({ celsius: NaN })],
      ['R1', part({ r1Ohms: -1 })],
      ['R2', part({ r2Ohms: NaN })],
      ['R3', part({ r3Ohms: Infinity })],
      ['The timing resistance', part({ timing: { kind: 'single', ohms: 0 } })],
      [
        'The charging resistance',
        part({ timing: { kind: 'steered', chargeOhms: 0, dischargeOhms: 1, diode } }),
      ],
      ['The capacitance', part({ capacitor: { farads: 0 } })],
      ['The leakage resistance', part({ capacitor: { farads: 1, leakageOhms: 0 } })],
      ['The halving voltage', part({ capacitor: { farads: 1, biasHalvingVolts: 0 } })],
      [
        'A bias curve',
        part({ capacitor: { farads: 1, biasCurve: { volts: [0, 1], fractions: [1] } } }),
      ],
      [
        'The voltages of a bias curve',
        part({ capacitor: { farads: 1, biasCurve: { volts: [1, 1], fractions: [1, 1] } } }),
      ],
      ['An open-drain output', part({ comparator: { output: 'open-drain' } })],
      ['The rising delay', part({ comparator: { delayLowHighSeconds: -1 } })],
      ['The pull-up', part({ comparator: { pullUpOhms: 0 } })],
      ["The load's series resistance", part({ load: { volts: 2, ohms: 0 } })],
    ])('throws a RangeError that begins "%s"', (start, draft) => {
      expect(() => analyseCycle(createCircuit(draft))).toThrow(RangeError);
      expect(() => analyseCycle(createCircuit(draft))).toThrow(start);
    });
  });

  it('draws a biased capacitor through its delay without a jump', () => {
    const circuit = createCircuit({
      ...equal,
      capacitor: {
        farads: 1e-7,
        biasCurve: { volts: [0, 2, 3, 5], fractions: [1, 0.9, 0.4, 0.2] },
      },
      comparator: { delayHighLowSeconds: 1e-3, delayLowHighSeconds: 1e-3 },
    });
    const cycle = analyseCycle(circuit);
    if (cycle.kind !== 'oscillates') throw new Error(cycle.reason);
    const { capacitor } = sampleWaveform(circuit, cycle, { periods: 1, pointsPerSegment: 50 });
    const rising = capacitor.slice(0, 51).map(([, volts]) => volts);
    expect(rising).toEqual(rising.toSorted((a, b) => a - b));
    expect(rising.at(-1)).toBeCloseTo(cycle.peakVolts, 9);
  });
});
