import { describe, expect, it } from 'vitest';
import { createCircuit, type CircuitDraft } from '../../server/engine/circuit.ts';
import { analyseCycle, type Cycle } from '../../server/engine/cycle.ts';
import { averageSupplyAmps, supplyCurrent } from '../../server/engine/supply-current.ts';

const equal: CircuitDraft = {
  supplyVolts: 5,
  r1Ohms: 1e5,
  r2Ohms: 1e5,
  r3Ohms: 1e5,
  timing: { kind: 'single', ohms: 1e5 },
  capacitor: { farads: 1e-7 },
};

function currentOf(draft: CircuitDraft, quiescentAmps = 0) {
  const current = supplyCurrent(createCircuit(draft), quiescentAmps);
  if (current.kind !== 'supply-current') throw new Error(current.reason);
  return current;
}

function cycleOf(draft: CircuitDraft): Cycle {
  const cycle = analyseCycle(createCircuit(draft));
  if (cycle.kind !== 'oscillates') throw new Error(cycle.reason);
  return cycle;
}

describe('supplyCurrent', () => {
  describe('when everything is ideal and R1 to R3 are equal', () => {
    it('draws the divider current worked out by hand', () => {
      // High: R2 carries (2/3) V+ / R, all of it from the supply. Low: R1 carries (2/3) V+ / R.
      expect(currentOf(equal).thresholdAmps).toBeCloseTo(((2 / 3) * 5) / 1e5, 15);
    });

    it("draws the capacitor's charge C·swing once a period through the timing branch", () => {
      const cycle = cycleOf(equal);
      expect(currentOf(equal).timingAmps).toBeCloseTo((1e-7 * 5) / 3 / cycle.periodSeconds, 15);
    });
  });

  it('takes the charge from the same curve when the capacitance depends on voltage', () => {
    const draft = { ...equal, capacitor: { farads: 1e-7, biasHalvingVolts: 4 } };
    const cycle = cycleOf(draft);
    // Integral of C / (1 + (V/v)²): C·v·atan(V/v).
    const charge = 4e-7 * (Math.atan(cycle.peakVolts / 4) - Math.atan(cycle.valleyVolts / 4));
    expect(currentOf(draft).timingAmps / (charge / cycle.periodSeconds)).toBeCloseTo(1, 9);
  });

  it('draws C·swing a period through steered timing too, overshoot included', () => {
    const draft: CircuitDraft = {
      ...equal,
      timing: {
        kind: 'steered',
        chargeOhms: 1e4,
        dischargeOhms: 1e5,
        diode: {
          saturationAmps: 2.5e-9,
          emissionCoefficient: 1.75,
          energyGapElectronVolts: 1.11,
          saturationTemperatureExponent: 3,
        },
      },
      comparator: { delayHighLowSeconds: 2e-5, delayLowHighSeconds: 1e-5, highOhms: 300 },
    };
    const cycle = cycleOf(draft);
    const charge = 1e-7 * (cycle.peakVolts - cycle.valleyVolts);
    expect(currentOf(draft).timingAmps / (charge / cycle.periodSeconds)).toBeCloseTo(1, 8);
  });

  it('adds the quiescent current and the pull-up while the output is low', () => {
    const draft: CircuitDraft = {
      ...equal,
      comparator: { output: 'open-drain', pullUpOhms: 4700 },
    };
    const cycle = cycleOf(draft);
    const current = currentOf(draft, 1e-5);
    expect(current.quiescentAmps).toBe(1e-5);
    expect(current.pullUpAmps).toBeCloseTo(((1 - cycle.duty) * 5) / 4700, 12);
    const { thresholdAmps, timingAmps, pullUpAmps, loadAmps } = current;
    const sum = thresholdAmps + timingAmps + pullUpAmps + loadAmps + 1e-5;
    expect(averageSupplyAmps(createCircuit(draft), 1e-5)).toBeCloseTo(sum, 15);
  });

  it('adds the indicator while the output is high', () => {
    const draft = { ...equal, load: { volts: 1.9, ohms: 1500 } };
    expect(currentOf(draft).loadAmps).toBeCloseTo((0.5 * 3.1) / 1500, 12);
  });

  it('leaves out an indicator that the output cannot light', () => {
    const draft = { ...equal, load: { volts: 6, ohms: 1500 } };
    expect(currentOf(draft).loadAmps).toBe(0);
    expect(cycleOf(draft)).toEqual(cycleOf(equal));
  });

  it('gives no current for a circuit that does not oscillate', () => {
    const stuck = createCircuit({ ...equal, comparator: { highVolts: 1 } });
    expect(averageSupplyAmps(stuck)).toBeNaN();
  });

  it('refuses a negative quiescent current', () => {
    expect(() => averageSupplyAmps(createCircuit(equal), -1)).toThrow(RangeError);
  });
});
