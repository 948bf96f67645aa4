import { periodWith, type PreparedSingle } from '../prepared-single.ts';
import { insulationSiemens } from './aim.ts';
import { keptWith } from './kept-with.ts';
import { cornerReducer, type Head, type HeadCorner } from './heads.ts';
import { limits } from './rules.ts';
import type { SearchBrief, StockedCapacitor } from './shelf.ts';

export type Corner = 'slow' | 'fast';

const referenceCelsius = 25;

/** A resistor's factor at a temperature, by its signed coefficient; 1 at 25 °C. */
export function drift(coefficientPerKelvin: number, celsius: number): number {
  return 1 + coefficientPerKelvin * (celsius - referenceCelsius);
}

/** ln of `drift` by its series, which is within 1e-9 of it up to 1000 ppm/K over 100 K and quicker. */
export function logDrift(coefficientPerKelvin: number, celsius: number): number {
  const x = coefficientPerKelvin * (celsius - referenceCelsius);
  return x * (1 - x * (1 / 2 - x * (1 / 3 - x * (1 / 4 - x * (1 / 5 - x * (1 / 6 - x / 7))))));
}

/**
 * The temperatures at which the rate can be extreme: both ends of the ambient range, and 25 °C when
 * it lies between, where drifts that cancel have their turning point.
 */
export function extremeCelsius({ minCelsius, maxCelsius }: SearchBrief): number[] {
  const middle = Math.min(maxCelsius, Math.max(minCelsius, referenceCelsius));
  return [...new Set([minCelsius, middle, maxCelsius])];
}

/** The ends of the supply, once where it has but one. */
export function supplyEnds({ minSupplyVolts, maxSupplyVolts }: SearchBrief): number[] {
  return [...new Set([minSupplyVolts, maxSupplyVolts])];
}

/** What moves a part's value. */
export interface Spreading {
  tolerance: number;
  temperatureCoefficientPerKelvin: number;
}

/**
 * Value of a stocked part at a corner: its tolerance holds at 25 °C, and it drifts from there. With
 * `sign` 0 the middle of its tolerance.
 */
export function atCorner(
  value: number,
  { tolerance, temperatureCoefficientPerKelvin }: Spreading,
  sign: number,
  celsius: number,
): number {
  return value * (1 + sign * tolerance) * drift(temperatureCoefficientPerKelvin, celsius);
}

/**
 * Capacitance in farads at a corner and a temperature: tolerance, drift, what the dielectric may
 * change beyond it, and at the slow corner up to 5 pF of stray capacitance.
 */
export function capacitanceAt(part: StockedCapacitor, corner: Corner, celsius: number): number {
  const sign = corner === 'slow' ? 1 : -1;
  const own = atCorner(part.farads, part, sign, celsius) * (1 + sign * part.temperatureSpread);
  return corner === 'slow' ? own + limits.strayFarads : own;
}

/**
 * All corners of a head that do not depend on timing resistor and capacitor, reduced once: by corner,
 * then by temperature as in `extremeCelsius`.
 */
export interface HeadCorners {
  celsius: readonly number[];
  slow: readonly (readonly PreparedSingle[])[];
  fast: readonly (readonly PreparedSingle[])[];
}

/**
 * The corners of a head: supply from empty to fresh, output resistance from half to twice the
 * typical, delay from half the typical to the maximum, bias and offset from none to the maximum with
 * either sign, LED voltage. The rate is monotone in R1–R3 (model section 6), so those stand at one
 * corner each: fastest at R1−, R2−, R3+; but see `thresholdSigns`. It is not monotone in offset and
 * bias, so each corner holds the undisturbed middle and all four signs (model section 8.5). Kept with
 * the head.
 */
export const headCorners = keptWith((head: Head, brief: SearchBrief): HeadCorners => {
  const combinations = comparatorCorners(head, brief);
  return reduceCorners(head, brief, thresholdSigns(head), () => combinations);
});

/**
 * Some of a head's corners, for bounds from below: slow with offset and bias pulling one way and much
 * output resistance, fast undisturbed with little, at both ends of the supply. Kept with the head.
 */
export const fewCorners = keptWith((head: Head, brief: SearchBrief): HeadCorners => {
  const all = comparatorCorners(head, brief);
  const slow = all.filter(
    ({ outputFactor, offsetVolts, biasAmps }) => outputFactor === 2 && offsetVolts! * biasAmps! > 0,
  );
  const fast = all.filter(
    ({ outputFactor, offsetVolts }) => outputFactor === 0.5 && offsetVolts === 0,
  );
  return reduceCorners(head, brief, [usualSigns], (corner) => {
    const chosen = corner === 'slow' ? slow : fast;
    return chosen.length === 0 ? all : chosen;
  });
});

