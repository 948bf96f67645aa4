import { analyseCycle, type Cycle } from '../../server/engine/cycle.ts';
import { rateSensitivities } from '../../server/engine/sensitivity.ts';
import { rssFraction, worstCase } from '../../server/engine/spread.ts';
import { createCircuit } from '../../server/engine/circuit.ts';
import { circuitOf, referenceRows, type Row } from './reference-rows.ts';

/** The quantities of a cycle by the name that the reference columns end in. */
export const cycleQuantities: Record<string, (cycle: Cycle) => number> = {
  period_s: (cycle) => cycle.periodSeconds,
  freq_hz: (cycle) => cycle.frequencyHz,
  thigh_s: (cycle) => cycle.highSeconds,
  tlow_s: (cycle) => cycle.lowSeconds,
  duty: (cycle) => cycle.duty,
  vth_v: (cycle) => cycle.thresholdHighVolts,
  vtl_v: (cycle) => cycle.thresholdLowVolts,
  vpeak_v: (cycle) => cycle.peakVolts,
  vvalley_v: (cycle) => cycle.valleyVolts,
  first_high_s: (cycle) => cycle.firstHighSeconds,
  first_cycle_s: (cycle) => cycle.firstCycleSeconds,
};

export interface BudgetLine {
  effect: string;
  reference: string;
  meanAbsRel: number;
  worstAbsRel: number;
  limit: number;
}

/** The cycle that a row of the reference cases should give. */
export function referenceCycle(row: Row): Cycle {
  const cycle = analyseCycle(circuitOf(row));
  if (cycle.kind !== 'oscillates') throw new Error(cycle.reason);
  return cycle;
}

/** Mean and worst deviation of every effect from every outside reference, computed anew. */
export function computeBudget(): BudgetLine[] {
  const rows = referenceRows('cases_public.csv');
  const kinds = [...new Set(rows.map((row) => row('kind')))];
  const cycles = kinds.flatMap((kind) => {
    const own = rows.filter((row) => row('kind') === kind);
    const effect = kind.replaceAll('_', ' ');
    return [
      line(
        effect,
        'reference solution',
        1e-8,
        own.flatMap((row) => deviations(row, 'pred_')),
      ),
      line(
        effect,
        'circuit simulation',
        1e-4,
        own.flatMap((row) => deviations(row, 'ng_')),
      ),
    ];
  });
  return [...cycles, ...toleranceLines()];
}

function deviations(row: Row, prefix: string): number[] {
  const cycle = referenceCycle(row);
  return Object.entries(cycleQuantities).map(
    ([column, of]) => of(cycle) / Number(row(`${prefix}${column}`)) - 1,
  );
}

function toleranceLines(): BudgetLine[] {
  const rows = referenceRows('tolerance_public.csv');
  const found = rows.map((row) => {
    const number = (column: string) => Number(row(column));
    const circuit = createCircuit({
      supplyVolts: number('vcc_v'),
      r1Ohms: number('r1_ohm'),
      r2Ohms: number('r2_ohm'),
      r3Ohms: number('r3_ohm'),
      timing: { kind: 'single', ohms: number('r4_ohm') },
      capacitor: { farads: number('c_f') },
    });
    const tolerances = {
      thresholds: number('tol_r1r2r3_rel'),
      timing: number('tol_r4_rel'),
      capacitor: number('tol_c_rel'),
    };
    const { minHz, maxHz } = worstCase(circuit, tolerances);
    const rss = rssFraction(rateSensitivities(circuit), tolerances);
    return {
      corners: [minHz / number('f_min_corner_hz') - 1, maxHz / number('f_max_corner_hz') - 1],
      rss: rss / number('rss_rel') - 1,
    };
  });
  return [
    line(
      'tolerance corners',
      'reference solution',
      1e-10,
      found.flatMap((each) => each.corners),
    ),
    line(
      'root sum of squares',
      'reference solution',
      1e-9,
      found.map((each) => each.rss),
    ),
  ];
}

function line(effect: string, reference: string, limit: number, errors: number[]): BudgetLine {
  const sizes = errors.map(Math.abs);
  const meanAbsRel = sizes.reduce((sum, size) => sum + size, 0) / sizes.length;
  return { effect, reference, meanAbsRel, worstAbsRel: Math.max(...sizes), limit };
}
