import { periodWith, type PreparedSingle } from '../prepared-single.ts';
import { framePeriod, insulationSiemens, type Frame } from './aim.ts';
import type { Effect, UniformEffect } from './density.ts';
import { atCorner, extremeCelsius, logDrift, supplyEnds } from './head-corners.ts';
import { keptWith } from './kept-with.ts';
import { cornerReducer, type Head, type HeadCorner } from './heads.ts';
import { limits } from './rules.ts';
import type { SearchBrief, StockedCapacitor, StockedResistor } from './shelf.ts';
import type { SingleTimingParts } from './timing-choice.ts';

export type Cause = 'thresholds' | 'timing' | 'capacitor' | 'stray' | 'comparator' | 'load';

/** One cause of a kit's deviation in ln of its rate. */
export interface KitEffect {
  cause: Cause;
  effect: Effect;
  /** True for the comparator's delays, which change what the other causes weigh. */
  isDelay?: boolean;
}

/** A head reduced at both ends and in the middle of one figure's range. */
interface HeadEnds {
  cause: Cause;
  low: PreparedSingle;
  /** Null where the nominal circuit lies in the middle. */
  middle: PreparedSingle | null;
  high: PreparedSingle;
  isDelay?: boolean;
}

const headEnds = keptWith((head: Head, brief: SearchBrief): readonly HeadEnds[] => {
  const { thresholds, buffered } = head;
  const { maxOffsetVolts, maxInputBiasAmps } = head.comparator;
  const reduce = cornerReducer(head, brief);
  const resistor = (name: 'r1Ohms' | 'r2Ohms' | 'r3Ohms', part: StockedResistor): HeadEnds => ({
    cause: 'thresholds',
    low: reduce({ [name]: part.ohms * (1 - part.tolerance) }),
    middle: null,
    high: reduce({ [name]: part.ohms * (1 + part.tolerance) }),
  });
  const along = (cause: Cause, at: (u: number) => HeadCorner): HeadEnds => ({
    cause,
    low: reduce(at(-1)),
    middle: reduce(at(0)),
    high: reduce(at(1)),
  });
  const ends = [
    resistor('r1Ohms', thresholds.r1),
    resistor('r2Ohms', thresholds.r2),
    resistor('r3Ohms', thresholds.r3),
    along('comparator', (u) => ({ offsetVolts: u * maxOffsetVolts })),
    along('comparator', (u) => ({ biasAmps: u * maxInputBiasAmps })),
    along('comparator', (u) => ({ outputFactor: 1.25 + 0.75 * u })),
    { ...along('comparator', (u) => delaysAt(head, u)), isDelay: true },
  ];
  if (brief.load !== null && !buffered) {
    const { minForwardVolts: least, maxForwardVolts: most } = brief.load;
    ends.push(
      along('load', (u) => ({ forwardVolts: (least + most) / 2 + (u * (most - least)) / 2 })),
    );
  }
  return ends;
});

/** Both delays between half the typical one (u = −1) and the maximum (u = 1). */
export function delaysAt(
  { comparator: part }: Head,
  u: number,
): { delayLowHighSeconds: number; delayHighLowSeconds: number } {
  const share = (u + 1) / 2;
  const at = (typical: number) => (1 - share) * (typical / 2) + share * part.maxDelaySeconds;
  return {
    delayLowHighSeconds: at(part.delayLowHighSeconds),
    delayHighLowSeconds: at(part.delayHighLowSeconds),
  };
}

/** The delays' range in thirds, by their middles: u from −1 (least) to 1 (most). */
export const delayThirds = [-2 / 3, 0, 2 / 3] as const;

/** A head with the delays in the middle of each third of their range. */
export const delayedHeads = keptWith((head: Head, brief: SearchBrief): readonly Head[] => {
  const reduce = cornerReducer(head, brief);
  return delayThirds.map((u): Head => {
    const delays = delaysAt(head, u);
    return { ...head, comparator: { ...head.comparator, ...delays }, prepared: reduce(delays) };
  });
});

