import { describe, expect, it } from 'vitest';
import { analyseCycle } from '../../server/engine/cycle.ts';
import { cycleQuantities, referenceCycle } from './error-budget.ts';
import { circuitOf, referenceRows } from './reference-rows.ts';

describe('analyseCycle', () => {
  describe.each(referenceRows('cases_public.csv').map((row) => [row('case_id'), row('kind'), row]))(
    'when given case %s (%s)',
    (_id, _kind, row) => {
      const cycle = referenceCycle(row);
      it('agrees with the reference solution to 1e-8 in every quantity', () => {
        for (const [column, of] of Object.entries(cycleQuantities)) {
          const expected = Number(row(`pred_${column}`));
          expect(Math.abs(of(cycle) / expected - 1), column).toBeLessThan(1e-8);
        }
      });
      it('agrees with circuit simulation (ngspice 39) to 1e-4 in every quantity', () => {
        for (const [column, of] of Object.entries(cycleQuantities)) {
          const simulated = Number(row(`ng_${column}`));
          expect(Math.abs(of(cycle) / simulated - 1), column).toBeLessThan(1e-4);
        }
      });
      it('agrees with the integrated differential equation to 1e-9 in the period', () => {
        expect(cycle.periodSeconds / Number(row('ode_period_s')) - 1).toBeCloseTo(0, 9);
      });
    },
  );

  describe.each(referenceRows('cases_nonosc_public.csv').map((row) => [row('kind'), row]))(
    'when a circuit is at the edge: %s',
    (kind, row) => {
      const outcome = analyseCycle(circuitOf(row));
      it('oscillates or refuses as the simulated circuit does', () => {
        expect(outcome.kind).toBe(row('pred') === 'refused' ? 'no-oscillation' : 'oscillates');
        const simulatedEdges = Number(row('ng_output_edges'));
        expect(simulatedEdges > 1).toBe(outcome.kind === 'oscillates');
      });
      it('names the side on which it sticks, or the period at which it runs', () => {
        if (outcome.kind === 'oscillates') {
          const period = Number(/T=(.*) s/.exec(row('pred_detail'))?.[1]);
          expect(outcome.periodSeconds / period).toBeCloseTo(1, 5);
        } else {
          expect(outcome.code).toBe(kind.split(':')[0]?.replace('_', '-'));
          expect(outcome.reason).toMatch(/^The .*\. (Lower|Raise) .*\.$/);
        }
      });
    },
  );
});
