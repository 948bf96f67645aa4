import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { computeBudget } from './error-budget.ts';

const file = new URL('../../server/engine/error-budget.csv', import.meta.url);
const recorded = readFileSync(file, 'utf8').trim().split('\n');
const computed = computeBudget();

/** Below this, two machines may round differently. */
const roundingFloor = 2e-12;

describe('the error budget', () => {
  it('has one line for every effect and reference, in order', () => {
    const [head, ...lines] = recorded;
    expect(head).toBe('effect,reference,mean_abs_rel,worst_abs_rel,limit');
    expect(lines.map((line) => line.split(',').slice(0, 2).join())).toEqual(
      computed.map(({ effect, reference }) => `${effect},${reference}`),
    );
  });

  it.each(computed.map((line, index) => [line.effect, line.reference, line, index] as const))(
    'holds for %s against the %s',
    (_effect, _reference, line, index) => {
      const [mean, worst, limit] = (recorded[index + 1] ?? '').split(',').slice(2).map(Number);
      expect(limit).toBe(line.limit);
      expect(line.worstAbsRel).toBeLessThan(line.limit);
      expect(Math.abs(line.meanAbsRel - (mean ?? NaN))).toBeLessThan(
        0.06 * line.meanAbsRel + roundingFloor,
      );
      expect(Math.abs(line.worstAbsRel - (worst ?? NaN))).toBeLessThan(
        0.06 * line.worstAbsRel + roundingFloor,
      );
    },
  );

  it('prints as a table', () => {
    const table = computed.map(({ effect, reference, meanAbsRel, worstAbsRel, limit }) =>
      [
        effect.padEnd(22),
        reference.padEnd(20),
        meanAbsRel.toExponential(1),
        worstAbsRel.toExponential(1),
        limit.toExponential(0),
      ].join('  '),
    );
    process.stdout.write(`${table.join('\n')}\n`);
    expect(table).toHaveLength(recorded.length - 1);
  });
});
