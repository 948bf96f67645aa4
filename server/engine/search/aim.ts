import { periodWith } from '../prepared-single.ts';
import { limits } from './rules.ts';
import type { Head } from './heads.ts';
import type { SearchBrief, StockedCapacitor } from './shelf.ts';

/** A head with a timing capacitor: everything of a pack but its timing resistance. */
export interface Frame {
  head: Head;
  capacitor: StockedCapacitor;
}

/** The capacitor's insulation as a conductance in siemens. */
export function insulationSiemens({ insulationSeconds, farads }: StockedCapacitor): number {
  return insulationSeconds === null ? 0 : farads / insulationSeconds;
}

/** The capacitor as the circuit has it: its middle value, or `farads`, with its leakage. */
export function circuitCapacitor(part: StockedCapacitor, farads: number = part.farads) {
  const siemens = insulationSiemens(part);
  return {
    farads,
    leakageOhms: siemens > 0 ? 1 / siemens : null,
    leakageAmps: part.leakageAmps,
  };
}

/** Nominal period in seconds of a frame with a timing resistance; NaN when it does not oscillate. */
export function framePeriod({ head, capacitor }: Frame, timingOhms: number): number {
  return periodWith(
    head.prepared,
    timingOhms,
    capacitor.farads,
    insulationSiemens(capacitor),
    capacitor.leakageAmps,
  );
}

const secantSteps = 12;

/**
 * Timing resistance in ohms at which a frame has the asked rate, between the limits of timing
 * resistance, and whether that reaches it. By secants in ln R from the ideal circuit's value, which
 * three or four steps take to 1e-12; where they fail, by bracketing (`bracketedRoot`).
 */
export function aimFrame(frame: Frame, brief: SearchBrief): { ohms: number; reaches: boolean } {
  const wanted = 1 / brief.targetHz;
  const miss = (logOhms: number) => Math.log(framePeriod(frame, Math.exp(logOhms)) / wanted);
  const [lowest, highest] = [Math.log(limits.minTimingOhms), Math.log(limits.maxTimingOhms)];
  let x0 = clamp(Math.log(guessOhms(frame, wanted)), lowest, highest);
  let y0 = miss(x0);
  let x1 = clamp(x0 - y0, lowest, highest);
  for (let step = 0; step < secantSteps; step += 1) {
    const y1 = miss(x1);
    if (Math.abs(y1) < 1e-13 || (Math.abs(y1) < 1e-10 && Math.abs(x1 - x0) < 1e-9)) {
      return { ohms: Math.exp(x1), reaches: true };
    }
    const slope = (y1 - y0) / (x1 - x0);
    if (!(slope > 0.3 && slope < 3)) break;
    [x0, y0] = [x1, y1];
    x1 = clamp(x1 - y1 / slope, lowest, highest);
    if (x1 === x0) break;
  }
  return bracketedRoot(miss, lowest, highest);
}

/** Timing resistance of the ideal circuit, T/(C·L); a start for `aimFrame`. */
function guessOhms({ head, capacitor }: Frame, periodSeconds: number): number {
  const { r1, r2, r3 } = head.thresholds;
  const log = Math.log1p(r1.ohms / r3.ohms) + Math.log1p(r2.ohms / r3.ohms);
  return periodSeconds / (capacitor.farads * log);
}

const iterationsAtMost = 80;

/**
 * Root of a rising function between two ends, by false position with the Illinois correction; the
 * nearer end where there is none. NaN counts as too high: a resistance too high to oscillate, by bias
 * or leakage, has an endless period. That the period rises with the resistance held in 3000 random
 * circuits with delay and is not proven.
 */
function bracketedRoot(
  miss: (logOhms: number) => number,
  lowest: number,
  highest: number,
): { ohms: number; reaches: boolean } {
  const excess = (logOhms: number) => {
    const value = miss(logOhms);
    return Number.isNaN(value) ? Number.POSITIVE_INFINITY : value;
  };
  let [low, high] = [lowest, highest];
  let lowExcess = excess(low);
  let highExcess = excess(high);
  if (lowExcess > 0) return { ohms: Math.exp(low), reaches: false };
  if (highExcess < 0) return { ohms: Math.exp(high), reaches: false };
  let side = 0;
  for (let k = 0; k < iterationsAtMost && high - low > 1e-13; k += 1) {
    const slope = highExcess - lowExcess;
    let middle = Number.isFinite(slope)
      ? high - (highExcess * (high - low)) / slope
      : (low + high) / 2;
    if (!(middle > low && middle < high)) middle = (low + high) / 2;
    const value = excess(middle);
    if (Math.abs(value) < 1e-14) return { ohms: Math.exp(middle), reaches: true };
    if (value > 0) {
      [high, highExcess] = [middle, value];
      if (side === 1) lowExcess /= 2;
      side = 1;
    } else {
      [low, lowExcess] = [middle, value];
      if (side === -1) highExcess /= 2;
      side = -1;
    }
  }
  const ohms = Math.exp((low + high) / 2);
  return { ohms, reaches: Math.abs(excess(Math.log(ohms))) < 1e-6 };
}

function clamp(value: number, low: number, high: number): number {
  return Math.min(high, Math.max(low, value));
}
