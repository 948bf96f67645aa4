import type { LotFacts } from './catalogue.ts';

/** What a piece of measured lots may be. Fractions are of the mean. */
export interface LotWindow {
  mean: number;
  /** Every piece that leaves the bench is within ± this of the mean. */
  tolerance: number;
  /** Standard deviation of single pieces. */
  deviation: number;
}

/** Pieces further from their lot's mean than this many standard deviations are put aside at the bench. */
const keptDeviations = 4;

/** Two-sided 95 % points of Student's distribution for 1 to 30 degrees of freedom; standard tables. */
const student = [
  12.706, 4.303, 3.182, 2.776, 2.571, 2.447, 2.365, 2.306, 2.262, 2.228, 2.201, 2.179, 2.16, 2.145,
  2.131, 2.12, 2.11, 2.101, 2.093, 2.086, 2.08, 2.074, 2.069, 2.064, 2.06, 2.056, 2.052, 2.048,
  2.045, 2.042,
] as const;

/** How far the true mean of a lot may be from the mean of `count` readings, in standard deviations. */
export function meanUncertainty(count: number): number {
  return count < 2 ? Number.POSITIVE_INFINITY : (student[count - 2] ?? 1.96) / Math.sqrt(count);
}

/**
 * The window in which the pieces of all lots with unreserved stock lie: for each lot its mean ± four
 * standard deviations, the uncertainty of the mean and the meter's, never wider than the printed
 * tolerance; the lots' windows taken together. Null when a lot was not measured, was measured on
 * fewer than two pieces, or when there is none. `meterUncertainty` is a fraction of the reading.
 */
export function lotWindow(
  printed: { farads: number; tolerance: number },
  lots: readonly LotFacts[],
  meterUncertainty: number,
): LotWindow | null {
  let [low, high, pieces, sum, squares] = [Number.POSITIVE_INFINITY, 0, 0, 0, 0];
  for (const lot of lots) {
    const { measuredMean: mean, measuredDeviation: deviation, measuredCount: count } = lot;
    if (mean === null || deviation === null || count === null || count < 2) return null;
    const doubt = meanUncertainty(count) * deviation + meterUncertainty * mean;
    const reach = keptDeviations * deviation + doubt;
    low = Math.min(low, Math.max(mean - reach, printed.farads * (1 - printed.tolerance)));
    high = Math.max(high, Math.min(mean + reach, printed.farads * (1 + printed.tolerance)));
    pieces += lot.available;
    sum += lot.available * mean;
    squares += lot.available * (mean ** 2 + deviation ** 2 + (doubt / 2) ** 2);
  }
  if (pieces === 0 || low > high) return null;
  const mean = Math.min(high, Math.max(low, sum / pieces));
  const variance = Math.max(0, squares / pieces - (sum / pieces) ** 2);
  return {
    mean,
    tolerance: Math.max(high / mean - 1, 1 - low / mean),
    deviation: Math.sqrt(variance) / mean,
  };
}
