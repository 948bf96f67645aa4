import type { Circuit } from './circuit.ts';
import { kitRate, nominalKit, type KitFactors } from './kit-rate.ts';
import { createNormal, createRandom } from './random.ts';
import { rateSurface } from './rate-surface.ts';
import type { Sensitivities } from './sensitivity.ts';

/** Tolerances as fractions, 0 to under 1: R1–R3 each, each timing resistor, the capacitor. */
export interface PartTolerances {
  thresholds: number;
  timing: number;
  capacitor: number;
}

/** Sign of each part's deviation, −1 or +1, at a corner of the tolerances. */
export type CornerSigns = Record<keyof KitFactors, 1 | -1>;

/** Least and greatest rate; `minHz` is 0 when a kit within the tolerances does not oscillate. */
export interface WorstCase {
  minHz: number;
  maxHz: number;
  minSigns: CornerSigns;
  maxSigns: CornerSigns;
}

const goldenShare = (Math.sqrt(5) - 1) / 2;
const goldenSteps = 40;
/** Moves a yield by less than the standard error of a hundred thousand kits. */
const surfaceMiss = 1e-4;

/**
 * Extremes of the rate over all kits within the tolerances and, if `offsetVolts` (0 or more) is
 * given, over comparator offsets of ± that much around the circuit's own. The rate is monotone in
 * each part (the ideal circuit's sensitivities keep their signs; so did those of the full model
 * wherever it was tried, which is no proof), so its extremes lie at corners, and every corner is
 * evaluated. It is not monotone in the offset: there it has one greatest value inside, which is
 * sought by golden section, while the least lies at an end. Throws a `RangeError` on impossible
 * numbers.
 */
export function worstCase(
  circuit: Circuit,
  tolerances: PartTolerances,
  offsetVolts: number = 0,
): WorstCase {
  checkTolerances(tolerances);
  const centre = circuit.comparator.offsetVolts;
  const rateAt = (offset: number) =>
    kitRate({ ...circuit, comparator: { ...circuit.comparator, offsetVolts: offset } });
  const ends = offsetVolts > 0 ? [centre - offsetVolts, centre + offsetVolts] : [centre];
  const { least, most } = extremeCorners(circuit, tolerances, ends.map(rateAt));
  if (!(offsetVolts > 0)) return worstCaseOf(least, most);
  const inside = (offset: number) => extremeCorners(circuit, tolerances, [rateAt(offset)]).most;
  const best = inside(goldenMaximum((offset) => inside(offset).hz, ends));
  return worstCaseOf(least, best.hz > most.hz ? best : most);
}

interface Corner {
  hz: number;
  signs: CornerSigns;
}

function worstCaseOf(least: Corner, most: Corner): WorstCase {
  return { minHz: least.hz, maxHz: most.hz, minSigns: least.signs, maxSigns: most.signs };
}

function extremeCorners(
  circuit: Circuit,
  tolerances: PartTolerances,
  rates: readonly ((kit: KitFactors) => number)[],
): { least: Corner; most: Corner } {
  const corners = cornerSigns(circuit.timing.kind === 'steered').flatMap((signs) =>
    rates.map((rate) => ({ hz: rate(kitAt(signs, tolerances)) || 0, signs })),
  );
  return {
    least: corners.reduce((best, next) => (next.hz < best.hz ? next : best)),
    most: corners.reduce((best, next) => (next.hz > best.hz ? next : best)),
  };
}

function cornerSigns(steered: boolean): CornerSigns[] {
  const parts: (keyof KitFactors)[] = ['r1', 'r2', 'r3', 'timing', 'capacitor'];
  if (steered) parts.push('discharge');
  const start: CornerSigns = { r1: 1, r2: 1, r3: 1, timing: 1, discharge: 1, capacitor: 1 };
  return parts.reduce(
    (corners, part) =>
      corners.flatMap((signs): CornerSigns[] => [
        { ...signs, [part]: -1 },
        { ...signs, [part]: 1 },
      ]),
    [start],
  );
}

function kitAt(signs: CornerSigns, tolerances: PartTolerances): KitFactors {
  return {
    r1: 1 + signs.r1 * tolerances.thresholds,
    r2: 1 + signs.r2 * tolerances.thresholds,
    r3: 1 + signs.r3 * tolerances.thresholds,
    timing: 1 + signs.timing * tolerances.timing,
    discharge: 1 + signs.discharge * tolerances.timing,
    capacitor: 1 + signs.capacitor * tolerances.capacitor,
  };
}

function goldenMaximum(f: (x: number) => number, [from = 0, to = 0]: readonly number[]): number {
  let low = from;
  let high = to;
  let left = high - goldenShare * (high - low);
  let right = low + goldenShare * (high - low);
  let atLeft = f(left);
  let atRight = f(right);
  for (let step = 0; step < goldenSteps; step++) {
    if (atLeft >= atRight) {
      [high, right, atRight] = [right, left, atLeft];
      left = high - goldenShare * (high - low);
      atLeft = f(left);
    } else {
      [low, left, atLeft] = [left, right, atRight];
      right = low + goldenShare * (high - low);
      atRight = f(right);
    }
  }
  return (low + high) / 2;
}

/**
 * Root of the sum of squares of sensitivity × tolerance, as a fraction of the rate: the spread of
 * independent parts to first order. Divide by √3 for the standard deviation of uniform parts, by 3
 * for normal ones whose tolerance is three sigma. Symmetric, which the truth is not.
 */