/** A circuit that does not oscillate at an end counts as this much slow. */
export const stopped = -50;

/**
 * What makes the kits of a frame differ, apart from the timing resistance: each independent, in ln of
 * the rate. R1–R3, the capacitor, offset, bias, output resistance, delay, LED voltage and stray
 * capacitance are taken as uniform between the ends that the guaranteed band stands on; a capacitor
 * with lot statistics as normal within its window. `ohms` is the timing resistance the pack is at.
 */
export function frameEffects(frame: Frame, ohms: number, brief: SearchBrief): KitEffect[] {
  const { head, capacitor } = frame;
  const leakage = insulationSiemens(capacitor);
  const nominal = Math.log(framePeriod(frame, ohms));
  const logWith = (prepared: PreparedSingle, farads: number) => {
    const period = periodWith(prepared, ohms, farads, leakage, capacitor.leakageAmps);
    return period > 0 ? nominal - Math.log(period) : stopped;
  };
  const ends = headEnds(head, brief).map(({ cause, low, middle, high, isDelay }): KitEffect => ({
    cause,
    isDelay: isDelay === true,
    effect: {
      kind: 'uniform',
      low: logWith(low, capacitor.farads),
      middle: middle === null ? 0 : logWith(middle, capacitor.farads),
      high: logWith(high, capacitor.farads),
    },
  }));
  const capacity = (factor: number) => logWith(head.prepared, capacitor.farads * factor);
  const stray = logWith(head.prepared, capacitor.farads + limits.strayFarads);
  return [
    ...ends,
    { cause: 'capacitor', effect: capacitorEffect(capacitor, brief, capacity) },
    ...(capacitor.temperatureSpread > 0
      ? [
          {
            cause: 'capacitor' as const,
            effect: uniform(capacity, capacitor.temperatureSpread),
          },
        ]
      : []),
    { cause: 'stray', effect: { kind: 'uniform', low: 0, middle: stray / 2, high: stray } },
  ];
}

function uniform(logAt: (factor: number) => number, tolerance: number): UniformEffect {
  return { kind: 'uniform', low: logAt(1 - tolerance), middle: 0, high: logAt(1 + tolerance) };
}

const normalPoints = 33;

/** Measured: the meter's uncertainty. With lot statistics: normal in the lots' window. Else uniform. */
function capacitorEffect(
  capacitor: StockedCapacitor,
  brief: SearchBrief,
  logAt: (factor: number) => number,
): Effect {
  const { tolerance, deviation } = capacitor;
  if (brief.care === 'bench-tuned') return uniform(logAt, brief.meterUncertainty);
  if (deviation === null || deviation <= 0) return uniform(logAt, tolerance);
  // Beyond four standard deviations there is nothing to count.
  const reach = Math.min(1, (4 * deviation) / tolerance);
  const points = Array.from(
    { length: normalPoints },
    (_, k) => reach * ((2 * k + 1) / normalPoints - 1),
  );
  const weights = points.map((u) => Math.exp(-(((u * tolerance) / deviation) ** 2) / 2));
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  return {
    kind: 'points',
    values: points.map((u) => logAt(1 + u * tolerance)),
    weights: weights.map((weight) => weight / total),
  };
}

/** d ln f / d ln R4 of a frame at a timing resistance; −1 in the ideal circuit. */
export function timingSensitivity(frame: Frame, ohms: number): number {
  const step = 1e-3;
  const ratio = framePeriod(frame, ohms * (1 + step)) / framePeriod(frame, ohms * (1 - step));
  return -Math.log(ratio) / (Math.log1p(step) - Math.log1p(-step));
}

