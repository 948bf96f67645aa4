import { describe, expect, it } from 'vitest';
import { createCircuit, type Circuit } from '../../server/engine/circuit.ts';
import { analyseCycle, type Cycle } from '../../server/engine/cycle.ts';
import { pulseStrip } from '../../server/engine/pulse-strip.ts';
import { sampleWaveform, type Point } from '../../server/engine/waveform.ts';
import { pulseStripSchema } from '../../server/contracts/drawing.ts';
import { circuitOf, referenceRows } from './reference-rows.ts';

function cycleOf(circuit: Circuit): Cycle {
  const cycle = analyseCycle(circuit);
  if (cycle.kind !== 'oscillates') throw new Error(cycle.reason);
  return cycle;
}

const equal = createCircuit({
  supplyVolts: 9,
  r1Ohms: 1e5,
  r2Ohms: 1e5,
  r3Ohms: 1e5,
  timing: { kind: 'single', ohms: 1e5 },
  capacitor: { farads: 1e-6 },
});
const reference = referenceRows('cases_public.csv').map((row) => circuitOf(row));
const last = (points: Point[]): Point => points.at(-1) ?? [NaN, NaN];

describe('sampleWaveform', () => {
  it('starts from an empty capacitor and crosses both thresholds on time', () => {
    const cycle = cycleOf(equal);
    const wave = sampleWaveform(equal, cycle, {
      periods: 1,
      pointsPerSegment: 400,
      fromStart: true,
    });
    expect(wave.capacitor[0]).toEqual([0, 0]);
    // V = 9 (1 − e^(−t/τ)) with τ = 0.1 s until 6 V.
    for (const [seconds, volts] of wave.capacitor.slice(0, 400)) {
      expect(volts).toBeCloseTo(9 * (1 - Math.exp(-seconds / 0.1)), 12);
    }
    expect(wave.capacitor[400]?.[1]).toBeCloseTo(6, 12);
    expect(last(wave.capacitor)).toEqual([cycle.firstCycleSeconds, expect.closeTo(3, 12)]);
  });

  it('has ascending times, an edge as two points, and ends on a whole period', () => {
    for (const circuit of reference) {
      const cycle = cycleOf(circuit);
      const wave = sampleWaveform(circuit, cycle, { periods: 3, pointsPerSegment: 8 });
      expect(wave.output).toHaveLength(54);
      expect(wave.capacitor).toHaveLength(49);
      const times = wave.output.map(([seconds]) => seconds);
      expect(times).toEqual(times.toSorted((a, b) => a - b));
      expect(wave.output[8]?.[0]).toBe(wave.output[9]?.[0]);
      expect(last(wave.capacitor)[0] / cycle.periodSeconds).toBeCloseTo(3, 12);
    }
  });

  it('closes the settled cycle: after a period the capacitor is back where it began', () => {
    for (const circuit of reference) {
      const cycle = cycleOf(circuit);
      const wave = sampleWaveform(circuit, cycle, { periods: 1, pointsPerSegment: 5 });
      expect(last(wave.capacitor)[1] / (wave.capacitor[0]?.[1] ?? NaN)).toBeCloseTo(1, 8);
      expect((wave.capacitor[5]?.[1] ?? NaN) / cycle.peakVolts).toBeCloseTo(1, 8);
    }
  });

  it('lets the output rise while an open-drain pull-up charges the capacitor', () => {
    const circuit = { ...equal, comparator: { ...equal.comparator, pullUpOhms: 1e4 } };
    circuit.comparator.output = 'open-drain';
    const wave = sampleWaveform(circuit, cycleOf(circuit), { periods: 1, pointsPerSegment: 10 });
    const high = wave.output.slice(0, 11).map(([, volts]) => volts);
    expect(high).toEqual(high.toSorted((a, b) => a - b));
    expect(high.at(-1)).toBeGreaterThan((high[0] ?? NaN) + 0.1);
    expect(high.at(-1)).toBeLessThan(9);
  });

  it('refuses less than one period, and a circuit that does not oscillate', () => {
    const cycle = cycleOf(equal);
    const none = { periods: 0, pointsPerSegment: 5 };
    expect(() => sampleWaveform(equal, cycle, none)).toThrow(/at least one period/);
    const stuck = { ...equal, comparator: { ...equal.comparator, highVolts: 1 } };
    const one = { periods: 1, pointsPerSegment: 5 };
    expect(() => sampleWaveform(stuck, cycle, one)).toThrow(RangeError);
  });
});

describe('pulseStrip', () => {
  it('draws an ideal output with its corners only', () => {
    const strip = pulseStrip(equal, cycleOf(equal));
    expect(strip.output).toEqual([
      [0, 1],
      [0.25, 1],
      [0.25, 0],
      [0.5, 0],
      [0.5, 1],
      [0.75, 1],
      [0.75, 0],
      [1, 0],
    ]);
    expect(strip.thresholds).toEqual([0.333, 0.667]);
    expect(strip.capacitor[0]).toEqual([0, 0.333]);
    expect(strip.capacitor[14]).toEqual([0.25, 0.667]);
    expect(strip.periodSeconds).toBeCloseTo(0.1 * Math.log(4), 12);
  });

  it('stays in the unit box with at most 60 capacitor points, to three decimals', () => {
    for (const circuit of reference) {
      const strip = pulseStripSchema.parse(pulseStrip(circuit, cycleOf(circuit)));
      expect(strip.capacitor.length).toBeLessThanOrEqual(60);
      for (const value of [...strip.output, ...strip.capacitor].flat()) {
        expect(value).toBeGreaterThanOrEqual(0);
        expect(value).toBeLessThanOrEqual(1);
        expect(value).toBe(Number(value.toFixed(3)));
      }
    }
  });
});
