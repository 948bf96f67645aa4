import { afterAll, describe, expect, it } from 'vitest';
import type { Circuit } from '../../server/engine/circuit.ts';
import { analyseCycle, type Cycle } from '../../server/engine/cycle.ts';
import { createRandom } from '../../server/engine/random.ts';
import { referenceCycle } from './error-budget.ts';
import { integrateCycle, type IntegratedCycle } from './independent-integrator.ts';
import { randomCircuit, type RandomCircuit } from './random-circuits.ts';
import { circuitOf, referenceRows } from './reference-rows.ts';

/** Every integrated quantity beside its reference column and the engine's own. */
const quantities: [string, (cycle: IntegratedCycle) => number, (cycle: Cycle) => number][] = [
  ['period_s', (cycle) => cycle.periodSeconds, (cycle) => cycle.periodSeconds],
  ['thigh_s', (cycle) => cycle.highSeconds, (cycle) => cycle.highSeconds],
  ['tlow_s', (cycle) => cycle.lowSeconds, (cycle) => cycle.lowSeconds],
  ['first_high_s', (cycle) => cycle.firstHighSeconds, (cycle) => cycle.firstHighSeconds],
  ['vpeak_v', (cycle) => cycle.peakVolts, (cycle) => cycle.peakVolts],
  ['vvalley_v', (cycle) => cycle.valleyVolts, (cycle) => cycle.valleyVolts],
  ['vth_v', (cycle) => cycle.tripHighVolts, (cycle) => cycle.thresholdHighVolts],
  ['vtl_v', (cycle) => cycle.tripLowVolts, (cycle) => cycle.thresholdLowVolts],
];

/** Deviations by what was compared and by effect. */
const found = new Map<string, number[]>();

function note(compared: string, effect: string, deviation: number): void {
  const key = `${compared.padEnd(26)}  ${effect.padEnd(22)}`;
  found.set(key, [...(found.get(key) ?? []), deviation]);
}

function integrated(circuit: Circuit, tolerance?: number): IntegratedCycle {
  const cycle = integrateCycle(circuit, { tolerance });
  if (cycle === null) throw new Error('The integrated circuit does not oscillate.');
  return cycle;
}

/** Worst deviation of the engine: of times from themselves, of voltages from the supply. */
function worstDeviation(circuit: Circuit, engine: Cycle, own: IntegratedCycle): number {
  const deviations = quantities.map(([column, integratedOf, engineOf]) => {
    const scale = column.endsWith('_s') ? integratedOf(own) : circuit.supplyVolts;
    return Math.abs(engineOf(engine) - integratedOf(own)) / scale;
  });
  return Math.max(...deviations);
}

afterAll(() => {
  const sorted = [...found].sort(([a], [b]) => a.localeCompare(b));
  const lines = sorted.map(([key, all]) => {
    const mean = all.reduce((sum, each) => sum + each, 0) / all.length;
    const worst = Math.max(...all);
    const count = String(all.length).padStart(5);
    return `${key}  ${count}  ${mean.toExponential(1)}  ${worst.toExponential(1)}`;
  });
  const head = `${'compared'.padEnd(26)}  ${'effect'.padEnd(22)}  count  mean     worst`;
  console.log([head, ...lines].join('\n'));
});

