import { requirePositive } from './check-circuit.ts';

export type ESeries = 'E3' | 'E6' | 'E12' | 'E24' | 'E48' | 'E96' | 'E192';

/** E24 values that history put beside the rounded formula, by index (IEC 60063, table 1). */
const e24Exceptions: Record<number, number> = {
  10: 27,
  11: 30,
  12: 33,
  13: 36,
  14: 39,
  15: 43,
  16: 47,
  22: 82,
};
/** The one E192 value beside the formula: 9.20 where 10^(185/192) rounds to 9.19. */
const e192Exceptions: Record<number, number> = { 185: 920 };

const e24 = generate(24, 10, e24Exceptions);
const e192 = generate(192, 100, e192Exceptions);

const mantissas: Record<ESeries, readonly number[]> = {
  E3: every(8, e24),
  E6: every(4, e24),
  E12: every(2, e24),
  E24: e24,
  E48: every(4, e192),
  E96: every(2, e192),
  E192: e192,
};

function generate(
  count: number,
  scale: number,
  exceptions: Record<number, number>,
): readonly number[] {
  return Array.from(
    { length: count },
    (_, k) => exceptions[k] ?? Math.round(scale * 10 ** (k / count)),
  );
}

function every(step: number, values: readonly number[]): readonly number[] {
  return values.filter((_, index) => index % step === 0);
}

/**
 * One decade of a series as whole numbers, ascending: two figures (10…91) up to E24, three
 * (100…988) from E48 on. Rule and exceptions of IEC 60063:2015.
 */
export function eSeriesMantissas(series: ESeries): readonly number[] {
  return mantissas[series];
}

/**
 * The series' value nearest to `value` (above 0, any unit): by ratio, which treats both directions
 * alike in per cent, or by difference. A tie goes to the lower value. Throws a `RangeError` for a
 * value that is not positive and finite.
 */
export function nearestPreferred(
  value: number,
  series: ESeries,
  by: 'ratio' | 'difference' = 'ratio',
): number {
  requirePositive(value, 'The value');
  const { below, above } = neighbours(value, series);
  const belowIsNearer =
    by === 'ratio' ? value / below <= above / value : value - below <= above - value;
  return belowIsNearer ? below : above;
}

/** The series' smallest value that is not under `value` (above 0), as for a current limit. */
export function preferredAtLeast(value: number, series: ESeries): number {
  requirePositive(value, 'The value');
  const { below, above } = neighbours(value, series);
  return isSame(below, value) ? below : above;
}

/** Whether `value` is one of the series' values in some decade, to nine figures. */
export function isPreferred(value: number, series: ESeries): boolean {
  return value > 0 && value < Infinity && isSame(nearestPreferred(value, series), value);
}

/** All of the series' values from `low` to `high`, both included (to nine figures), ascending. */
export function preferredBetween(low: number, high: number, series: ESeries): number[] {
  requirePositive(low, 'The lower end');
  requirePositive(high, 'The upper end');
  const found: number[] = [];
  const last = Math.floor(Math.log10(high)) + 1;
  for (let decade = Math.floor(Math.log10(low)) - 1; decade <= last; decade++) {
    for (const mantissa of mantissas[series]) {
      const value = inDecade(mantissa, decade, series);
      if (value >= low * (1 - 1e-9) && value <= high * (1 + 1e-9)) found.push(value);
    }
  }
  return found;
}

function neighbours(value: number, series: ESeries): { below: number; above: number } {
  const decade = Math.floor(Math.log10(value));
  let below = 0;
  for (let near = decade - 1; near <= decade + 1; near++) {
    for (const mantissa of mantissas[series]) {
      const candidate = inDecade(mantissa, near, series);
      if (candidate > value && !isSame(candidate, value)) return { below, above: candidate };
      below = candidate;
    }
  }
  return { below, above: below };
}

/** Through a decimal literal, so that 887 × 10³ is the very double that 887000 is. */
function inDecade(mantissa: number, decade: number, series: ESeries): number {
  const figures = series === 'E48' || series === 'E96' || series === 'E192' ? 2 : 1;
  return Number(`${mantissa}e${decade - figures}`);
}

function isSame(one: number, other: number): boolean {
  return Math.abs(one - other) <= 1e-9 * other;
}
