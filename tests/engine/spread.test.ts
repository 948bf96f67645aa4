import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createCircuit, type CircuitDraft } from '../../server/engine/circuit.ts';
import { analyseCycle } from '../../server/engine/cycle.ts';
import { kitRate, nominalKit } from '../../server/engine/kit-rate.ts';
import { rateSurface } from '../../server/engine/rate-surface.ts';
import { rateSensitivities } from '../../server/engine/sensitivity.ts';
import { monteCarlo, rssFraction, worstCase } from '../../server/engine/spread.ts';
import { circuitOf, referenceRows, type Row } from './reference-rows.ts';

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
const smallTolerances = { thresholds: 0.01, timing: 0.01, capacitor: 0.05 };

function frequencyOf(draft: CircuitDraft): number {
  const cycle = analyseCycle(createCircuit(draft));
  if (cycle.kind !== 'oscillates') throw new Error(cycle.reason);
  return cycle.frequencyHz;
}

function toleranceCase(row: Row) {
  const number = (column: string) => Number(row(column));
  return {
    circuit: createCircuit({
      supplyVolts: number('vcc_v'),
      r1Ohms: number('r1_ohm'),
      r2Ohms: number('r2_ohm'),
      r3Ohms: number('r3_ohm'),
      timing: { kind: 'single', ohms: number('r4_ohm') },
      capacitor: { farads: number('c_f') },
    }),
    tolerances: {
      thresholds: number('tol_r1r2r3_rel'),
      timing: number('tol_r4_rel'),
      capacitor: number('tol_c_rel'),
    },
    distribution: row('distribution') === 'uniform' ? ('uniform' as const) : ('normal' as const),
    targetHz: number('f_target_hz'),
  };
}

const toleranceRows = referenceRows('tolerance_public.csv');
const named = toleranceRows.map((row): [string, Row] => [row('case_id'), row]);

describe('rateSensitivities', () => {
  const cases = referenceRows('cases_public.csv');
  const circuitOfCase = (id: string) => {
    const found = cases.find((row) => row('case_id') === id);
    if (!found) throw new Error(`There is no case ${id}.`);
    return circuitOf(found);
  };
  const points = { equal: circuitOfCase('P01'), unequal: circuitOfCase('P06') };

  it.each(referenceRows('sensitivities.csv').map((row) => [row('point'), row('parameter'), row]))(
    'agrees with the published reference and the simulation at the %s point for %s',
    (point, parameter, row) => {
      const of = rateSensitivities(point === 'equal' ? points.equal : points.unequal);
      const values: Record<string, number> = {
        r1_ohm: of.r1,
        r2_ohm: of.r2,
        r3_ohm: of.r3,
        r4_ohm: of.timing,
        c_f: of.capacitor,
      };
      expect(of.method).toBe('closed');
      expect(values[parameter]).toBeCloseTo(Number(row('analytic')), 8);
      expect(Math.abs((values[parameter] ?? NaN) - Number(row('ngspice_pm2pct')))).toBeLessThan(
        1e-3,
      );
    },
  );

  it('finds the same by differences of the full model', () => {
    for (const circuit of Object.values(points)) {
      const closed = rateSensitivities(circuit);
      const comparator = { ...circuit.comparator, offsetVolts: 1e-15 };
      const differences = rateSensitivities({ ...circuit, comparator });
      expect(differences.method).toBe('differences');
      for (const part of ['r1', 'r2', 'r3', 'timing', 'discharge', 'capacitor'] as const) {
        expect(differences[part]).toBeCloseTo(closed[part], 7);
      }
    }
  });

  it('splits the timing between both resistors when steered', () => {
    const of = rateSensitivities(createCircuit(steered));
    // R1 to R3 only shift thresholds, so their sensitivities cancel; C scales the whole period.
    expect(of.r1 + of.r2 + of.r3).toBeCloseTo(0, 7);
    expect(of.capacitor).toBeCloseTo(-1, 7);
    expect(of.timing).toBeLessThan(0);
    expect(of.discharge).toBeLessThan(of.timing);
  });

  it('is NaN where the circuit does not oscillate', () => {
    const stuck = createCircuit({ ...equal, comparator: { highVolts: 1 } });
    expect(rateSensitivities(stuck).r1).toBeNaN();
  });
});

