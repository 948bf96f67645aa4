import { periodAt, type PreparedSingle } from '../prepared-single.ts';
import { limits } from './rules.ts';

const iterationsAtMost = 80;

/**
 * Timing resistance in ohms at which the prepared circuit has `periodSeconds`, between the limits of
 * timing resistance. Clamped to a limit when the period lies outside. A resistance too high to
 * oscillate (bias or leakage) counts as an endless period. Assumes that the period rises with the
 * resistance; that held in 3000 random circuits with delay and is not proven.
 * Bracketing by false position in ln R with the Illinois correction; relative accuracy about 1e-13.
 */
export function timingRoot(prepared: PreparedSingle, periodSeconds: number): number {
  const excess = (logOhms: number) => {
    const period = periodAt(prepared, Math.exp(logOhms));
    return Number.isNaN(period) ? Number.POSITIVE_INFINITY : Math.log(period / periodSeconds);
  };
  let low = Math.log(limits.minTimingOhms);
  let high = Math.log(limits.maxTimingOhms);
  let lowExcess = excess(low);
  let highExcess = excess(high);
  if (lowExcess >= 0) return limits.minTimingOhms;
  if (highExcess <= 0) return limits.maxTimingOhms;
  let side = 0;
  for (let k = 0; k < iterationsAtMost && high - low > 1e-13; k += 1) {
    const slope = highExcess - lowExcess;
    let middle = Number.isFinite(slope)
      ? high - (highExcess * (high - low)) / slope
      : (low + high) / 2;
    if (!(middle > low && middle < high)) middle = (low + high) / 2;
    const value = excess(middle);
    if (value === 0) return Math.exp(middle);
    if (value > 0) {
      high = middle;
      highExcess = value;
      if (side === 1) lowExcess /= 2;
      side = 1;
    } else {
      low = middle;
      lowExcess = value;
      if (side === -1) highExcess /= 2;
      side = -1;
    }
    if (Math.abs(value) < 1e-14) return Math.exp(middle);
  }
  return Math.exp((low + high) / 2);
}