/** The share of each timing part in the whole resistance's relative change; they add up to 1. */
export function timingShares({ ohms, first, second, join }: SingleTimingParts): [number, number] {
  if (second === null) return [1, 0];
  return join === 'parallel'
    ? [ohms / first.ohms, ohms / second.ohms]
    : [first.ohms / ohms, second.ohms / ohms];
}

/** A condition of use, and how far it moves ln of a frame's rate with a timing part that does not drift. */
export interface ConditionShift {
  volts: number;
  celsius: number;
  shift: number;
}

interface Condition {
  volts: number;
  celsius: number;
  prepared: PreparedSingle;
}

/**
 * Shifts at both ends of the supply and the extreme temperatures against the nominal circuit; −∞
 * where the circuit stops.
 */
export function conditionShifts(frame: Frame, ohms: number, brief: SearchBrief): ConditionShift[] {
  const { head, capacitor } = frame;
  const nominal = Math.log(framePeriod(frame, ohms));
  const leakage = insulationSiemens(capacitor);
  return headConditions(head, brief).map(({ volts, celsius, prepared }) => {
    const farads = atCorner(capacitor.farads, capacitor, 0, celsius);
    const period = periodWith(prepared, ohms, farads, leakage, capacitor.leakageAmps);
    return {
      volts,
      celsius,
      shift: period > 0 ? nominal - Math.log(period) : Number.NEGATIVE_INFINITY,
    };
  });
}

const headConditions = keptWith((head: Head, brief: SearchBrief): readonly Condition[] => {
  const reduce = cornerReducer(head, brief);
  return conditionsOf(brief).map(({ volts, celsius }) => ({
    volts,
    celsius,
    prepared: reduce({ supplyVolts: volts, ...warmThresholds(head, celsius) }),
  }));
});

/** Every pair of an extreme temperature and an end of the supply. */
export function conditionsOf(brief: SearchBrief): { volts: number; celsius: number }[] {
  return extremeCelsius(brief).flatMap((celsius) =>
    supplyEnds(brief).map((volts) => ({ volts, celsius })),
  );
}

/** R1–R3 in ohms at the middle of their tolerance and a temperature. */
export function warmThresholds({ thresholds }: Head, celsius: number): HeadCorner {
  const warm = (part: StockedResistor) => atCorner(part.ohms, part, 0, celsius);
  const { r1, r2, r3 } = thresholds;
  return { r1Ohms: warm(r1), r2Ohms: warm(r2), r3Ohms: warm(r3) };
}

/** Drift of the timing parts together, as a coefficient per kelvin. */
export function timingCoefficient(timing: SingleTimingParts): number {
  const [a, b] = timingShares(timing);
  return (
    a * timing.first.temperatureCoefficientPerKelvin +
    b * (timing.second?.temperatureCoefficientPerKelvin ?? 0)
  );
}

/** Most that conditions move ln of the rate upwards and downwards, the timing parts' drift included. */
export function shiftRange(
  shifts: readonly ConditionShift[],
  coefficientPerKelvin: number,
  sensitivity: number,
): { up: number; down: number } {
  let up = Number.NEGATIVE_INFINITY;
  let down = Number.POSITIVE_INFINITY;
  for (const { celsius, shift } of shifts) {
    const moved = shift + sensitivity * logDrift(coefficientPerKelvin, celsius);
    up = Math.max(up, moved);
    down = Math.min(down, moved);
  }
  return { up, down };
}

/** All that moves the kits of a frame at a timing resistance, each by its own part. */
export interface FrameMoves {
  effects: readonly KitEffect[];
  /** d ln f / d ln R4. */
  sensitivity: number;
  shifts: readonly ConditionShift[];
}

/** Works out a frame's effects, sensitivity and condition shifts at a timing resistance in ohms. */
export function frameMoves(frame: Frame, ohms: number, brief: SearchBrief): FrameMoves {
  return {
    effects: frameEffects(frame, ohms, brief),
    sensitivity: timingSensitivity(frame, ohms),
    shifts: conditionShifts(frame, ohms, brief),
  };
}