describe('worstCase', () => {
  it.each(named)('gives both corners of %s and their signs', (_id, row) => {
    const { circuit, tolerances } = toleranceCase(row);
    const found = worstCase(circuit, tolerances);
    expect(found.minHz / Number(row('f_min_corner_hz'))).toBeCloseTo(1, 10);
    expect(found.maxHz / Number(row('f_max_corner_hz'))).toBeCloseTo(1, 10);
    const signs = ({ r1, r2, r3, timing, capacitor }: typeof found.minSigns) =>
      [r1, r2, r3, timing, capacitor].map((sign) => (sign > 0 ? '+' : '-')).join('');
    expect(signs(found.minSigns)).toBe(row('f_min_corner_signs_r1r2r3r4c'));
    expect(signs(found.maxSigns)).toBe(row('f_max_corner_signs_r1r2r3r4c'));
  });

  it('contains any kit within the tolerances, steered or not', () => {
    const deviation = fc.double({ min: -1, max: 1, noNaN: true });
    const slow = { delayHighLowSeconds: 2e-6, delayLowHighSeconds: 1e-6, invertingBiasAmps: 2e-8 };
    for (const draft of [equal, { ...equal, comparator: slow }, steered]) {
      const circuit = createCircuit(draft);
      const found = worstCase(circuit, smallTolerances);
      const rate = kitRate(circuit);
      fc.assert(
        fc.property(fc.tuple(...Array.from({ length: 6 }, () => deviation)), (draw) => {
          const [r1 = 0, r2 = 0, r3 = 0, timing = 0, discharge = 0, capacitor = 0] = draw;
          const hz = rate({
            r1: 1 + 0.01 * r1,
            r2: 1 + 0.01 * r2,
            r3: 1 + 0.01 * r3,
            timing: 1 + 0.01 * timing,
            discharge: 1 + 0.01 * discharge,
            capacitor: 1 + 0.05 * capacitor,
          });
          expect(hz).toBeGreaterThanOrEqual(found.minHz * (1 - 1e-12));
          expect(hz).toBeLessThanOrEqual(found.maxHz * (1 + 1e-12));
        }),
        { numRuns: 500, seed: 3 },
      );
    }
  });

  describe('when the offset is uncertain', () => {
    const none = { thresholds: 0, timing: 0, capacitor: 0 };

    it('finds the greatest rate at zero offset, inside the range, and the least at an end', () => {
      const found = worstCase(createCircuit(equal), none, 0.05);
      expect(found.maxHz / frequencyOf(equal)).toBeCloseTo(1, 12);
      const shifted = frequencyOf({ ...equal, comparator: { offsetVolts: 0.05 } });
      expect(found.minHz / shifted).toBeCloseTo(1, 12);
    });

    it('finds it where the offset cancels the bias', () => {
      // δ = Vos + IBn R4, so Vos = −IBn R4 restores the ideal rate.
      const biased = createCircuit({ ...equal, comparator: { invertingBiasAmps: 2e-7 } });
      expect(worstCase(biased, none, 0.05).maxHz / frequencyOf(equal)).toBeCloseTo(1, 9);
    });

    it('finds it at an end when the cancelling offset is out of reach', () => {
      const biased = { ...equal, comparator: { invertingBiasAmps: 2e-6 } };
      const end = frequencyOf({
        ...equal,
        comparator: { invertingBiasAmps: 2e-6, offsetVolts: -0.05 },
      });
      expect(worstCase(createCircuit(biased), none, 0.05).maxHz / end).toBeCloseTo(1, 12);
    });
  });

  it('gives 0 Hz where a kit within the tolerances stops', () => {
    const edge = createCircuit({
      ...equal,
      capacitor: { farads: 1e-7, leakageOhms: 2.01e5 },
    });
    expect(worstCase(edge, smallTolerances).minHz).toBe(0);
  });

  it('refuses a tolerance of 100 % and more', () => {
    const impossible = { ...smallTolerances, capacitor: 1 };
    expect(() => worstCase(createCircuit(equal), impossible)).toThrow(/tolerance of capacitor/);
  });
});

describe('rssFraction', () => {
  it.each(named)('agrees with %s', (_id, row) => {
    const { circuit, tolerances, distribution } = toleranceCase(row);
    const rss = rssFraction(rateSensitivities(circuit), tolerances);
    expect(rss).toBeCloseTo(Number(row('rss_rel')), 9);
    const sigma = rss / (distribution === 'uniform' ? Math.sqrt(3) : 3);
    expect(sigma).toBeCloseTo(Number(row('sigma_linear_rel')), 9);
  });
});

