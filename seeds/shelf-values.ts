import { eSeriesMantissas } from '../server/engine/e-series.ts';

/** Preferred numbers (IEC 60063) and the invented, repeatable quantities of the demonstration shop. */

export const e6 = eSeriesMantissas('E6');
export const e24 = eSeriesMantissas('E24');

/** Three figures: 100 … 976. */
export const e96 = eSeriesMantissas('E96');

/** A number that stays a plain decimal: 887 × 10³ instead of 886999.9999. */
export function scaled(mantissa: number, exponent: number): number {
  return Number(`${mantissa}e${exponent}`);
}

/**
 * An invented count for shelf place `k`: mostly well filled, some low, a few sold out. The same every
 * time, so that demonstrations and tests agree.
 */
export function inventedCount(k: number, usual: number): number {
  const turn = (k * 7919 + 104729) % 97;
  if (turn < 5) return 0;
  if (turn < 14) return 1 + (turn % 7);
  return Math.round(usual * (0.35 + (turn % 53) / 40));
}