describe('integrateCycle', () => {
  describe.each(referenceRows('cases_public.csv').map((row) => [row('case_id'), row('kind'), row]))(
    'when given case %s (%s)',
    (_id, kind, row) => {
      const circuit = circuitOf(row);
      const effect = kind.replaceAll('_', ' ');
      it('agrees with the reference solution to 1e-9, and to 3e-7 when hurried', () => {
        for (const [tolerance, name, limit] of [
          [1e-10, 'integral to reference', 1e-9],
          [1e-7, 'hurried to reference', 3e-7],
        ] as const) {
          const own = integrated(circuit, tolerance);
          for (const [column, integratedOf] of quantities) {
            const deviation = Math.abs(integratedOf(own) / Number(row(`pred_${column}`)) - 1);
            note(name, effect, deviation);
            expect(deviation, column).toBeLessThan(limit);
          }
        }
      });
      it('agrees with the engine to 1e-9', () => {
        const deviation = worstDeviation(circuit, referenceCycle(row), integrated(circuit));
        note('engine to integral', effect, deviation);
        expect(deviation).toBeLessThan(1e-9);
      });
    },
  );

  it.each(referenceRows('cases_nonosc_public.csv').map((row) => [row('kind'), row]))(
    'oscillates or not as the simulated circuit does at the edge: %s',
    (_kind, row) => {
      const own = integrateCycle(circuitOf(row));
      expect(own !== null).toBe(Number(row('ng_output_edges')) > 1);
      const period = /T=(.*) s/.exec(row('pred_detail'))?.[1];
      if (own !== null) expect(own.periodSeconds / Number(period)).toBeCloseTo(1, 5);
    },
  );
});

interface Outcome extends RandomCircuit {
  engine: ReturnType<typeof analyseCycle>;
  own: IntegratedCycle | null;
}

/**
 * The engine takes the reversed steering diode's current as I_s. From this reverse voltage on, in
 * units of n·V_t, the diode's exponential law differs from that by less than a millionth.
 */
const offReverseBias = 14;

function reverseBias(outcome: Outcome): number {
  return outcome.own?.leastReverseBias ?? Infinity;
}

/** Circuits drawn until 300 of them oscillate with the reversed diode well off, if any. */
function drawOutcomes(): Outcome[] {
  const random = createRandom(90);
  const outcomes: Outcome[] = [];
  for (let wanted = 300; wanted > 0;) {
    const drawn = randomCircuit(random);
    const own = integrateCycle(drawn.circuit);
    const outcome = { ...drawn, own, engine: analyseCycle(drawn.circuit) };
    outcomes.push(outcome);
    if (own !== null && reverseBias(outcome) >= offReverseBias) wanted -= 1;
  }
  return outcomes;
}

describe('analyseCycle', () => {
  describe('when random circuits with every effect are integrated beside it', () => {
    const outcomes = drawOutcomes();

    it('agrees to 1e-6 in all 300 that oscillate with the reversed diode off', () => {
      let compared = 0;
      for (const outcome of outcomes) {
        const { circuit, effects, engine, own } = outcome;
        if (own === null || reverseBias(outcome) < offReverseBias) continue;
        if (engine.kind !== 'oscillates') throw new Error(engine.reason);
        const deviation = worstDeviation(circuit, engine, own);
        for (const effect of effects) note('engine to integral, random', effect, deviation);
        expect(deviation, effects.join(', ')).toBeLessThan(1e-6);
        compared += 1;
      }
      expect(compared).toBe(300);
    });

    it('is off by no more than the reversed diode explains where that is barely off', () => {
      let compared = 0;
      for (const outcome of outcomes) {
        const { circuit, effects, engine, own } = outcome;
        const bias = reverseBias(outcome);
        if (own === null || engine.kind !== 'oscillates' || bias >= offReverseBias) continue;
        if (bias < 0) continue;
        const deviation = worstDeviation(circuit, engine, own);
        expect(deviation, effects.join(', ')).toBeLessThan(1e-6 + 2 * Math.exp(-bias));
        compared += 1;
      }
      expect(compared).toBeGreaterThan(10);
    });

    it('says of every circuit with a single timing resistor whether it oscillates', () => {
      const single = outcomes.filter(({ circuit }) => circuit.timing.kind === 'single');
      expect(single.filter(({ own }) => own === null).length).toBeGreaterThan(50);
      for (const { engine, own, effects } of single) {
        expect(engine.kind === 'oscillates', effects.join(', ')).toBe(own !== null);
      }
    });

    it('refuses a steered circuit that oscillates only where its diode does not conduct', () => {
      for (const outcome of outcomes) {
        if (outcome.own === null || outcome.engine.kind === 'oscillates') continue;
        expect(reverseBias(outcome), outcome.effects.join(', ')).toBeLessThan(0.5);
      }
    });
  });
});