export function rssFraction(sensitivities: Sensitivities, tolerances: PartTolerances): number {
  checkTolerances(tolerances);
  return Math.hypot(
    sensitivities.r1 * tolerances.thresholds,
    sensitivities.r2 * tolerances.thresholds,
    sensitivities.r3 * tolerances.thresholds,
    sensitivities.timing * tolerances.timing,
    sensitivities.discharge * tolerances.timing,
    sensitivities.capacitor * tolerances.capacitor,
  );
}

export interface MonteCarloOptions {
  /** `uniform` is ± tolerance; `normal` has the tolerance at three sigma and is not truncated. */
  distribution: 'uniform' | 'normal';
  /** Rate about which the band is laid, not necessarily the nominal one. */
  targetHz: number;
  /** Half width of the band as a fraction of the target. */
  band: number;
  /** Kits to draw, 1 or more. */
  samples: number;
  /** Whole number 0…2³² − 1; the same seed gives the same kits. */
  seed: number;
}

export interface MonteCarlo {
  /** Share of kits with |f/target − 1| ≤ band; a kit that does not oscillate is outside. */
  yieldWithinBand: number;
  yieldStandardError: number;
  /** Mean and standard deviation of the kits that oscillate. */
  meanHz: number;
  standardDeviationHz: number;
  /** Rates of all kits in hertz, ascending; a NaN for each that does not oscillate, at the end. */
  ratesHz: Float64Array;
}

/**
 * Draws kits with independent parts and solves each by the full model, or, where that is slow, by a
 * surface that stays within 1e-4 of it. The standard error is √(y(1−y)/N). Throws a `RangeError` on impossible numbers. Neglects correlation between parts of
 * one reel, which would make R1–R3 track and the spread smaller.
 */
export function monteCarlo(
  circuit: Circuit,
  tolerances: PartTolerances,
  options: MonteCarloOptions,
): MonteCarlo {
  checkTolerances(tolerances);
  const { distribution, targetHz, band, samples, seed } = options;
  if (!(Number.isInteger(samples) && samples >= 1 && targetHz > 0 && band >= 0)) {
    throw new RangeError('Give a target above zero, a band, and a whole number of samples.');
  }
  const random = createRandom(seed);
  const normal = createNormal(random);
  const deviate = distribution === 'uniform' ? () => 2 * random() - 1 : () => normal() / 3;
  const rate = quickRate(circuit, tolerances);
  const steered = circuit.timing.kind === 'steered';
  const kit = { ...nominalKit };
  const ratesHz = new Float64Array(samples);
  let inside = 0;
  for (let index = 0; index < samples; index++) {
    kit.r1 = 1 + tolerances.thresholds * deviate();
    kit.r2 = 1 + tolerances.thresholds * deviate();
    kit.r3 = 1 + tolerances.thresholds * deviate();
    kit.timing = 1 + tolerances.timing * deviate();
    kit.capacitor = 1 + tolerances.capacitor * deviate();
    if (steered) kit.discharge = 1 + tolerances.timing * deviate();
    const hz = positive(kit) ? rate(kit) : NaN;
    ratesHz[index] = hz;
    if (Math.abs(hz / targetHz - 1) <= band) inside++;
  }
  const share = inside / samples;
  return {
    yieldWithinBand: share,
    yieldStandardError: Math.sqrt((share * (1 - share)) / samples),
    ...momentsOf(ratesHz),
    ratesHz: ratesHz.sort(),
  };
}

/**
 * The full model where it is quick, and a fitted surface where it is slow (steered timing, or a
 * capacitance that depends on voltage) and fits.
 */
function quickRate(circuit: Circuit, tolerances: PartTolerances) {
  const rate = kitRate(circuit);
  const steered = circuit.timing.kind === 'steered';
  const { biasHalvingVolts, biasCurve } = circuit.capacitor;
  if (!steered && biasHalvingVolts === null && !biasCurve) return rate;
  const { thresholds, timing, capacitor } = tolerances;
  const discharge = steered ? timing : 0;
  const spans = { r1: thresholds, r2: thresholds, r3: thresholds, timing, discharge, capacitor };
  return rateSurface(rate, spans, surfaceMiss) ?? rate;
}

/** A wide normal tolerance reaches below zero now and then; no such part exists. */
function positive(kit: KitFactors): boolean {
  return (
    kit.r1 > 0 &&
    kit.r2 > 0 &&
    kit.r3 > 0 &&
    kit.timing > 0 &&
    kit.discharge > 0 &&
    kit.capacitor > 0
  );
}

/** Welford's running mean and variance, over what oscillates. */
function momentsOf(ratesHz: Float64Array): { meanHz: number; standardDeviationHz: number } {
  let count = 0;
  let mean = 0;
  let squares = 0;
  for (const hz of ratesHz) {
    if (Number.isNaN(hz)) continue;
    count++;
    const difference = hz - mean;
    mean += difference / count;
    squares += difference * (hz - mean);
  }
  return {
    meanHz: count > 0 ? mean : NaN,
    standardDeviationHz: count > 0 ? Math.sqrt(squares / count) : NaN,
  };
}

function checkTolerances(tolerances: PartTolerances): void {
  for (const [part, tolerance] of Object.entries(tolerances)) {
    if (!(tolerance >= 0 && tolerance < 1)) {
      throw new RangeError(`The tolerance of ${part} must be from 0 to under 1, not ${tolerance}.`);
    }
  }
}