/** Reduces a head at its corners, each stand of R1–R3 with each of the comparator's corners. */
function reduceCorners(
  head: Head,
  brief: SearchBrief,
  stands: readonly Signs[],
  combinations: (corner: Corner) => readonly HeadCorner[],
): HeadCorners {
  const celsius = extremeCelsius(brief);
  const reduce = cornerReducer(head, brief);
  const at = (corner: Corner) =>
    celsius.map((each) =>
      stands.flatMap((signs) => {
        const passive = passiveCorner(head, corner, each, signs);
        return combinations(corner).map((one) => reduce(Object.assign(passive, one)));
      }),
    );
  return { celsius, slow: at('slow'), fast: at('fast') };
}

const disturbances = [
  [0, 0],
  [1, 1],
  [1, -1],
  [-1, 1],
  [-1, -1],
] as const;

type Signs = readonly [number, number, number];

/** Which way R1–R3 stand in the slowest kit where the thresholds are well away from the rails. */
const usualSigns: Signs = [1, 1, -1];
/** Bias above which a megohm or more of R4 takes equal thresholds near to where they cannot be reached. */
const muchBiasAmps = 3e-8;

/**
 * Which ways R1–R3 may stand in the slowest kit (the other way round in the fastest), the usual first.
 * Where bias, leakage, offset or the output's own level leave little room between a threshold and where
 * the capacitor settles, the time to get there outweighs all else, so that less R1 or less R2 slows.
 */
function thresholdSigns({ thresholds: { r1, r2, r3 }, comparator }: Head): readonly Signs[] {
  const isEqual = r1.id === r2.id && r2.id === r3.id;
  const hasRoom = isEqual && Math.abs(comparator.maxInputBiasAmps) < muchBiasAmps;
  return hasRoom ? [usualSigns] : [usualSigns, [-1, 1, -1], [1, -1, -1]];
}

/** What a corner sets apart from offset, bias, supply, output and LED; `signs` as in the slowest kit. */
export function passiveCorner(
  head: Head,
  corner: Corner,
  celsius: number,
  signs: Signs = usualSigns,
): HeadCorner {
  const { comparator: part, thresholds } = head;
  const { r1, r2, r3 } = thresholds;
  const sign = corner === 'slow' ? 1 : -1;
  const slow = corner === 'slow';
  return {
    r1Ohms: atCorner(r1.ohms, r1, sign * signs[0], celsius),
    r2Ohms: atCorner(r2.ohms, r2, sign * signs[1], celsius),
    r3Ohms: atCorner(r3.ohms, r3, sign * signs[2], celsius),
    delayLowHighSeconds: slow ? part.maxDelaySeconds : part.delayLowHighSeconds / 2,
    delayHighLowSeconds: slow ? part.maxDelaySeconds : part.delayHighLowSeconds / 2,
  };
}

/** Every combination of the figures that are not monotone or that pull both ways. */
export function comparatorCorners(head: Head, brief: SearchBrief): HeadCorner[] {
  const { maxOffsetVolts, maxInputBiasAmps } = head.comparator;
  const lit = brief.load !== null && !head.buffered ? brief.load : null;
  const forward = lit ? [...new Set([lit.minForwardVolts, lit.maxForwardVolts])] : [undefined];
  return supplyEnds(brief).flatMap((supplyVolts) =>
    forward.flatMap((forwardVolts) =>
      [0.5, 2].flatMap((outputFactor) =>
        disturbances.map(([offset, bias]): HeadCorner => ({
          supplyVolts,
          outputFactor,
          offsetVolts: offset * maxOffsetVolts,
          biasAmps: bias * maxInputBiasAmps,
          ...(forwardVolts === undefined ? {} : { forwardVolts }),
        })),
      ),
    ),
  );
}

/**
 * Slowest or fastest rate in hertz over the corners of a head at the temperature of place `t`, with
 * timing resistance and capacitance as they are there. 0 at the slow end when a corner does not
 * oscillate.
 */
export function extremeRate(
  corners: HeadCorners,
  corner: Corner,
  t: number,
  timingOhms: number,
  farads: number,
  capacitor: StockedCapacitor,
): number {
  const leakage = insulationSiemens(capacitor);
  let extreme = corner === 'slow' ? Number.POSITIVE_INFINITY : 0;
  for (const prepared of corners[corner][t]!) {
    const period = periodWith(prepared, timingOhms, farads, leakage, capacitor.leakageAmps);
    const hertz = period > 0 ? 1 / period : 0;
    extreme = corner === 'slow' ? Math.min(extreme, hertz) : Math.max(extreme, hertz);
  }
  return extreme;
}