describe('monteCarlo', () => {
  const samples = 100_000;

  it.each(named)('gives the yields of %s within five standard errors', (_id, row) => {
    const { circuit, tolerances, distribution, targetHz } = toleranceCase(row);
    const found = monteCarlo(circuit, tolerances, {
      distribution,
      targetHz,
      band: 0.05,
      samples,
      seed: 11,
    });
    const within = (band: number) =>
      found.ratesHz.filter((hz) => Math.abs(hz / targetHz - 1) <= band).length / samples;
    expect(found.yieldWithinBand).toBe(within(0.05));
    for (const percent of [1, 2, 5, 10, 20]) {
      const exact = Number(row(`exact_yield_${percent}pct`));
      const allowed = 5 * Math.sqrt((exact * (1 - exact)) / samples) + 1e-8;
      expect(Math.abs(within(percent / 100) - exact)).toBeLessThanOrEqual(allowed);
    }
    const meanError = (6 * found.standardDeviationHz) / targetHz / Math.sqrt(samples);
    expect(Math.abs(found.meanHz / Number(row('mc_mean_hz')) - 1)).toBeLessThan(meanError);
    expect(found.standardDeviationHz / Number(row('mc_std_hz'))).toBeCloseTo(1, 1);
  });

  const options = { distribution: 'uniform', targetHz: 72, band: 0.05, samples, seed: 7 } as const;

  it('repeats itself for a seed, sorts the rates and states the standard error', () => {
    const first = monteCarlo(createCircuit(equal), smallTolerances, options);
    expect(monteCarlo(createCircuit(equal), smallTolerances, options)).toEqual(first);
    expect(first.ratesHz).toEqual(first.ratesHz.toSorted());
    const share = first.yieldWithinBand;
    expect(first.yieldStandardError).toBe(Math.sqrt((share * (1 - share)) / samples));
  });

  it('gives the same mean for a steered circuit as solving every kit in full', () => {
    const circuit = createCircuit(steered);
    const few = { ...options, samples: 2000 };
    const quick = monteCarlo(circuit, smallTolerances, few);
    const rate = kitRate(circuit);
    const tolerances = { thresholds: 0, timing: 0, capacitor: 0 };
    expect(monteCarlo(circuit, tolerances, few).meanHz / rate(nominalKit)).toBeCloseTo(1, 12);
    expect(quick.meanHz / rate(nominalKit)).toBeCloseTo(1, 2);
    expect(quick.standardDeviationHz / quick.meanHz).toBeCloseTo(
      rssFraction(rateSensitivities(circuit), smallTolerances) / Math.sqrt(3),
      3,
    );
  });

  it('counts a kit that does not oscillate as outside the band', () => {
    const edge = createCircuit({ ...equal, capacitor: { farads: 1e-7, leakageOhms: 2.01e5 } });
    const found = monteCarlo(edge, smallTolerances, { ...options, samples: 1000, band: 10 });
    const stopped = found.ratesHz.filter((hz) => Number.isNaN(hz)).length;
    expect(stopped).toBeGreaterThan(100);
    expect(found.yieldWithinBand).toBeLessThanOrEqual(1 - stopped / 1000);
    const dead = createCircuit({ ...equal, comparator: { highVolts: 1 } });
    expect(monteCarlo(dead, smallTolerances, { ...options, samples: 10 }).meanHz).toBeNaN();
  });

  it('leaves out parts below zero, which a wide normal tolerance can draw', () => {
    const wide = { thresholds: 0, timing: 0, capacitor: 0.99 };
    const normal = { ...options, distribution: 'normal', samples: 20_000 } as const;
    const found = monteCarlo(createCircuit(equal), wide, normal);
    expect(found.ratesHz.every((hz) => Number.isNaN(hz) || hz > 0)).toBe(true);
  });

  it('refuses a target, band or number of samples that cannot be', () => {
    const circuit = createCircuit(equal);
    for (const wrong of [{ targetHz: 0 }, { band: -1 }, { samples: 0 }, { samples: 1.5 }]) {
      const bad = { ...options, ...wrong };
      expect(() => monteCarlo(circuit, smallTolerances, bad)).toThrow(RangeError);
    }
  });
});

describe('rateSurface', () => {
  const spans = { r1: 0.01, r2: 0.01, r3: 0.01, timing: 0.01, discharge: 0.01, capacitor: 0.2 };

  it('stays within its allowance of the full model', () => {
    for (const draft of [steered, { ...equal, capacitor: { farads: 1e-7, biasHalvingVolts: 6 } }]) {
      const rate = kitRate(createCircuit(draft));
      const surface = rateSurface(rate, spans, 1e-4);
      const kit = {
        r1: 0.993,
        r2: 1.004,
        r3: 1.009,
        timing: 0.99,
        discharge: 1.01,
        capacitor: 0.83,
      };
      expect(surface).not.toBeNull();
      expect((surface?.(kit) ?? NaN) / rate(kit)).toBeCloseTo(1, 5);
    }
  });

  it('gives none where it would miss, or where a kit stops', () => {
    const rate = kitRate(createCircuit(steered));
    expect(rateSurface(rate, { ...spans, r1: 0.5, r2: 0.5, r3: 0.5 }, 1e-6)).toBeNull();
    expect(rateSurface(() => NaN, spans, 1)).toBeNull();
  });
});

describe('kitRate', () => {
  it('is NaN at a temperature where a value would be negative', () => {
    const melted = createCircuit({
      ...equal,
      celsius: 300,
      resistorTemperatureCoefficientPerKelvin: -0.004,
    });
    expect(kitRate(melted)(nominalKit)).toBeNaN();
  });
});
